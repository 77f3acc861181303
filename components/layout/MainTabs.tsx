import { usePathname } from 'expo-router';
import { TabList, Tabs, TabSlot, TabTrigger } from 'expo-router/ui';
import { StyleSheet, View } from 'react-native';
import { Keyboard } from '@/components/keyboard/Keyboard';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useSession } from '@/hooks/session';
import { can } from '@/shared/contracts/roles';
import { BottomBar } from './BottomBar';
import { MAIN_PLACES, MORE, MORE_PLACES } from './places';
import { SideRail } from './SideRail';
import { useBreakpoint } from './use-breakpoint';

/** The signed-in frame: a rail beside the page when wide, a bar beneath it on the phone. */
export function MainTabs() {
  const { palette } = useTheme();
  const { wide } = useBreakpoint();
  const path = usePathname();
  const { role } = useSession().workspace;
  const more = MORE_PLACES.filter((place) => !place.needs || can(role, place.needs));
  return (
    <Tabs style={[styles.frame, wide ? styles.row : null, { backgroundColor: palette.ground }]}>
      {/* The router learns its tabs here; the bars below draw them. */}
      <TabList style={styles.hidden}>
        {[...MAIN_PLACES, ...MORE_PLACES, MORE].map((place) => (
          <TabTrigger key={place.name} name={place.name} href={place.href} />
        ))}
      </TabList>
      {wide ? <SideRail path={path} more={more} /> : null}
      <View style={styles.page}>
        <TabSlot />
      </View>
      {wide ? null : <BottomBar path={path} more={more} />}
      <Keyboard />
    </Tabs>
  );
}

const styles = StyleSheet.create({
  frame: { flex: 1, height: '100%' },
  row: { flexDirection: 'row' },
  hidden: { display: 'none' },
  page: { flex: 1, minWidth: 0, minHeight: 0 },
});

import { ScrollView, StyleSheet, View } from 'react-native';
import { KeyboardButton } from '@/components/keyboard/KeyboardButton';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { Mark } from './Mark';
import { isAt, MAIN_PLACES, type Place } from './places';
import { PlaceLink } from './PlaceLink';

/** The wide screen's places: the daily ones above, the rest below a rule. */
export function SideRail({ path, more }: { path: string; more: readonly Place[] }) {
  const { palette } = useTheme();
  return (
    <ScrollView
      role="navigation"
      aria-label="Places"
      style={[styles.rail, { borderRightColor: palette.rule }]}
      contentContainerStyle={styles.inner}
    >
      <View style={styles.mark}>
        <Mark size={32} />
      </View>
      {MAIN_PLACES.map((place) => (
        <PlaceLink key={place.name} place={place} current={isAt(path, place.href)} shape="rail" />
      ))}
      <View style={[styles.rule, { backgroundColor: palette.rule }]} />
      {more.map((place) => (
        <PlaceLink key={place.name} place={place} current={isAt(path, place.href)} shape="rail" />
      ))}
      <KeyboardButton />
    </ScrollView>
  );
}

const styles = StyleSheet.create({
  rail: { flexGrow: 0, flexShrink: 0, width: 98, borderRightWidth: hairline },
  inner: { paddingHorizontal: space.s, paddingBottom: space.l, gap: space.s, alignItems: 'center' },
  mark: { paddingTop: space.l, paddingBottom: space.s },
  rule: { height: hairline, alignSelf: 'stretch', marginVertical: space.xs },
});

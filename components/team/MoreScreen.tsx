import { Link } from 'expo-router';
import { Pressable, StyleSheet, View } from 'react-native';
import { MORE_PLACES, type Place } from '@/components/layout/places';
import { Screen } from '@/components/layout/Screen';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { useSession } from '@/hooks/session';
import { can } from '@/shared/contracts/roles';

const LINES: Record<string, string> = {
  vehicles: 'IMU mounting and antenna lever arms',
  requirements: 'Limits that a set must keep before it is released',
  team: 'Members, roles, invitations',
  mail: 'Letters of this installation',
  audit: 'Who changed what, when, from where',
  profile: 'Theme, workspace, sign out',
};

/** The places that have no room in the phone's bar. */
export function MoreScreen() {
  const { palette } = useTheme();
  const { workspace } = useSession();
  const places = MORE_PLACES.filter((place) => !place.needs || can(workspace.role, place.needs));
  return (
    <Screen title="More" subtitle={workspace.name} width="text">
      <View style={[styles.list, { backgroundColor: palette.sheet, borderColor: palette.rule }]}>
        {places.map((place, at) => (
          <Row key={place.name} place={place} first={at === 0} />
        ))}
      </View>
    </Screen>
  );
}

function Row({ place, first }: { place: Place; first: boolean }) {
  const { palette } = useTheme();
  return (
    <Link href={place.href} asChild>
      <Pressable>
        <View style={[styles.row, first ? null : { borderTopWidth: hairline, borderTopColor: palette.rule }]}>
          <Icon name={place.icon} tone="petrol" />
          <View style={styles.words}>
            <Text strong>{place.label}</Text>
            <Text variant="label" tone="soft">
              {LINES[place.name]}
            </Text>
          </View>
          <Icon name="forward" tone="soft" size={20} />
        </View>
      </Pressable>
    </Link>
  );
}

const styles = StyleSheet.create({
  list: { borderWidth: hairline, borderRadius: radius, overflow: 'hidden' },
  row: { flexDirection: 'row', alignItems: 'center', gap: space.l, padding: space.l, minHeight: 64 },
  words: { flex: 1 },
});

import { Pressable, StyleSheet, View } from 'react-native';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import type { Installation } from '@/shared/contracts/accounts';
import { ROLE_SUMMARY } from '@/shared/contracts/roles';

export interface DemoPeopleProps {
  people: Installation['demoPeople'];
  busy: boolean;
  onChoose: (person: Installation['demoPeople'][number]) => void;
}

/** The seeded people, one a role: a tap signs in as one of them. */
export function DemoPeople({ people, busy, onChoose }: DemoPeopleProps) {
  const { palette } = useTheme();
  return (
    <View style={{ gap: space.s }}>
      <Text variant="label" strong level={2} style={styles.title}>
        Or look round the demo as
      </Text>
      <View style={[styles.list, { borderColor: palette.rule, backgroundColor: palette.sheet }]}>
        {people.map((person, at) => (
          <Pressable
            key={person.email}
            role="button"
            aria-label={`Sign in as ${person.name}, ${person.role}`}
            disabled={busy}
            onPress={() => onChoose(person)}
            style={({ pressed }) => [
              styles.row,
              at > 0 ? { borderTopWidth: hairline, borderTopColor: palette.rule } : null,
              pressed ? { backgroundColor: palette.well } : null,
            ]}
          >
            <View style={styles.words}>
              <Text variant="body" strong>
                {person.name}
                <Text variant="label" tone="petrol">{`  ${person.role}`}</Text>
              </Text>
              <Text variant="label" tone="soft">
                {ROLE_SUMMARY[person.role]}
              </Text>
            </View>
            <Icon name="forward" tone="soft" size={20} />
          </Pressable>
        ))}
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  title: { fontSize: 16 },
  list: { borderWidth: hairline, borderRadius: radius, overflow: 'hidden' },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.m,
    minHeight: 56,
    paddingHorizontal: space.l,
    paddingVertical: space.s,
  },
  words: { flex: 1 },
});

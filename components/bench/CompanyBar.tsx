import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { useSession } from '@/hooks/session';
import type { Company, Followed } from './use-follow';

/** Who else has a bench open over this recording, and the way to follow them. Nothing where one is alone. */
export function CompanyBar({ company, followed }: { company: Company; followed: Followed | null }) {
  const { palette } = useTheme();
  const { user } = useSession();
  if (company.companions.length === 0) return null;
  return (
    <View
      role="region"
      aria-label="Also on this bench"
      style={[styles.bar, { backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      {company.companions.map((companion) => {
        const name = companion.userId === user.id ? 'You, in another window' : companion.name;
        const isFollowed = companion.benchId === followed?.benchId;
        return (
          <View key={companion.benchId} style={styles.person}>
            <Icon name="person" tone={isFollowed ? 'petrol' : 'soft'} size={20} />
            <Text
              variant="label"
              tone={isFollowed ? 'petrol' : 'ink'}
              strong={isFollowed}
              style={styles.words}
            >
              {isFollowed ? `Following: ${name}` : name}
            </Text>
            {isFollowed ? (
              <Button label="Stop following" kind="plain" onPress={company.stop} />
            ) : (
              <Button
                label={`Follow ${name}`}
                kind="plain"
                disabled={companion.runId === null}
                reason="There is nothing to see yet: they have run nothing."
                onPress={() => company.follow(companion)}
              />
            )}
          </View>
        );
      })}
    </View>
  );
}

const styles = StyleSheet.create({
  bar: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    columnGap: space.l,
    paddingHorizontal: space.m,
    borderWidth: hairline,
    borderRadius: radius,
  },
  person: { flexDirection: 'row', alignItems: 'center', gap: space.s },
  words: { flexShrink: 1 },
});

import { Link } from 'expo-router';
import { Pressable, StyleSheet, View } from 'react-native';
import { Icon } from '@/components/ui/Icon';
import { Progress } from '@/components/ui/Progress';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import type { Waiting } from './waiting';

/** Rows that lead to what has to be done. */
export function WaitingList({ waiting, mayWrite }: { waiting: readonly Waiting[]; mayWrite: boolean }) {
  const { palette } = useTheme();
  return (
    <View style={{ gap: space.s }}>
      <Text variant="heading">Waiting</Text>
      {waiting.length === 0 ? (
        <Text tone="soft">
          {mayWrite
            ? 'Nothing waits: every recording is decoded, no version is in review, no run has failed lately.'
            : 'Nothing is being decoded just now.'}
        </Text>
      ) : (
        <View style={[styles.list, { backgroundColor: palette.sheet, borderColor: palette.rule }]}>
          {waiting.map((item, at) => (
            <Row key={item.key} item={item} first={at === 0} />
          ))}
        </View>
      )}
    </View>
  );
}

function Row({ item, first }: { item: Waiting; first: boolean }) {
  const { palette } = useTheme();
  const { name, word, sentence, tone, progress, href } = item;
  return (
    <Link href={href} asChild>
      <Pressable aria-label={`${name}, ${word}: ${sentence}`}>
        <View
          style={[
            styles.row,
            { borderLeftColor: palette[tone] },
            first ? null : { borderTopWidth: hairline, borderTopColor: palette.rule },
          ]}
        >
          <View style={styles.words}>
            <View style={styles.head}>
              <Text strong style={styles.name}>
                {name}
              </Text>
              <Text variant="label" strong tone={tone}>
                {word}
              </Text>
            </View>
            {progress === null ? (
              <Text variant="label" tone="soft" numberOfLines={2}>
                {sentence}
              </Text>
            ) : (
              <Progress label={`${sentence}: ${name}`} value={progress} labelHidden />
            )}
          </View>
          <Icon name="forward" tone="soft" size={20} />
        </View>
      </Pressable>
    </Link>
  );
}

const styles = StyleSheet.create({
  list: { borderWidth: hairline, borderRadius: radius, overflow: 'hidden' },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.m,
    padding: space.m,
    minHeight: 60,
    borderLeftWidth: 3,
  },
  words: { flex: 1, gap: space.xs, minWidth: 0 },
  head: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'space-between', columnGap: space.m },
  name: { flexShrink: 1 },
});

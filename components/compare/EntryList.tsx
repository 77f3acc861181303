import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hrefOf } from '@/components/layout/paths';
import { benchHref } from '@/components/bench/bench-link';
import { hairline, space } from '@/constants/theme';
import type { Outage } from '@/shared/contracts/runs';
import { defaultParameters } from '@/shared/contracts/parameters';
import { differences } from '@/shared/parameters/parameter-path';
import type { LiveState } from '@/hooks/live/live-controller';
import { EntryMark } from './EntryMark';
import { MOST_ENTRIES } from './compare-link';
import type { Entry } from './use-entries';

export interface EntryListProps {
  recordingId: string;
  entries: readonly Entry[];
  windows: readonly Outage[];
  stateOf: (entry: Entry) => LiveState | null;
  onFirst: (key: string) => void;
  onRemove: (key: string) => void;
  onAdd: () => void;
}

/** What is compared: the mark of each, where it comes from, how far its run is. The first is what the others are held against. */
export function EntryList({
  recordingId,
  entries,
  windows,
  stateOf,
  onFirst,
  onRemove,
  onAdd,
}: EntryListProps) {
  const { palette } = useTheme();
  return (
    <Card title="Compared" bare>
      {entries.map((entry, i) => (
        <View key={entry.key} style={[styles.entry, { borderTopColor: palette.rule }]}>
          <View style={styles.words}>
            <View style={styles.name}>
              <EntryMark index={i} />
              <Text strong style={styles.shrink}>
                {entry.name}
              </Text>
            </View>
            <Figures variant="label" tone="soft">
              {[i === 0 ? 'others are compared with it' : null, entry.note].filter(Boolean).join(' · ')}
            </Figures>
            <Progress entry={entry} state={stateOf(entry)} />
          </View>
          <View style={styles.buttons}>
            {entry.parameters ? (
              <TextLink
                href={hrefOf(benchOf(recordingId, entry, windows))}
                label="Open"
                spoken={`Open ${entry.name} on the bench`}
              />
            ) : null}
            {i > 0 ? (
              <Button
                label={`Compare the others with ${entry.name}`}
                icon="up"
                iconOnly
                kind="plain"
                onPress={() => onFirst(entry.key)}
              />
            ) : null}
            <Button
              label={`Leave out ${entry.name}`}
              icon="close"
              iconOnly
              kind="plain"
              onPress={() => onRemove(entry.key)}
            />
          </View>
        </View>
      ))}
      <View style={[styles.add, { borderTopColor: palette.rule }]}>
        <Button
          label="Add a run or a version"
          icon="plus"
          disabled={entries.length >= MOST_ENTRIES}
          reason={`At most ${MOST_ENTRIES} can be told apart: leave one out first.`}
          onPress={onAdd}
        />
      </View>
    </Card>
  );
}

function Progress({ entry, state }: { entry: Entry; state: LiveState | null }) {
  if (entry.problem)
    return (
      <Text variant="label" tone="vermilion">
        {entry.problem}
      </Text>
    );
  if (state?.phase === 'failed' || state?.phase === 'cancelled')
    return (
      <Text variant="label" tone="vermilion">
        {state.reason ?? 'The run did not end.'}
      </Text>
    );
  if (state?.phase === 'running' || state?.phase === 'starting')
    return (
      <Figures variant="label" tone="petrol">{`computing, ${Math.round(state.progress * 100)} %`}</Figures>
    );
  return null;
}

/** The bench with the entry's parameters over the windows of the comparison. */
function benchOf(recordingId: string, { ref, parameters }: Entry, windows: readonly Outage[]) {
  if (ref !== 'start' && 'set' in ref)
    return benchHref({ recordingId, setId: ref.set, version: ref.version, windows });
  return benchHref({ recordingId, changes: differences(START, parameters!), windows });
}
const START = defaultParameters();

const styles = StyleSheet.create({
  entry: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.s,
    paddingHorizontal: space.l,
    paddingVertical: space.s,
    borderTopWidth: hairline,
  },
  words: { flex: 1, minWidth: 0 },
  name: { flexDirection: 'row', alignItems: 'center', gap: space.s },
  shrink: { flexShrink: 1 },
  buttons: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
  add: { padding: space.l, borderTopWidth: hairline, alignItems: 'flex-start' },
});

import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Sheet } from '@/components/ui/Sheet';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { useParameterSet, useParameterSets } from '@/hooks/parameter-sets';
import { useRuns } from '@/hooks/runs';
import type { ParameterSet } from '@/shared/contracts/parameter-sets';
import { entryKey, type EntryRef } from './compare-link';

export interface EntryPickerProps {
  recordingId: string;
  /** Keys of what is compared already. */
  taken: ReadonlySet<string>;
  onPick: (entry: EntryRef) => void;
  onClose: () => void;
}

const MOST_RUNS = 20;

/** A sheet with what can be compared: versions of sets, the start values, and the latest runs over this recording. */
export function EntryPicker({ recordingId, taken, onPick, onClose }: EntryPickerProps) {
  const sets = useParameterSets();
  const runs = useRuns({ recordingId, state: 'done', limit: MOST_RUNS });
  const rows = sets.data?.pages.flatMap(({ items }) => items) ?? [];
  return (
    <Sheet open title="Add to the comparison" onClose={onClose}>
      <Text variant="label" strong level={3}>
        Versions
      </Text>
      {sets.isPending ? <SkeletonList label="parameter sets" rows={2} /> : null}
      {sets.isError ? <ErrorState title="The sets could not be loaded" error={sets.error} /> : null}
      <Pick
        title="Start values"
        note="the usual ones of a new bench"
        label="Add the start values"
        disabled={taken.has('start')}
        onPress={() => onPick('start')}
      />
      {rows.map((set) => (
        <SetRow key={set.id} set={set} taken={taken} onPick={onPick} />
      ))}
      {sets.hasNextPage ? <Button label="More sets" onPress={() => void sets.fetchNextPage()} /> : null}
      <Text variant="label" strong level={3} style={styles.second}>
        Latest runs over this recording
      </Text>
      {runs.isPending ? <SkeletonList label="runs" rows={2} /> : null}
      {runs.isError ? <ErrorState title="The runs could not be loaded" error={runs.error} /> : null}
      {runs.data?.items.length === 0 ? <Text tone="soft">There is no finished run yet.</Text> : null}
      {runs.data?.items.map((run) => (
        <Pick
          key={run.id}
          title={formatMoment(run.createdAt)}
          note={run.createdBy}
          label={`Add the run of ${formatMoment(run.createdAt)} by ${run.createdBy}`}
          disabled={taken.has(entryKey({ run: run.id }))}
          onPress={() => onPick({ run: run.id })}
        />
      ))}
    </Sheet>
  );
}

/** The latest version at once, the others when asked for. */
function SetRow({ set, taken, onPick }: { set: ParameterSet } & Pick<EntryPickerProps, 'taken' | 'onPick'>) {
  const [open, setOpen] = useState(false);
  const detail = useParameterSet(open ? set.id : '');
  const numbers = open ? (detail.data?.versions.map(({ number }) => number) ?? []) : [set.latest.number];
  return (
    <View>
      {numbers.map((number) => (
        <Pick
          key={number}
          title={`${set.name} v${number}`}
          note={noteOf(set, number)}
          label={`Add ${set.name} v${number}`}
          disabled={taken.has(entryKey({ set: set.id, version: number }))}
          onPress={() => onPick({ set: set.id, version: number })}
        />
      ))}
      {!open && set.versionCount > 1 ? (
        <View style={styles.more}>
          <Button
            label={`${set.versionCount - 1} earlier of ${set.name}`}
            icon="down"
            kind="plain"
            onPress={() => setOpen(true)}
          />
        </View>
      ) : null}
      {open && detail.isPending ? <SkeletonList label={`versions of ${set.name}`} rows={1} /> : null}
    </View>
  );
}

const noteOf = (set: ParameterSet, number: number) =>
  number === set.latest.number ? `${set.latest.createdBy}, ${formatMoment(set.latest.createdAt)}` : '';

interface PickProps {
  title: string;
  note: string;
  label: string;
  disabled: boolean;
  onPress: () => void;
}

function Pick({ title, note, label, disabled, onPress }: PickProps) {
  const { palette } = useTheme();
  return (
    <View style={[styles.row, { borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text strong>{title}</Text>
        {note ? (
          <Figures variant="label" tone="soft">
            {note}
          </Figures>
        ) : null}
      </View>
      <Button
        label={label}
        icon={disabled ? 'check' : 'plus'}
        iconOnly
        disabled={disabled}
        reason="It is compared already."
        onPress={onPress}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.m,
    paddingVertical: space.s,
    borderTopWidth: hairline,
  },
  words: { flex: 1, minWidth: 0 },
  more: { alignItems: 'flex-start' },
  second: { marginTop: space.l },
});

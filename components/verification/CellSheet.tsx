import { router } from 'expo-router';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { benchHref } from '@/components/bench/bench-link';
import { hrefOf } from '@/components/layout/paths';
import { Button } from '@/components/ui/Button';
import { messageOf } from '@/components/ui/ErrorState';
import { Facts } from '@/components/ui/Facts';
import { Field } from '@/components/ui/Field';
import { formatMoment } from '@/components/ui/format-day';
import { Notice } from '@/components/ui/Notice';
import { Sheet } from '@/components/ui/Sheet';
import { space } from '@/constants/theme';
import { useRun } from '@/hooks/runs';
import { useCan, useSession } from '@/hooks/session';
import { useWaive } from '@/hooks/verification';
import type { VersionRef } from '@/hooks/versions';
import type { Verification, VerificationCell } from '@/shared/contracts/verification';
import { scheduleWords } from '@/shared/requirements/metric-words';
import { cellWords } from './cell-words';

export interface CellSheetProps {
  of: VersionRef;
  cell: VerificationCell;
  verification: Verification;
  inReview: boolean;
  authorId: string;
  onClose: () => void;
}

/** What is behind a cell: requirement, value, reason, its run on the bench; and the waiver. */
export function CellSheet({ of, cell, verification, inReview, authorId, onClose }: CellSheetProps) {
  const { user } = useSession();
  const mayReview = useCan('set:review') && user.id !== authorId;
  const requirement = verification.requirements.find(({ id }) => id === cell.requirementId)!;
  const recording = verification.recordings.find(({ id }) => id === cell.recordingId)!;
  const { verdict, value, detail } = cellWords(cell, requirement.metric);
  const facts = [
    { label: 'Required', value: requirement.sentence },
    { label: 'Outages', value: scheduleWords(requirement.schedule) },
    { label: 'Recording', value: recording.name },
    { label: 'Verdict', value: verdict },
    ...(value ? [{ label: 'Value', value }] : []),
    ...(detail ? [{ label: 'Because', value: detail }] : []),
    ...(cell.judgedAt ? [{ label: 'Judged', value: formatMoment(cell.judgedAt) }] : []),
  ];
  return (
    <Sheet open title={requirement.name} onClose={onClose}>
      <Facts facts={facts} />
      {cell.runId ? <OpenRun of={of} recordingId={cell.recordingId} runId={cell.runId} /> : null}
      {cell.waiver ? (
        <Notice
          tone="ochre"
          title={`Waived by ${cell.waiver.createdBy}, ${formatMoment(cell.waiver.createdAt)}`}
        >
          {cell.waiver.text}
        </Notice>
      ) : null}
      {inReview && mayReview && !cell.settled && cell.state === 'done' ? (
        <Waive of={of} cell={cell} onDone={onClose} />
      ) : null}
    </Sheet>
  );
}

/** The bench with the version's parameters and the windows of the run. */
function OpenRun({ of, recordingId, runId }: { of: VersionRef; recordingId: string; runId: string }) {
  const run = useRun(runId);
  const windows = run.data?.outages;
  const open = () =>
    router.push(
      hrefOf(benchHref({ recordingId, setId: of.setId, version: of.number, windows, baselineRunId: runId })),
    );
  return (
    <View style={styles.buttons}>
      <Button
        label="Open its run on the bench"
        icon="bench"
        disabled={!windows}
        reason={run.isError ? messageOf(run.error) : 'Looking for the run.'}
        onPress={open}
      />
    </View>
  );
}

const LEAST_WAIVER = 10;

function Waive({ of, cell, onDone }: { of: VersionRef; cell: VerificationCell; onDone: () => void }) {
  const [text, setText] = useState('');
  const waive = useWaive(of);
  const { requirementId, recordingId } = cell;
  const submit = async () => {
    try {
      await waive.mutateAsync({ requirementId, recordingId, text: text.trim() });
      onDone();
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <>
      <Field
        label="Why it may be waived"
        value={text}
        onChangeText={setText}
        hint="A sentence. It stands under your name in the report and in every export."
        multiline
      />
      {waive.isError ? (
        <Notice tone="vermilion" urgent title="Not waived">
          {messageOf(waive.error)}
        </Notice>
      ) : null}
      <View style={styles.buttons}>
        <Button
          label="Waive this cell"
          disabled={text.trim().length < LEAST_WAIVER}
          reason="Say in a sentence why it may be waived."
          busy={waive.isPending}
          onPress={() => void submit()}
        />
      </View>
    </>
  );
}

const styles = StyleSheet.create({ buttons: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s } });

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { messageOf } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { Notice } from '@/components/ui/Notice';
import { Progress } from '@/components/ui/Progress';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { useVerification } from '@/hooks/verification';
import { useReleaseVersion, type VersionRef } from '@/hooks/versions';
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import type { Verification } from '@/shared/contracts/verification';
import { Cautions } from './Cautions';

/** Releases a version for the vehicle of its set: what proves it, what is said of it, and what it supersedes. */
export function ReleaseDialog({
  set,
  of,
  onClose,
}: {
  set: ParameterSetDetail;
  of: VersionRef;
  onClose: () => void;
}) {
  const verification = useVerification(of);
  const [comment, setComment] = useState('');
  const [reason, setReason] = useState('');
  const release = useReleaseVersion(of);
  const toast = useToast();
  const gate = verification.data ? gateOf(verification.data) : null;
  const unproven = gate === 'none';
  const blocked = gate === null || gate === 'open' || (unproven && reason.trim().length < LEAST_REASON);
  const submit = async () => {
    try {
      await release.mutateAsync({
        comment: comment.trim(),
        ...(unproven ? { withoutRequirements: reason.trim() } : {}),
      });
      onClose();
      toast({ message: `Version ${of.number} is released for ${set.vehicleName ?? 'its vehicle'}.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <Dialog
      open
      title={`Release version ${of.number}`}
      onClose={onClose}
      width={560}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            label="Release"
            kind="primary"
            icon="check"
            disabled={blocked}
            reason={blockedWords(gate)}
            busy={release.isPending}
            onPress={() => void submit()}
          />
        </>
      }
    >
      <Text>
        {`It becomes the one released set of ${set.vehicleName ?? 'the vehicle'}; what was released before is superseded.`}
      </Text>
      {verification.isPending ? <Progress label="Looking at the verification" /> : null}
      {verification.isError ? (
        <Notice tone="vermilion" title="The verification could not be loaded">
          {messageOf(verification.error)}
        </Notice>
      ) : null}
      {verification.data ? <GateNotice verification={verification.data} /> : null}
      {unproven ? (
        <Field
          label="Why it may be released without requirements"
          value={reason}
          onChangeText={setReason}
          hint="A sentence. It stands in the report and in every export."
          multiline
          required
        />
      ) : null}
      <Field label="Comment" value={comment} onChangeText={setComment} multiline />
      <Cautions />
      {release.isError ? (
        <Notice tone="vermilion" urgent title="Not released">
          {messageOf(release.error)}
        </Notice>
      ) : null}
    </Dialog>
  );
}

const LEAST_REASON = 10;

/** none: no requirement applies. open: cells stand in the way. */
type Gate = 'none' | 'open' | 'passed';

const gateOf = ({ counts }: Verification): Gate =>
  counts.cells === 0 ? 'none' : counts.unsettled > 0 ? 'open' : 'passed';

const blockedWords = (gate: Gate | null) =>
  gate === 'none'
    ? 'Say in a sentence why it may be released without requirements.'
    : gate === 'open'
      ? 'Verify the version first, or waive in writing what does not pass.'
      : 'Wait for the verification.';

function GateNotice({ verification }: { verification: Verification }) {
  const { counts } = verification;
  const gate = gateOf(verification);
  if (gate === 'none')
    return (
      <Notice tone="ochre" title="No requirement applies to this vehicle">
        Nothing was proven. Add requirements and verify the version, or say why it may be released without.
      </Notice>
    );
  if (gate === 'open')
    return (
      <Notice tone="vermilion" title={`${counts.unsettled} of ${counts.cells} cells stand in the way`}>
        Open the verification: verify what is missing or out of date, or waive a cell in writing.
      </Notice>
    );
  const waived = counts.waived > 0 ? `, ${counts.waived} of them waived in writing` : '';
  return (
    <Notice tone="pine" title="The verification is complete">
      {`All ${counts.cells} cells are settled${waived}.`}
    </Notice>
  );
}

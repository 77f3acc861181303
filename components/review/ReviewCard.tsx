import { router } from 'expo-router';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { useSession } from '@/hooks/session';
import { useDiscardVersion, useReviseVersion, useSubmitVersion } from '@/hooks/versions';
import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import { ChooseVehicle } from './ChooseVehicle';
import { NoteDialog } from './NoteDialog';
import { ReleaseDialog } from './ReleaseDialog';
import { ReturnDialog } from './ReturnDialog';
import { reviewSteps } from './review-rules';

export interface ReviewCardProps {
  set: ParameterSetDetail;
  version: ParameterSetVersion;
}

type Open = 'note' | 'discard' | 'return' | 'release' | 'vehicle' | null;

/** Where a version stands on its way to a release, and the next steps that the person may take. */
export function ReviewCard({ set, version }: ReviewCardProps) {
  const { user, workspace } = useSession();
  const of = { setId: set.id, number: version.number };
  const [open, setOpen] = useState<Open>(null);
  const close = () => setOpen(null);
  const submit = useSubmitVersion(of);
  const revise = useReviseVersion(of);
  const toast = useToast();
  const steps = reviewSteps(set, version, { id: user.id, name: user.name, role: workspace.role });
  const attempt = async (what: () => Promise<string>) => {
    try {
      toast({ message: await what() });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  return (
    <Card title="Review">
      <Story version={version} />
      {steps.waiting ? (
        <Text variant="label" tone="ochre">
          {steps.waiting}
        </Text>
      ) : null}
      <View style={styles.buttons}>
        {steps.submit ? (
          <Button
            label="Submit for review"
            kind="primary"
            icon="check"
            busy={submit.isPending}
            onPress={() =>
              void attempt(async () => {
                await submit.mutateAsync();
                return 'Submitted: from now on nobody changes it. The approvers are told by e-mail.';
              })
            }
          />
        ) : null}
        {version.state === 'draft' && set.vehicleId === null && steps.editNote ? (
          <Button label="Choose the vehicle" kind="primary" onPress={() => setOpen('vehicle')} />
        ) : null}
        {steps.review ? (
          <>
            <Button label="Release" kind="primary" icon="check" onPress={() => setOpen('release')} />
            <Button label="Return" icon="undo" onPress={() => setOpen('return')} />
          </>
        ) : null}
        {steps.editNote ? <Button label="Edit the note" icon="edit" onPress={() => setOpen('note')} /> : null}
        {steps.revise ? (
          <Button
            label="Draft from it"
            icon="copy"
            busy={revise.isPending}
            onPress={() =>
              void attempt(async () => {
                const { number } = await revise.mutateAsync();
                router.setParams({ version: String(number) });
                return `Version ${number} is a draft that begins as a copy of version ${version.number}.`;
              })
            }
          />
        ) : null}
        {steps.discard ? (
          <Button label="Discard" icon="delete" kind="danger" onPress={() => setOpen('discard')} />
        ) : null}
      </View>
      {open === 'return' ? <ReturnDialog of={of} onClose={close} /> : null}
      {open === 'release' ? <ReleaseDialog set={set} of={of} onClose={close} /> : null}
      {open === 'note' ? <NoteDialog of={of} note={version.note} onClose={close} /> : null}
      {open === 'vehicle' ? <ChooseVehicle set={set} onClose={close} /> : null}
      {open === 'discard' ? <Discard set={set} version={version} onClose={close} /> : null}
    </Card>
  );
}

/** What has happened so far, in lines. */
function Story({ version }: { version: ParameterSetVersion }) {
  const { submittedAt, submittedBy, reviewedAt, reviewedBy, reviewComment, state } = version;
  const verb = state === 'returned' ? 'Returned' : 'Released';
  return (
    <View style={styles.story}>
      {submittedAt ? (
        <Figures tone="soft">{`Submitted by ${submittedBy ?? ''}, ${formatMoment(submittedAt)}`}</Figures>
      ) : null}
      {reviewedAt ? (
        <Figures tone="soft">{`${verb} by ${reviewedBy ?? ''}, ${formatMoment(reviewedAt)}`}</Figures>
      ) : null}
      {state === 'superseded' ? (
        <Text variant="label" tone="soft">
          A later release for the same vehicle took its place.
        </Text>
      ) : null}
      {reviewComment ? (
        <Notice
          tone={state === 'returned' ? 'vermilion' : 'petrol'}
          title={`${reviewedBy ?? 'The reviewer'} says`}
        >
          {reviewComment}
        </Notice>
      ) : null}
    </View>
  );
}

function Discard({ set, version, onClose }: ReviewCardProps & { onClose: () => void }) {
  const discard = useDiscardVersion({ setId: set.id, number: version.number });
  const toast = useToast();
  const last = set.versions.length === 1;
  const confirm = async () => {
    try {
      await discard.mutateAsync();
      onClose();
      if (last) router.replace('/sets');
      else router.setParams({ version: undefined });
      toast({ message: `Version ${version.number} is discarded.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <ConfirmDialog
      open
      danger
      title={`Discard version ${version.number}?`}
      message={
        last
          ? `It is the only version: ${set.name} goes with it. This cannot be undone.`
          : 'Its parameters, note and comments are lost. Its run stays. This cannot be undone.'
      }
      confirmLabel={last ? 'Discard the set' : 'Discard the version'}
      busy={discard.isPending}
      onConfirm={() => void confirm()}
      onClose={onClose}
    >
      {discard.isError ? (
        <Notice tone="vermilion" urgent title="Not discarded">
          {messageOf(discard.error)}
        </Notice>
      ) : null}
    </ConfirmDialog>
  );
}

const styles = StyleSheet.create({
  story: { gap: space.s },
  buttons: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s },
});

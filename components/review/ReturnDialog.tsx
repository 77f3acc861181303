import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { messageOf } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { useReturnVersion, type VersionRef } from '@/hooks/versions';

/** Sends a version back to its author, who must learn why. */
export function ReturnDialog({ of, onClose }: { of: VersionRef; onClose: () => void }) {
  const [comment, setComment] = useState('');
  const [problem, setProblem] = useState<string>();
  const giveBack = useReturnVersion(of);
  const toast = useToast();
  const submit = async () => {
    if (!comment.trim()) return setProblem('Say what is to be mended.');
    try {
      await giveBack.mutateAsync({ comment: comment.trim() });
      onClose();
      toast({ message: `Version ${of.number} is returned; its author is told by e-mail.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <Dialog
      open
      title={`Return version ${of.number}`}
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button label="Return it" kind="primary" busy={giveBack.isPending} onPress={() => void submit()} />
        </>
      }
    >
      <Text tone="soft">
        It is not changed any more: its author goes on with a draft that begins as a copy.
      </Text>
      {giveBack.isError ? (
        <Notice tone="vermilion" urgent title="Not returned">
          {messageOf(giveBack.error)}
        </Notice>
      ) : null}
      <Field
        label="What is to be mended"
        value={comment}
        onChangeText={(text) => {
          setComment(text);
          setProblem(undefined);
        }}
        error={problem}
        multiline
        required
      />
    </Dialog>
  );
}

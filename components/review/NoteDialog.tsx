import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { messageOf } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { Notice } from '@/components/ui/Notice';
import { usePatchVersion, type VersionRef } from '@/hooks/versions';
import { noteSchema } from '@/shared/contracts/parameter-sets';

/** What changed and why, of a draft. */
export function NoteDialog({ of, note, onClose }: { of: VersionRef; note: string; onClose: () => void }) {
  const [text, setText] = useState(note);
  const patch = usePatchVersion(of);
  const parsed = noteSchema.safeParse(text);
  const problem = parsed.success ? undefined : parsed.error.issues[0]?.message;
  const submit = async () => {
    if (!parsed.success) return;
    try {
      await patch.mutateAsync({ note: parsed.data });
      onClose();
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <Dialog
      open
      title={`Note of version ${of.number}`}
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button label="Save" kind="primary" busy={patch.isPending} onPress={() => void submit()} />
        </>
      }
    >
      {patch.isError ? (
        <Notice tone="vermilion" urgent title="Not saved">
          {messageOf(patch.error)}
        </Notice>
      ) : null}
      <Field
        label="What changed and why"
        value={text}
        onChangeText={setText}
        error={problem}
        multiline
        required
      />
    </Dialog>
  );
}

import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { messageOf } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { usePatchRecording } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import type { Recording } from '@/shared/contracts/recordings';

/** What the people who drove want the others to know. */
export function NotesCard({ recording }: { recording: Recording }) {
  const mayWrite = useCan('recording:write');
  const patch = usePatchRecording(recording.id);
  const toast = useToast();
  const [draft, setDraft] = useState<string | null>(null);
  const save = async () => {
    const before = recording.notes;
    try {
      await patch.mutateAsync({ notes: draft ?? '' });
      setDraft(null);
      toast({ message: 'Notes saved.', undo: () => patch.mutate({ notes: before }) });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  const edit = (
    <Button label="Edit notes" icon="edit" iconOnly kind="plain" onPress={() => setDraft(recording.notes)} />
  );
  if (draft === null)
    return (
      <Card title="Notes" action={mayWrite ? edit : undefined}>
        <Text tone={recording.notes ? 'ink' : 'soft'}>{recording.notes || 'None.'}</Text>
      </Card>
    );
  return (
    <Card title="Notes">
      <Field
        label="Notes"
        labelHidden
        multiline
        autoFocus
        maxLength={2000}
        value={draft}
        onChangeText={setDraft}
      />
      <View style={{ flexDirection: 'row', justifyContent: 'flex-end', gap: space.s }}>
        <Button label="Cancel" onPress={() => setDraft(null)} />
        <Button label="Save" kind="primary" busy={patch.isPending} onPress={() => void save()} />
      </View>
    </Card>
  );
}

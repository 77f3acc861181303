import { router } from 'expo-router';
import { View } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { TypedConfirm } from '@/components/ui/TypedConfirm';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { useDeleteRecording } from '@/hooks/recordings';
import type { Recording } from '@/shared/contracts/recordings';
import { formatBytes } from '@/shared/format';

/** Deleting cannot be undone: it says what goes, and wants the name typed. */
export function DeleteDialog({ recording, onClose }: { recording: Recording; onClose: () => void }) {
  const remove = useDeleteRecording();
  const toast = useToast();
  const bytes = recording.files.reduce((sum, file) => sum + file.bytes, 0);
  const confirm = async () => {
    try {
      await remove.mutateAsync(recording.id);
      router.replace('/recordings');
      toast({ message: `${recording.name} is deleted.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <TypedConfirm
      name={recording.name}
      title={`Delete ${recording.name}?`}
      message="This cannot be undone. It takes with it:"
      confirmLabel="Delete the recording"
      busy={remove.isPending}
      error={remove.error}
      onConfirm={() => void confirm()}
      onClose={onClose}
    >
      <View role="list" style={{ gap: space.xs }}>
        {[
          `the ${recording.files.length} raw files as uploaded, ${formatBytes(bytes)} in all`,
          'the decoded channels and the health report',
          'every run over this recording, with its solution and innovations',
        ].map((line) => (
          <View key={line} role="listitem">
            <Figures variant="body">{`·  ${line}`}</Figures>
          </View>
        ))}
      </View>
    </TypedConfirm>
  );
}

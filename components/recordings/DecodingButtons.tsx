import { Button } from '@/components/ui/Button';
import { useToast } from '@/components/ui/ToastProvider';
import { useMapRecording } from '@/hooks/recordings';
import { useStopDecoding } from '@/hooks/recording-files';
import type { Recording } from '@/shared/contracts/recordings';

/** Stops what is under way. The files stay. */
export function StopDecoding({ id }: { id: string }) {
  const toast = useToast();
  const stop = useStopDecoding(id);
  const press = () =>
    stop.mutate(undefined, { onError: (error) => toast({ message: error.message, tone: 'ochre' }) });
  return <Button label="Stop decoding" onPress={press} busy={stop.isPending} />;
}

/** Decodes the kept files once more, by the map they had. */
export function DecodeAgain({ recording }: { recording: Pick<Recording, 'id' | 'channelMap'> }) {
  const toast = useToast();
  const again = useMapRecording(recording.id);
  const press = () =>
    again.mutate(recording.channelMap ?? {}, {
      onError: (error) => toast({ message: error.message, tone: 'ochre' }),
    });
  return <Button label="Decode again" kind="primary" onPress={press} busy={again.isPending} />;
}

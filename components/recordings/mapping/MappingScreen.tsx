import { router } from 'expo-router';
import { recordingPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { NoPermission } from '@/components/ui/NoPermission';
import { SkeletonList } from '@/components/ui/Skeleton';
import { useMapRecording, useRecording } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import type { ChannelMap, Recording } from '@/shared/contracts/recordings';
import { ProblemsCard } from '../ProblemsCard';
import { MappingForm } from './MappingForm';

/** Says what a file's columns mean, for files that do not say it themselves or said it wrongly. */
export function MappingScreen({ id }: { id: string }) {
  const mayWrite = useCan('recording:write');
  const recording = useRecording(id);
  const map = useMapRecording(id);
  const send = async (given: ChannelMap) => {
    await map.mutateAsync(given);
    router.replace(recordingPath(id));
  };
  return (
    <Screen title="Map the columns" subtitle={recording.data?.name} back={recordingPath(id)} width="page">
      {mayWrite ? (
        <Body recording={recording} onSubmit={send} />
      ) : (
        <NoPermission message="Viewers read; an engineer, approver or admin maps columns." />
      )}
    </Screen>
  );
}

interface BodyProps {
  recording: ReturnType<typeof useRecording>;
  onSubmit: (map: ChannelMap) => Promise<unknown>;
}

function Body({ recording, onSubmit }: BodyProps) {
  if (recording.isPending) return <SkeletonList label="the files" rows={2} height={200} />;
  if (recording.isError)
    return (
      <ErrorState
        title="The files cannot be shown"
        error={recording.error}
        onRetry={() => void recording.refetch()}
      />
    );
  const loaded: Recording = recording.data;
  if (loaded.previews.length === 0)
    return (
      <EmptyState
        icon="file"
        title="No rows to show yet"
        message="The files have not been read so far. Come back when decoding has begun."
      />
    );
  return (
    <>
      {loaded.status === 'rejected' ? (
        <ProblemsCard title="What stopped the intake" tone="ochre" problems={loaded.problems} />
      ) : null}
      <MappingForm recording={loaded} onSubmit={onSubmit} />
    </>
  );
}

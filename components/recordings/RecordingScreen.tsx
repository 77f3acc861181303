import { router } from 'expo-router';
import { useRef, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { benchPath, mappingPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { NoiseLink } from '@/components/noise/NoiseLink';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { Progress } from '@/components/ui/Progress';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { isUnderWay, useRecording } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import type { Recording } from '@/shared/contracts/recordings';
import { ChannelsCard } from './ChannelsCard';
import { DecodeAgain, StopDecoding } from './DecodingButtons';
import { DeleteDialog } from './DeleteDialog';
import { DownloadsCard } from './DownloadsCard';
import { EditDialog } from './EditDialog';
import { FactsCard } from './FactsCard';
import { FilesCard } from './FilesCard';
import { Health, Problems, RemediesCard } from './RemediesCard';
import { NotesCard } from './NotesCard';
import { ProblemsCard } from './ProblemsCard';
import { sourceLine } from './RecordingCard';
import { StripBox } from './StripBox';

/** One recording: what it looks like, what it is good for, where it came from. */
export function RecordingScreen({ id }: { id: string }) {
  const { wide } = useBreakpoint();
  const recording = useRecording(id);
  if (recording.isPending)
    return (
      <Screen title="Recording" back={wide ? undefined : '/recordings'}>
        <SkeletonList label="the recording" rows={2} height={160} />
      </Screen>
    );
  if (recording.isError)
    return (
      <Screen title="Recording" back="/recordings">
        <ErrorState
          title="This recording cannot be shown"
          error={recording.error}
          onRetry={() => void recording.refetch()}
        />
      </Screen>
    );
  return <Loaded key={id} recording={recording.data} />;
}

function Loaded({ recording }: { recording: Recording }) {
  const { wide, extraWide } = useBreakpoint();
  const [focus, setFocus] = useState<readonly [number, number] | null>(null);
  const plots = useRef<View>(null);
  const show = (interval: readonly [number, number]) => {
    setFocus([...interval]); // a new pair, so that the same finding can be shown again
    const element = plots.current as unknown;
    if (typeof HTMLElement !== 'undefined' && element instanceof HTMLElement)
      element.scrollIntoView({ block: 'nearest' });
  };
  return (
    <Screen
      title={recording.name}
      subtitle={<Figures tone="soft">{sourceLine(recording)}</Figures>}
      back={wide ? undefined : '/recordings'}
      actions={<Actions recording={recording} />}
    >
      {recording.strip ? (
        <Card style={styles.strip}>
          <StripBox strip={recording.strip} height={wide ? 120 : 104} />
        </Card>
      ) : null}
      <View style={extraWide ? styles.columns : styles.stack}>
        <View style={extraWide ? styles.main : styles.stack}>
          <State recording={recording} />
          {recording.health ? <Health recording={recording} health={recording.health} onShow={show} /> : null}
          <RemediesCard recording={recording} />
          {recording.status === 'ready' && recording.startS !== null && recording.endS !== null ? (
            <View ref={plots}>
              <ChannelsCard
                recordingId={recording.id}
                extentS={[recording.startS, recording.endS]}
                hasVelocity={recording.health?.gnss.hasVelocity ?? false}
                focus={focus}
              />
            </View>
          ) : null}
        </View>
        <View style={extraWide ? styles.side : styles.stack}>
          <NotesCard recording={recording} />
          <FactsCard recording={recording} />
          {recording.status === 'ready' ? <NoiseLink recordingId={recording.id} /> : null}
          <FilesCard files={recording.files} />
          {recording.status === 'ready' ? <DownloadsCard recording={recording} /> : null}
        </View>
      </View>
    </Screen>
  );
}

function Actions({ recording }: { recording: Recording }) {
  const [open, setOpen] = useState<'edit' | 'delete' | null>(null);
  const { extraWide } = useBreakpoint();
  const [mayWrite, mayDelete] = [useCan('recording:write'), useCan('recording:delete')];
  const close = () => setOpen(null);
  const mapped = recording.status === 'ready' || recording.status === 'rejected';
  return (
    <>
      {mayWrite ? (
        <Button label="Name and vehicle" icon="edit" iconOnly={!extraWide} onPress={() => setOpen('edit')} />
      ) : null}
      {mayWrite && mapped && recording.previews.length > 0 ? (
        <Button
          label="Correct the mapping"
          icon="map"
          iconOnly={!extraWide}
          onPress={() => router.push(mappingPath(recording.id))}
        />
      ) : null}
      {mayDelete ? (
        <Button label="Delete" icon="delete" iconOnly kind="danger" onPress={() => setOpen('delete')} />
      ) : null}
      {recording.status === 'ready' && recording.health?.gnss.epochs !== 0 ? (
        <Button
          label="Open in bench"
          kind="primary"
          icon="bench"
          onPress={() => router.push(benchPath(recording.id))}
        />
      ) : null}
      {open === 'edit' ? <EditDialog recording={recording} onClose={close} /> : null}
      {open === 'delete' ? <DeleteDialog recording={recording} onClose={close} /> : null}
    </>
  );
}

const wasStopped = ({ problems }: Recording) => problems.some(({ code }) => code === 'stopped');

/** What stands between this recording and its use, if anything does. */
function State({ recording }: { recording: Recording }): ReactNode {
  const mayWrite = useCan('recording:write');
  if (isUnderWay(recording))
    return (
      <Card>
        <Progress
          label={recording.status === 'uploaded' ? 'Waiting for a free worker' : 'Decoding'}
          value={recording.status === 'uploaded' ? undefined : recording.progress}
        />
        <Text variant="label" tone="soft">
          It goes on without you: leave this page if you like.
        </Text>
        {mayWrite ? (
          <View style={styles.buttons}>
            <StopDecoding id={recording.id} />
          </View>
        ) : null}
      </Card>
    );
  if (recording.status === 'needs-mapping')
    return (
      <ProblemsCard title="Say what the columns mean" tone="ochre" problems={recording.problems}>
        {mayWrite ? (
          <Button
            label="Map the columns"
            kind="primary"
            icon="map"
            onPress={() => router.push(mappingPath(recording.id))}
          />
        ) : (
          <Text variant="label" tone="soft">
            An engineer, approver or admin maps the columns.
          </Text>
        )}
      </ProblemsCard>
    );
  if (recording.status === 'rejected')
    return (
      <Problems
        recording={recording}
        title={wasStopped(recording) ? 'Decoding was stopped' : 'The files could not be used'}
        tone="vermilion"
      >
        {mayWrite ? (
          <View style={styles.buttons}>
            {wasStopped(recording) ? <DecodeAgain recording={recording} /> : null}
            {recording.previews.length > 0 && !wasStopped(recording) ? (
              <Button
                label="Correct the mapping"
                icon="map"
                onPress={() => router.push(mappingPath(recording.id))}
              />
            ) : null}
            <Button
              label="Upload the mended files"
              icon="upload"
              onPress={() => router.push('/recordings/upload')}
            />
          </View>
        ) : null}
      </Problems>
    );
  return null;
}

const styles = StyleSheet.create({
  strip: { paddingHorizontal: space.m, paddingVertical: space.m },
  stack: { gap: space.l },
  buttons: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s },
  columns: { flexDirection: 'row', gap: space.l, alignItems: 'flex-start' },
  main: { flex: 3, gap: space.l, minWidth: 0 },
  side: { flex: 2, gap: space.l, minWidth: 0 },
});

import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { itemsOf, useRecordings } from '@/hooks/recordings';
import { RecordingList } from './RecordingList';
import { RecordingScreen } from './RecordingScreen';
import { UploadButton } from './UploadButton';

/** The phone's list of recordings; on wide screens the list stands beside the newest one. */
export function RecordingsScreen() {
  const { wide } = useBreakpoint();
  const newest = itemsOf(useRecordings().data)[0];
  if (wide && newest) return <RecordingScreen id={newest.id} />;
  return (
    <Screen title="Recordings" actions={<UploadButton />}>
      <RecordingList />
    </Screen>
  );
}

import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { RecordingList } from './RecordingList';
import { RecordingScreen } from '@/components/layout/fetched-screens';
import { useFirstRecording } from './use-first-recording';
import { UploadButton } from './UploadButton';

/** The phone's list of recordings; on wide screens the list stands beside the newest one. */
export function RecordingsScreen() {
  const { wide } = useBreakpoint();
  const first = useFirstRecording();
  if (wide && first) return <RecordingScreen id={first} />;
  return (
    <Screen title="Recordings" actions={<UploadButton />}>
      <RecordingList />
    </Screen>
  );
}

import { usePathname } from 'expo-router';
import { MasterDetail } from '@/components/layout/MasterDetail';
import { usePathId } from '@/components/layout/use-path-id';
import { RecordingList } from './RecordingList';
import { useFirstRecording } from './use-first-recording';
import { UploadButton } from './UploadButton';

/** The list beside whatever recording is open. */
export function RecordingsLayout() {
  const path = usePathname();
  const opened = usePathId('recordings');
  const first = useFirstRecording();
  const whole = path === '/recordings/upload' || path.endsWith('/mapping') || path.endsWith('/noise');
  return (
    <MasterDetail
      title="Recordings"
      action={<UploadButton />}
      list={<RecordingList currentId={opened ?? first} />}
      showList={!whole && first !== undefined}
    />
  );
}

import { router } from 'expo-router';
import { Button } from '@/components/ui/Button';
import { useCan } from '@/hooks/session';

/** Leads to the upload page; absent for those who may not upload. */
export function UploadButton() {
  if (!useCan('recording:write')) return null;
  return (
    <Button label="Upload" kind="primary" icon="upload" onPress={() => router.push('/recordings/upload')} />
  );
}

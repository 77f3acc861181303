import { Button } from '@/components/ui/Button';
import { messageOf } from '@/components/ui/ErrorState';
import { useToast } from '@/components/ui/ToastProvider';
import { useCan } from '@/hooks/session';
import { useVerify } from '@/hooks/verification';
import type { VersionRef } from '@/hooks/versions';
import type { Verification } from '@/shared/contracts/verification';

/** Starts the runs that are missing or out of date; nothing for those who may not, or where nothing is to be done. */
export function VerifyButton({ of, verification }: { of: VersionRef; verification: Verification }) {
  const verify = useVerify(of);
  const toast = useToast();
  const mayRun = useCan('run:create');
  const { counts, state } = verification;
  const due = counts.notVerified + counts.outOfDate + counts.failed;
  if (!mayRun || state === 'going' || due === 0) return null;
  const start = async () => {
    try {
      await verify.mutateAsync();
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  return (
    <Button
      label={due < counts.cells ? `Verify ${due} ${due === 1 ? 'cell' : 'cells'}` : 'Verify'}
      kind="primary"
      icon="play"
      busy={verify.isPending}
      onPress={() => void start()}
    />
  );
}

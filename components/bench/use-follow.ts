/** Following somebody else's bench: their runs and values are shown here as they come. */
import { useEffect, useState } from 'react';
import { useToast } from '@/components/ui/ToastProvider';
import { useBenchCompany } from '@/hooks/use-bench-company';
import { useRun } from '@/hooks/runs';
import type { BenchVisitor } from '@/shared/contracts/live';
import type { Bench } from './use-bench';

export interface Followed {
  benchId: string;
  name: string;
}

export interface Company {
  companions: BenchVisitor[];
  follow: (companion: BenchVisitor) => void;
  stop: () => void;
}

/** Why nothing can be changed while somebody is followed. */
export const followWords = ({ name }: Followed): string =>
  `You follow ${name}: what they set is shown here. Stop following to go on from it yourself.`;

export const useFollowed = () => useState<Followed | null>(null);

/** Keeps `bench` on the newest run of the one who is followed, until they leave. */
export function useFollow(
  bench: Bench,
  followed: Followed | null,
  setFollowed: (next: Followed | null) => void,
): Company {
  const toast = useToast();
  const companions = useBenchCompany(bench.start.recording.id, bench.id);
  const { adopt, settle } = bench;
  const current = companions.find(({ benchId }) => benchId === followed?.benchId);
  const run = useRun(current?.runId ?? null).data;
  useEffect(() => {
    if (followed && run) adopt(run);
  }, [followed, run, adopt]);
  const gone = followed !== null && !current;
  useEffect(() => {
    if (!gone) return;
    setFollowed(null);
    settle();
    toast({ message: `${followed.name} has closed the bench: you go on from their last values.` });
  }, [gone, followed, setFollowed, settle, toast]);
  return {
    companions,
    follow: ({ benchId, name }) => setFollowed({ benchId, name }),
    stop: () => {
      setFollowed(null);
      settle();
    },
  };
}

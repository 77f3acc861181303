import { useMemo } from 'react';
import type { Origin } from '@/shared/charts/figure/sheet';
import { useLive } from '@/hooks/use-live-run';
import { useSummary, type Bench } from './use-bench';

/** For footers and file names of saved charts: the recording, the run on screen, its engine. */
export function useRunOrigin(bench: Bench): Origin {
  const recording = bench.start.recording.name;
  const run = useLive(bench.live, (state) => state.runId);
  const engineVersion = useSummary(bench)?.engineVersion ?? null;
  return useMemo(() => ({ recording, run, engineVersion }), [recording, run, engineVersion]);
}

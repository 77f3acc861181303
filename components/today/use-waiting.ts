import { useState } from 'react';
import { useParameterSets } from '@/hooks/parameter-sets';
import { isUnderWay, itemsOf, NOT_READY, useFreshReady, useRecordings } from '@/hooks/recordings';
import { useRuns } from '@/hooks/runs';
import { useSession } from '@/hooks/session';
import { waitingFor, type Waiting } from './waiting';

const MOST_RUNS = 20;

/** Everything that waits, out of the lists that hold it; `error` of the first that failed. */
export function useWaiting(): {
  waiting: Waiting[];
  pending: boolean;
  error: Error | null;
  retry: () => void;
} {
  const { user, workspace } = useSession();
  const [now] = useState(() => new Date());
  const recordings = useRecordings(NOT_READY);
  useFreshReady(itemsOf(recordings.data).filter(isUnderWay).length);
  const inReview = useParameterSets({ state: 'in-review' });
  const returned = useParameterSets({ state: 'returned' });
  const runs = useRuns({ state: 'failed', limit: MOST_RUNS });
  const sets = new Map([inReview, returned].flatMap(({ data }) => itemsOf(data)).map((set) => [set.id, set]));
  const all = [recordings, inReview, returned, runs];
  return {
    waiting: waitingFor({
      recordings: itemsOf(recordings.data),
      sets: [...sets.values()],
      runs: runs.data?.items ?? [],
      person: { name: user.name, role: workspace.role },
      now,
    }),
    pending: all.some(({ isPending }) => isPending),
    error: all.find(({ isError }) => isError)?.error ?? null,
    retry: () => all.filter(({ isError }) => isError).forEach(({ refetch }) => void refetch()),
  };
}

/** Finer points of the runs on the bench where the charts are zoomed: they take the place of the coarse ones as they come. */
import { useEffect, useMemo, useState } from 'react';
import type { ChartGroup } from '@/components/charts/chart-group';
import { useDetailState, useSettledView } from '@/components/charts/use-detail';
import { splicedRun } from '@/hooks/finer/splice';
import { useTiles } from '@/hooks/finer/use-tiles';
import type { LiveController } from '@/hooks/live/live-controller';
import type { RunData } from '@/hooks/live/run-data';
import { useLive } from '@/hooks/use-live-run';
import { runTiles } from '@/hooks/runs';
import type { Ghost } from './ghost-store';

/** What is drawn of a run: its own curves, or those with finer pieces in them. */
export class FinerCurves {
  private spliced: readonly RunData[] = [];

  /** A stable function: charts are made once and ask at each drawing. */
  of = (data: RunData | null): RunData | null =>
    (data && this.spliced.find(({ runId }) => runId === data.runId)) ?? data;

  set(spliced: readonly (RunData | null)[]): void {
    this.spliced = spliced.filter((one) => one !== null);
  }
}

/** The live run once it is complete, and the baseline's ghost behind it. */
export function useFinerCurves(live: LiveController, ghost: Ghost | null, group: ChartGroup): FinerCurves {
  const [curves] = useState(() => new FinerCurves());
  const runId = useLive(live, (state) => (state.phase === 'done' ? state.summaryRunId : null));
  const { current } = live.data;
  const data = runId !== null && current?.runId === runId && current.complete ? current : null;
  const run = useFinerRun(data, group);
  const behind = useFinerRun(ghost && ghost.data !== data ? ghost.data : null, group);
  useDetailState(group, {
    fetching: run.fetching || behind.fetching,
    failed: run.error !== null || behind.error !== null,
  });
  useEffect(() => {
    curves.set([run.spliced, behind.spliced]);
    group.invalidate();
  }, [curves, group, run.spliced, behind.spliced]);
  return curves;
}

function useFinerRun(data: RunData | null, group: ChartGroup) {
  const view = useSettledView(group);
  const id = data?.runId ?? null;
  const source = useMemo(() => (id === null ? null : runTiles(id)), [id]);
  const { pieces, fetching, error } = useTiles(source, view, group.viewport.whole);
  const spliced = useMemo(
    () => (data && pieces.length > 0 ? splicedRun(data, pieces) : null),
    [data, pieces],
  );
  return { spliced, fetching, error };
}

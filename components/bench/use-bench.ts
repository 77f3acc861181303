/** The state of an open bench: what is set, its history, its live run, the baseline and its ghost, the shared time axis. */
import { useCallback, useEffect, useMemo, useState, useSyncExternalStore } from 'react';
import type { Outage, Run, RunSummary } from '@/shared/contracts/runs';
import { ChartGroup } from '@/components/charts/chart-group';
import type { LiveController } from '@/hooks/live/live-controller';
import { useLive, useLiveRun } from '@/hooks/use-live-run';
import { pinnedName, type Baseline, type BenchConfig, type BenchStart, type RunOptions } from './bench-start';
import type { CurvesSource } from './curves';
import { GhostStore, ghostKey, type Ghost } from './ghost-store';
import { makeId } from './make-id';
import { commit, redo, startHistory, undo, type History } from './history';
import { useFinerCurves, type FinerCurves } from './use-finer-curves';
import { writePath, type ParameterValue } from '@/shared/parameters/parameter-path';

export interface Bench {
  /** Its runs are known by it. */
  id: string;
  start: BenchStart;
  config: BenchConfig;
  /** `settled` false: still dragging. */
  setParameter: (path: string, value: ParameterValue, settled: boolean) => void;
  /** Several at once, as one step. */
  setParameters: (changes: readonly { path: string; value: ParameterValue }[]) => void;
  setOutages: (outages: readonly Outage[], settled: boolean) => void;
  setOptions: (options: RunOptions) => void;
  canUndo: boolean;
  canRedo: boolean;
  undo: () => void;
  redo: () => void;
  live: LiveController;
  group: ChartGroup;
  source: CurvesSource;
  baseline: Baseline;
  /** The baseline's figures for the same windows; null while they are not known. */
  baselineSummary: RunSummary | null;
  pinCurrent: () => void;
  /** Shows somebody else's run and takes over what they set: one step of the history, however many runs follow. */
  adopt: (run: Run) => void;
  /** Ends that step. */
  settle: () => void;
  /** Why nothing can be changed; null: all can. */
  locked: string | null;
}

/** After the last change of windows or parameters the ghost is computed anew, ms. */
const GHOST_DELAY_MS = 350;

/** `shown`: the finished run to show to a person who may start none. */
export function useBench(start: BenchStart, locked: string | null, shown: Run | null): Bench {
  const [history, setHistory] = useState<History<BenchConfig>>(() =>
    startHistory(
      shown
        ? {
            parameters: shown.parameters,
            outages: shown.outages,
            options: { smooth: shown.smooth, errorBudget: shown.errorBudget },
          }
        : start.config,
    ),
  );
  const [baseline, setBaseline] = useState<Baseline>(start.baseline);
  const live = useLiveRun();
  const { strip } = start.recording;
  const [group] = useState(() => new ChartGroup([strip.startS, strip.endS]));
  const config = history.present;
  const settled = history.open === null;

  const [id] = useState(makeId);
  useOwnRuns(live, id, start.recording.id, config, settled, locked, shown);
  const ghosts = useGhost(live, start.recording.id, config, settled, baseline, locked);
  const ghost = useSyncExternalStore(ghosts.subscribe, ghosts.getSnapshot);
  useEffect(() => live.subscribeData(() => group.invalidate()), [live, group]);
  useEffect(() => group.invalidate(), [config.outages, ghost, group]);

  const finer = useFinerCurves(live, ghost, group);
  const source = useMemo<CurvesSource>(() => curvesSource(live, ghosts, finer), [live, ghosts, finer]);
  const change = useCallback((key: string, wasSettled: boolean, make: (old: BenchConfig) => BenchConfig) => {
    setHistory((old) => commit(old, make(old.present), key, wasSettled));
  }, []);
  const setParameter = useCallback(
    (path: string, value: ParameterValue, wasSettled: boolean) =>
      change(path, wasSettled, (old) => ({ ...old, parameters: writePath(old.parameters, path, value) })),
    [change],
  );
  const setParameters = useCallback<Bench['setParameters']>(
    (changes) =>
      change(changes.map(({ path }) => path).join(), true, (old) => ({
        ...old,
        parameters: changes.reduce((made, { path, value }) => writePath(made, path, value), old.parameters),
      })),
    [change],
  );
  const setOutages = useCallback(
    (outages: readonly Outage[], wasSettled: boolean) =>
      change('windows', wasSettled, (old) => ({ ...old, outages })),
    [change],
  );
  const setOptions = useCallback(
    (options: RunOptions) => change('options', true, (old) => ({ ...old, options })),
    [change],
  );
  const pinCurrent = useCallback(() => {
    const { summaryRequest, summaryRunId, phase } = live.state;
    if (phase !== 'done' || !summaryRequest || !summaryRunId) return;
    setBaseline({ name: pinnedName(null), parameters: config.parameters, runId: summaryRunId });
  }, [live, config.parameters]);

  const adopt = useCallback(
    (run: Run) => {
      const { parameters, outages, smooth, errorBudget } = run;
      change('followed', false, () => ({ parameters, outages, options: { smooth, errorBudget } }));
      void live.show(run);
    },
    [change, live],
  );

  return {
    id,
    start,
    config,
    setParameter,
    setParameters,
    setOutages,
    setOptions,
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
    undo: useCallback(() => setHistory(undo), []),
    redo: useCallback(() => setHistory(redo), []),
    live,
    group,
    source,
    baseline,
    baselineSummary: comparable(ghost, baseline, config),
    pinCurrent,
    adopt,
    settle: useCallback(() => setHistory((old) => ({ ...old, open: null })), []),
    locked,
  };
}

/** The newest finished summary; kept while a newer run is on its way. */
export const useSummary = (bench: Bench): RunSummary | null => useLive(bench.live, (state) => state.summary);

function comparable(ghost: Ghost | null, baseline: Baseline, config: BenchConfig): RunSummary | null {
  return ghost && ghost.key === ghostKey(baseline.parameters, config.outages, config.options.smooth)
    ? ghost.summary
    : null;
}

function useOwnRuns(
  live: LiveController,
  benchId: string,
  recordingId: string,
  config: BenchConfig,
  settled: boolean,
  locked: string | null,
  shown: Run | null,
): void {
  useEffect(() => {
    if (shown) void live.show(shown);
  }, [live, shown]);
  useEffect(() => {
    if (locked !== null) return;
    const { parameters, outages, options } = config;
    live.change({ recordingId, parameters, outages: [...outages], ...asked(options), benchId }, settled);
  }, [live, recordingId, config, settled, benchId, locked]);
}

/** Only what is wanted is asked for. */
const asked = ({ smooth, errorBudget }: RunOptions) => ({
  smooth: smooth || undefined,
  errorBudget: errorBudget || undefined,
});

function useGhost(
  live: LiveController,
  recordingId: string,
  config: BenchConfig,
  settled: boolean,
  baseline: Baseline,
  locked: string | null,
): GhostStore {
  const [ghosts] = useState(() => new GhostStore());
  const [benchId] = useState(makeId);
  const second = useLiveRun();
  useEffect(() => {
    const key = ghostKey(baseline.parameters, config.outages, config.options.smooth);
    const adopt = () => ghosts.adopt(live, key) || ghosts.adopt(second, key);
    if (adopt()) return;
    const stop = [live.subscribe(adopt), second.subscribe(adopt)];
    // The bench's own run brings it where its parameters are the baseline's.
    const own = ghostKey(config.parameters, config.outages, config.options.smooth) === key;
    const timer =
      own || !settled || locked !== null
        ? null
        : setTimeout(() => {
            const { parameters } = baseline;
            const { smooth } = asked(config.options);
            second.change({ recordingId, parameters, outages: [...config.outages], smooth, benchId });
          }, GHOST_DELAY_MS);
    return () => {
      if (timer) clearTimeout(timer);
      stop.forEach((unsubscribe) => unsubscribe());
    };
  }, [ghosts, live, second, baseline, config, settled, recordingId, benchId, locked]);
  return ghosts;
}

function curvesSource(live: LiveController, ghosts: GhostStore, finer: FinerCurves): CurvesSource {
  return {
    curves: () => {
      const { current, previous } = live.data;
      const ghost = ghosts.current?.data ?? null;
      return { current: finer.of(current), previous, ghost: ghost === current ? null : finer.of(ghost) };
    },
    summary: () => live.state.summary,
  };
}

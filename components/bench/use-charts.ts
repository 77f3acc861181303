/** The chart contents of a bench, made once. */
import { useEffect, useMemo, useRef } from 'react';
import type { TrackContent } from '@/shared/charts/model/track-drawing';
import { useDisplayUnits } from '@/hooks/preferences';
import { useRecordingSeries } from '@/hooks/recordings';
import { useGnssOnlyTrack, useRunCurves } from '@/hooks/runs';
import { useLive } from '@/hooks/use-live-run';
import { formatNumber } from '@/shared/format';
import { makeTimeCharts, type TimeCharts } from './chart-views';
import { stateRowAt } from './curves';
import {
  fixTrack,
  gnssOnlyTrack,
  isCoasting,
  referenceTrack,
  smoothedTrack,
  stateTrack,
} from './track-content';
import type { Bench } from './use-bench';

const FIX_POINTS = 4000;

export function useTimeCharts(bench: Bench): TimeCharts {
  const windows = useLatest(bench.config.outages);
  const units = useDisplayUnits();
  return useMemo(() => makeTimeCharts(bench.source, windows, units), [bench.source, windows, units]);
}

/** The plan view's content; fixes and the GNSS-only track come from the recording. */
export function useTrackContent(bench: Bench): TrackContent {
  const id = bench.start.recording.id;
  const fixes = useRecordingSeries(id, { channels: ['gnss_north', 'gnss_east'], points: FIX_POINTS }).data;
  const gnssOnly = useGnssOnlyTrack(id).data;
  const windows = useLatest(bench.config.outages);
  const { source } = bench;
  const { group } = bench;
  const smoothed = useSmoothedCurves(bench);
  useEffect(() => group.invalidate(), [group, fixes, gnssOnly, smoothed]);
  return useMemo<TrackContent>(() => {
    // While a newer run has drawn little, the one before still shows the whole track.
    const run = () => {
      const { current, previous } = source.curves();
      return previous && current && current.progress < 0.98 ? previous : current;
    };
    return {
      solution: () => stateTrack(run()),
      isCoasting: (timeS) => isCoasting(windows(), timeS),
      ghost: () => stateTrack(source.curves().ghost),
      smoothed: () => smoothedTrack(smoothed && run()?.runId === smoothed.runId ? smoothed : null),
      fixes: () => fixTrack(fixes, gnssOnly, run()),
      gnssOnly: () => gnssOnlyTrack(gnssOnly, run()),
      reference: () => referenceTrack(run()),
      pointAt: (timeS) => pointAt(run(), timeS),
      sentence: () => trackSentence(run()),
    };
  }, [source, fixes, gnssOnly, smoothed, windows]);
}

/** Frames carry no smoothed track: it is fetched when a run that made one is done. */
function useSmoothedCurves({ live }: Bench) {
  const runId = useLive(live, (state) =>
    state.phase === 'done' && state.summaryRequest?.smooth ? state.summaryRunId : null,
  );
  return useRunCurves(runId, SMOOTHED_POINTS).data ?? null;
}

const SMOOTHED_POINTS = 3000;

function pointAt(data: ReturnType<Bench['source']['curves']>['current'], timeS: number) {
  if (!data) return null;
  const row = stateRowAt(data, timeS);
  if (row < 0) return null;
  const at = (column: 'north_m' | 'east_m' | 'sigma_n_m' | 'sigma_e_m' | 'cov_ne_m2') =>
    data.column('state', column)[row]!;
  return {
    timeS,
    northM: at('north_m'),
    eastM: at('east_m'),
    sigmaN: at('sigma_n_m'),
    sigmaE: at('sigma_e_m'),
    covNE: at('cov_ne_m2'),
  };
}

function trackSentence(data: ReturnType<Bench['source']['curves']>['current']): string {
  const track = stateTrack(data);
  let metres = 0;
  for (let i = 1; i < track.length; i++)
    metres += Math.hypot(track.north(i) - track.north(i - 1), track.east(i) - track.east(i - 1));
  return track.length > 1 ? `About ${formatNumber(metres, 2)} m long.` : 'No track yet.';
}

/** A getter of the newest `value` that stays the same function. */
function useLatest<T>(value: T): () => T {
  const held = useRef(value);
  useEffect(() => {
    held.current = value;
  });
  return useMemo(() => () => held.current, []);
}

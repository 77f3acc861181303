/** Where a dragged edge comes to rest: at another window's edge, at a whole second, at the GNSS epoch nearest to it. Pure. */
import { lowerBound } from '@/shared/charts/model/series';
import type { WindowLimits } from './window-model';

export interface SnapInput {
  timeS: number;
  /** Steps of the ruler, s: 1, or 0.1 for fine work; 0: nothing is snapped. */
  stepS: number;
  /** Windows whose edges attract, without the one that is dragged. */
  others: readonly WindowLimits[];
  /** How near an edge attracts, s. */
  reachS: number;
  /** Times of the GNSS fixes, ascending; empty where they are not known. */
  epochsS: ArrayLike<number>;
}

/** Half a second beside a whole one no fix is meant by it. */
const EPOCH_REACH_S = 0.5;

/** The time that is meant by `timeS`. A millisecond is kept: finer is noise of the arithmetic. */
export function snapTime({ timeS, stepS, others, reachS, epochsS }: SnapInput): number {
  if (!(stepS > 0)) return round(timeS);
  const edge = nearest(
    others.flatMap(({ startS, endS }) => [startS, endS]),
    timeS,
    reachS,
  );
  if (edge !== null) return edge;
  const stepped = Math.round(timeS / stepS) * stepS;
  return round(nearestEpoch(epochsS, stepped, Math.min(EPOCH_REACH_S, stepS / 2)) ?? stepped);
}

function nearest(times: readonly number[], timeS: number, reachS: number): number | null {
  let best: number | null = null;
  for (const time of times)
    if (
      Math.abs(time - timeS) <= reachS &&
      (best === null || Math.abs(time - timeS) < Math.abs(best - timeS))
    )
      best = time;
  return best;
}

function nearestEpoch(epochsS: ArrayLike<number>, timeS: number, reachS: number): number | null {
  const at = lowerBound(epochsS, epochsS.length, timeS);
  return nearest(
    [at - 1, at].filter((i) => i >= 0 && i < epochsS.length).map((i) => epochsS[i]!),
    timeS,
    reachS,
  );
}

const round = (value: number) => Math.round(value * 1000) / 1000;

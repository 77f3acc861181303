/** Outage windows laid over the IMU samples: where the solution coasts and at which samples drift is read. */
import type { Outage } from '@/shared/contracts/runs';

/** Drift is reported after these, s, and at each window's end. */
export const DRIFT_AFTER_S = [10, 30, 60, 120] as const;
/** A sample within this of a time counts as at it, s. */
const EPSILON_S = 1e-7;

export interface DriftSample {
  afterS: number;
  sample: number;
}

export interface CoastWindow {
  outage: Outage;
  /** Index in the request. */
  index: number;
  /** Samples in [startS, endS): first and last; first > last where the window holds none. */
  first: number;
  last: number;
  drift: DriftSample[];
}

/** Windows in order of time, for samples `from`… of an IMU time axis. */
export function layWindows(timeS: Float64Array, from: number, outages: readonly Outage[]): CoastWindow[] {
  return outages
    .map((outage, index) => ({ outage, index }))
    .sort((a, b) => a.outage.startS - b.outage.startS)
    .map(({ outage, index }) => {
      const first = Math.max(from, lowerBound(timeS, outage.startS - EPSILON_S));
      const last = lowerBound(timeS, outage.endS - EPSILON_S) - 1;
      return { outage, index, first, last, drift: driftSamples(timeS, outage, first, last) };
    });
}

function driftSamples(timeS: Float64Array, outage: Outage, first: number, last: number): DriftSample[] {
  if (last <= first) return [];
  const duration = outage.endS - outage.startS;
  const complete = last < timeS.length - 1;
  const samples: DriftSample[] = [];
  for (const afterS of DRIFT_AFTER_S) {
    const at = Math.min(last, lowerBound(timeS, outage.startS + afterS + EPSILON_S) - 1);
    const reaches = complete || timeS[last]! >= outage.startS + afterS - EPSILON_S;
    if (afterS <= duration + EPSILON_S && reaches) samples.push({ afterS, sample: at });
  }
  const end = complete ? duration : timeS[last]! - outage.startS;
  if (!samples.some((s) => Math.abs(s.afterS - end) < EPSILON_S)) samples.push({ afterS: end, sample: last });
  return samples;
}

/** First index of increasing values that is not below `value`. */
export function lowerBound(values: Float64Array | Int32Array, value: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Samples at which the coasting solution is compared, in order: kept ones within windows, and drift samples. */
export function comparedSamples(windows: readonly CoastWindow[], kept: Uint8Array): Int32Array {
  const samples = new Set<number>();
  for (const window of windows) {
    for (let k = window.first; k <= window.last; k += 1) if (kept[k] === 1) samples.add(k);
    for (const { sample } of window.drift) samples.add(sample);
  }
  return Int32Array.from([...samples].sort((a, b) => a - b));
}

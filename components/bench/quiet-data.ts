/** Data of the quiet charts: how drift grows over all windows, and how innovations are distributed. Pure. */
import type { RunSummary } from '@/shared/contracts/runs';
import type { RunData } from '@/hooks/live/run-data';
import type { InnovationGroup } from './innovation-charts';

export interface DriftGrowth {
  /** One curve a window: seconds after its start, horizontal error, m. */
  windows: { afterS: number; errorM: number }[][];
  /** Root mean square of the predictions over the windows that last so long: 1σ, and 95 %. */
  predicted: { afterS: number; sigmaM: number; p95M: number }[];
  longestS: number;
}

const STEPS = 60;
/** 95 % of a plane error whose axes are alike: 2.4477 ÷ √2 times its root of summed variances. */
const P95_OVER_SIGMA = 1.7308;

/** Null while nothing has coasted. */
export function driftGrowth(data: RunData | null): DriftGrowth | null {
  if (!data) return null;
  const { length } = data.table('coasting');
  if (length === 0) return null;
  const [time, outage] = [data.column('coasting', 'time_s'), data.column('coasting', 'outage')];
  const [error, sigma] = [
    data.column('coasting', 'horizontal_m'),
    data.column('coasting', 'predicted_horizontal_m'),
  ];
  const windows: { afterS: number; errorM: number; sigmaM: number }[][] = [];
  let index = NaN;
  let startS = 0;
  for (let row = 0; row < length; row++) {
    if (outage[row] !== index) {
      index = outage[row]!;
      startS = time[row]!;
      windows.push([]);
    }
    windows[windows.length - 1]!.push({
      afterS: time[row]! - startS,
      errorM: error[row]!,
      sigmaM: sigma[row]!,
    });
  }
  const longestS = Math.max(...windows.map((window) => window[window.length - 1]!.afterS));
  return { windows: windows.map(thinned), predicted: meanPrediction(windows, longestS), longestS };
}

export interface Distribution {
  /** Bins of equal width; density so that the area is 1. */
  bins: { from: number; to: number; density: number }[];
  count: number;
  /** Accepted values beyond the last bin. */
  beyond: number;
}

const BIN = 0.25;
const EDGE = 4;

/**
 * Innovation ÷ its predicted σ of all accepted fixes, three axes together. Null where the curves hold only the extremes of a
 * long recording: their distribution would say nothing of all.
 */
export function innovationDistribution(
  data: RunData | null,
  group: InnovationGroup,
  summary: RunSummary | null,
): Distribution | null {
  const statistics = summary?.groups.find((one) => one.group === group);
  if (!data || !statistics) return null;
  const rows = data.table(group).length;
  if (rows === 0 || rows < statistics.used + statistics.rejected) return null;
  const { columns } = data.table(group);
  const suffix = group === 'position' ? '_m' : '_m_s';
  const counts = new Array<number>((2 * EDGE) / BIN).fill(0);
  let [count, beyond] = [0, 0];
  for (const axis of ['n', 'e', 'd'])
    for (let row = 0; row < rows; row++) {
      const value = columns[`${axis}${suffix}`]![row]! / columns[`sigma_${axis}${suffix}`]![row]!;
      if (columns.accepted![row] !== 1 || !Number.isFinite(value)) continue;
      count++;
      const bin = Math.floor((value + EDGE) / BIN);
      if (bin >= 0 && bin < counts.length) counts[bin] = counts[bin]! + 1;
      else beyond++;
    }
  const bins = counts.map((one, i) => ({
    from: -EDGE + i * BIN,
    to: -EDGE + (i + 1) * BIN,
    density: count > 0 ? one / (count * BIN) : 0,
  }));
  return { bins, count, beyond };
}

/** Density of the unit normal. */
export const unitNormal = (x: number): number => Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI);

function thinned(window: { afterS: number; errorM: number }[]): { afterS: number; errorM: number }[] {
  const step = Math.max(1, Math.ceil(window.length / STEPS));
  return window.filter((_, i) => i % step === 0 || i === window.length - 1);
}

function meanPrediction(
  windows: { afterS: number; sigmaM: number }[][],
  longestS: number,
): DriftGrowth['predicted'] {
  return Array.from({ length: STEPS + 1 }, (_, step) => {
    const afterS = (longestS * step) / STEPS;
    const squares = windows
      .filter((window) => window[window.length - 1]!.afterS >= afterS - 1e-9)
      .map((window) => sigmaAt(window, afterS) ** 2);
    const sigmaM = Math.sqrt(squares.reduce((sum, square) => sum + square, 0) / Math.max(1, squares.length));
    return { afterS, sigmaM, p95M: sigmaM * P95_OVER_SIGMA };
  });
}

/** Between its rows, which a thinned frame leaves a second apart. */
function sigmaAt(window: { afterS: number; sigmaM: number }[], afterS: number): number {
  const next = window.findIndex((point) => point.afterS >= afterS);
  if (next <= 0) return window[next === 0 ? 0 : window.length - 1]!.sigmaM;
  const [a, b] = [window[next - 1]!, window[next]!];
  return a.sigmaM + ((b.sigmaM - a.sigmaM) * (afterS - a.afterS)) / (b.afterS - a.afterS);
}

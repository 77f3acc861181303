/** The figures of a run as a report gives them. Pure. */
import type { ReportDrift, ReportRun } from '@/shared/contracts/report';
import { DRIFT_TIMES_S } from '@/shared/contracts/requirements';
import type { RunSummary } from '@/shared/contracts/runs';
import { percentile } from '@/shared/math/percentile';

const SAME_S = 1e-6;

/** Drift over all windows at 10, 30, 60 and 120 s, as far as windows last. */
export function driftOf({ outages }: RunSummary): ReportDrift[] {
  return DRIFT_TIMES_S.flatMap((afterS) => {
    const points = outages.flatMap(({ points: all }) =>
      all.filter((point) => Math.abs(point.afterS - afterS) < SAME_S).slice(0, 1),
    );
    if (points.length === 0) return [];
    const drift = points.map(({ horizontalM }) => horizontalM);
    const predictedM = rms(points.map(({ predictedHorizontalM }) => predictedHorizontalM));
    return [
      {
        afterS,
        windows: points.length,
        medianM: percentile(drift, 0.5),
        p95M: percentile(drift, 0.95),
        maximumM: Math.max(...drift),
        predictedM,
        ratio: rms(drift) / predictedM,
      },
    ];
  });
}

/** Error and prediction of each window over the time without GNSS. */
export const windowsOf = ({ outages }: RunSummary): ReportRun['windows'] =>
  outages
    .filter(({ points }) => points.length > 0)
    .map(({ points }) =>
      points.map(({ afterS, horizontalM, predictedHorizontalM }) => ({
        afterS,
        errorM: horizontalM,
        predictedM: predictedHorizontalM,
      })),
    );

/** Of all measurements, %; null where there were none. */
export function rejectedPercent({ groups }: RunSummary): number | null {
  const rejected = groups.reduce((sum, group) => sum + group.rejected, 0);
  const all = groups.reduce((sum, group) => sum + group.used + group.rejected, 0);
  return all > 0 ? (100 * rejected) / all : null;
}

const rms = (values: readonly number[]) =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);

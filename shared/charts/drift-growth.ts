/** Drift of a run's windows as its chart takes it. Pure. */
import type { ReportRun } from '../contracts/report';
import { radius95OverDrms } from './model/chi-square';
import type { DriftGrowthData } from './plots';

/** 95 % of the errors of a round covariance lie below this times their RMS. */
const P95_OVER_RMS = radius95OverDrms(1);

/** Each window from its start; the prediction is the RMS over the windows at each time that they share. */
export function driftGrowthOf(windows: ReportRun['windows']): DriftGrowthData {
  const times = [...new Set(windows.flatMap((points) => points.map(({ afterS }) => afterS)))].sort(
    (a, b) => a - b,
  );
  const predicted = times.map((afterS) => {
    const squares = windows.flatMap((points) =>
      points.filter((point) => point.afterS === afterS).map(({ predictedM }) => predictedM ** 2),
    );
    const sigmaM = Math.sqrt(squares.reduce((sum, square) => sum + square, 0) / squares.length);
    return { afterS, sigmaM, p95M: P95_OVER_RMS * sigmaM };
  });
  return {
    windows: windows.map((points) => [{ afterS: 0, errorM: 0 }, ...points]),
    predicted: [{ afterS: 0, sigmaM: 0, p95M: 0 }, ...predicted],
    longestS: times[times.length - 1] ?? 0,
  };
}

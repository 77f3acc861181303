/** The drawings of a report, by the models of the screen's charts. */
import { figureSheet } from '@/shared/charts/figure/sheet';
import { plotFigure } from '@/shared/charts/figure/plot-figure';
import { driftGrowthPlot } from '@/shared/charts/plots';
import type { ReportRun } from '@/shared/contracts/report';
import { formatNumber } from '@/shared/format';
import { drawPicture } from './draw';
import type { Sheet } from './sheet';

/** Of a picture, px: so wide that its words come out at a readable size on the page. */
const WIDTH_PX = 720;
const ASPECT = 0.3;
/** Quantile of the Rayleigh distribution over its RMS: 95 % of errors of a round covariance lie below. */
const P95_OVER_RMS = Math.sqrt(-Math.log(0.05));

/** Error of every window over the time without GNSS, above what the filter predicted; nothing without windows. */
export function drawDrift(sheet: Sheet, { windows, recordingName, runId, engineVersion }: ReportRun): void {
  if (windows.length === 0) return;
  const longestS = Math.max(...windows.flatMap((points) => points.map(({ afterS }) => afterS)));
  const model = driftGrowthPlot({
    windows: windows.map((points) => [{ afterS: 0, errorM: 0 }, ...points]),
    predicted: predictedOf(windows),
    longestS,
  });
  const count = windows.length === 1 ? '1 window' : `${windows.length} windows`;
  const figure = plotFigure(model, {
    title: 'Horizontal drift',
    aside: count,
    sentence: `${count} of up to ${formatNumber(longestS)} s.`,
  });
  const origin = { recording: recordingName, run: runId, engineVersion };
  drawPicture(sheet, figureSheet({ ...figure, aspect: ASPECT }, origin, WIDTH_PX));
}

/** RMS of the predictions of all windows at each time that they share. */
function predictedOf(windows: ReportRun['windows']) {
  const times = [...new Set(windows.flatMap((points) => points.map(({ afterS }) => afterS)))].sort(
    (a, b) => a - b,
  );
  const at = times.map((afterS) => {
    const squares = windows.flatMap((points) =>
      points.filter((point) => point.afterS === afterS).map(({ predictedM }) => predictedM ** 2),
    );
    const sigmaM = Math.sqrt(squares.reduce((sum, square) => sum + square, 0) / squares.length);
    return { afterS, sigmaM, p95M: P95_OVER_RMS * sigmaM };
  });
  return [{ afterS: 0, sigmaM: 0, p95M: 0 }, ...at];
}

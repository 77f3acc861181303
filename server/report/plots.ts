/** The drawings of a report, by the models of the screen's charts. */
import { figureSheet } from '@/shared/charts/figure/sheet';
import { plotFigure } from '@/shared/charts/figure/plot-figure';
import { driftGrowthOf } from '@/shared/charts/drift-growth';
import { driftGrowthPlot } from '@/shared/charts/plots';
import type { ReportRun } from '@/shared/contracts/report';
import { formatNumber } from '@/shared/format';
import { drawPicture } from './draw';
import type { Sheet } from './sheet';

/** Of a picture, px: so wide that its words come out at a readable size on the page. */
const WIDTH_PX = 720;
const ASPECT = 0.3;
/** Error of every window over the time without GNSS, above what the filter predicted; nothing without windows. */
export function drawDrift(sheet: Sheet, { windows, recordingName, runId, engineVersion }: ReportRun): void {
  if (windows.length === 0) return;
  const growth = driftGrowthOf(windows);
  const model = driftGrowthPlot(growth);
  const count = windows.length === 1 ? '1 window' : `${windows.length} windows`;
  const figure = plotFigure(model, {
    title: 'Horizontal drift',
    aside: count,
    sentence: `${count} of up to ${formatNumber(growth.longestS)} s.`,
  });
  const origin = { recording: recordingName, run: runId, engineVersion };
  drawPicture(sheet, figureSheet({ ...figure, aspect: ASPECT }, origin, WIDTH_PX));
}

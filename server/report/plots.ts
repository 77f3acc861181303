/** The drawings of a report, by the models of the screen's charts. */
import type { ReportRun } from '@/shared/contracts/report';
import type { Sheet } from './sheet';

export function drawDrift(sheet: Sheet, run: ReportRun): void {
  if (run.windows.length === 0) return;
  sheet.gap(2);
}

/** What a run is laid out from before its first sample: the start, the fixes, the windows, and where its passes part. */
import { align, type Alignment } from '../alignment/align';
import { ErrorStateFilter } from '../filter/error-state-filter';
import type { FilterListener } from '../filter/filter-types';
import { prepareFixes, withheldBy, type Fixes } from '../filter/fixes';
import { EngineError, type RecordingColumns, type RunRequest } from '../types';
import { keptSamples } from './output-grid';
import { truthCovers } from './reference';
import { layWindows, lowerBound, type CoastWindow } from './windows';

export interface RunPlan {
  fixes: Fixes;
  alignment: Alignment;
  windows: CoastWindow[];
  /** 1 for IMU samples that are put out. */
  kept: Uint8Array;
  /** Of each fix what the windows withhold, as bits. */
  withheld: Uint8Array;
  /** What coasting is compared with, where the recording's truth covers all windows; else null. */
  truth: RecordingColumns['reference'];
  /** Last sample before the first window: where the passes part; −1 where one pass does it. */
  forkSample: number;
}

/** Throws EngineError for data or parameters that do not allow a run. */
export function planRun(recording: RecordingColumns, request: RunRequest): RunPlan {
  const { imu, gnss, reference } = recording;
  const { parameters, leverArmM, outages } = request;
  checkTimes(recording);
  const fixes = prepareFixes(gnss, parameters.gnss);
  const alignment = align(imu, fixes, parameters, leverArmM, recording.aids ?? null);
  const { sample: start } = alignment;
  const windows = layWindows(imu.timeS, start, outages);
  const truthServes = reference !== null && truthCovers(reference, windows, imu.timeS);
  const forks = windows.length > 0 && !truthServes;
  return {
    fixes,
    alignment,
    windows,
    kept: keptSamples(imu.timeS, start, request.outputRateHz),
    withheld: withheldBy(fixes, outages),
    truth: truthServes ? reference : null,
    forkSample: forks ? Math.max(start, lowerBound(imu.timeS, windows[0]!.outage.startS) - 1) : -1,
  };
}

/** The filter at the start. A pass that forks takes everything in at first. */
export function startFilter(
  { fixes, alignment, withheld, forkSample }: RunPlan,
  { imu, aids = null }: RecordingColumns,
  { parameters, leverArmM, outages }: RunRequest,
  listener: FilterListener,
): ErrorStateFilter {
  const nothing = new Uint8Array(fixes.count);
  const filter = new ErrorStateFilter(imu, fixes, nothing, parameters, leverArmM, listener, aids);
  if (forkSample < 0) filter.withhold(withheld, outages);
  const { sample, fix, nav, p, headingUntilS } = alignment;
  filter.start(sample, fix, nav, p, headingUntilS);
  return filter;
}

function checkTimes({ imu }: RecordingColumns): void {
  if (imu.timeS.length < 10)
    throw new EngineError(
      'too-short',
      `The IMU log holds ${imu.timeS.length} samples; a run needs at least 10. Upload the whole log.`,
    );
  for (let k = 1; k < imu.timeS.length; k += 1)
    if (!(imu.timeS[k]! > imu.timeS[k - 1]!))
      throw new EngineError(
        'time-order',
        `IMU times must increase: sample ${k + 1} at ${imu.timeS[k]} s follows ${imu.timeS[k - 1]} s. Decode the recording again.`,
      );
}

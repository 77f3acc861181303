/** A run that requirements are judged by: its outage windows come from a schedule that counts from the alignment. */
import { scheduleWindows } from '@/shared/requirements/schedule-windows';
import { sigmaCurve, type BiasSigma } from '@/shared/requirements/bias-sigma';
import { createRun } from '../engine';
import type { SolutionTable } from '../engine/types';
import type { VerificationRunJob, VerificationRunResult } from '../protocol';
import type { JobHelpers } from './helpers';
import { drive, keep, requestOf } from './run';

export async function verificationRun(
  job: VerificationRunJob,
  helpers: JobHelpers,
): Promise<VerificationRunResult> {
  const { schedule, ...rest } = job;
  const recording = await helpers.recordings.load(job.recordingId);
  const spec = { ...rest, outages: [], smooth: false, errorBudget: false };
  const aligned = createRun(recording.columns, requestOf(spec));
  const outages = scheduleWindows(schedule, aligned.extentS);
  const engineRun =
    outages.length === 0 ? aligned : createRun(recording.columns, requestOf({ ...spec, outages }));
  const result = await drive(engineRun, helpers, null);
  const kept = await keep(spec, recording, engineRun, result, helpers);
  return { ...kept, outages, biasSigma: biasSigmaOf(result.solution, engineRun.extentS[0]) };
}

function biasSigmaOf(solution: SolutionTable, startS: number): BiasSigma {
  const curve = (names: readonly string[]) =>
    sigmaCurve(solution.time_s!, names.map((name) => solution[name]!), startS); // prettier-ignore
  return {
    gyro: curve(['x', 'y', 'z'].map((axis) => `sigma_gyro_bias_${axis}_rad_s`)),
    accel: curve(['x', 'y', 'z'].map((axis) => `sigma_accel_bias_${axis}_m_s2`)),
  };
}

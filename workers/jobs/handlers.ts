/** Every kind of job and the function that does it. A kind without a handler does not compile. */
import type { JobKind, JobOf, JobResults, WorkerJob } from '../protocol';
import { baselineTrack } from './baseline-track';
import { decode } from './decode';
import type { JobHelpers } from './helpers';
import { mapPreview } from './map-preview';
import { noise } from './noise';
import { recordingExport } from './recording-export';
import { recordingSeries } from './recording-series';
import { run } from './run';
import { runExport } from './run-export';
import { runSeries } from './run-series';
import { scenario } from './scenario';
import { verificationRun } from './verification-run';

export type JobHandler<K extends JobKind> = (job: JobOf<K>, helpers: JobHelpers) => Promise<JobResults[K]>;

export const handlers: { [K in JobKind]: JobHandler<K> } = {
  decode,
  scenario,
  run,
  'verification-run': verificationRun,
  noise,
  'map-preview': mapPreview,
  'recording-series': recordingSeries,
  'recording-export': recordingExport,
  'baseline-track': baselineTrack,
  'run-series': runSeries,
  'run-export': runExport,
};

export function performJob(job: WorkerJob, helpers: JobHelpers): Promise<JobResults[JobKind]> {
  // The map above ties each handler to its own kind, which the compiler cannot follow through a lookup by union.
  const handler = handlers[job.kind] as (job: WorkerJob, helpers: JobHelpers) => Promise<JobResults[JobKind]>;
  return handler(job, helpers);
}

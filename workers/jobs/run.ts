/** One pass of the filter over a recording: frames while it goes, then the kept result in the store and its summary. */
import { createRun } from '../engine';
import { ENGINE_VERSION, type EngineRun, type RunResult } from '../engine/types';
import type { RunJob, RunJobResult, RunSpec } from '../protocol';
import type { LoadedRecording } from '../recordings/load';
import { writeRunTables } from '../recordings/results';
import { sha256OfJson } from './hashes';
import type { JobHelpers } from './helpers';
import { LiveFrames } from './live-frames';

/** Work between two looks at the messages, ms. */
const SLICE_MS = 6;
const FIRST_SLICE_SAMPLES = 2000;
/** Shortest time between two frames, ms. */
const FRAME_INTERVAL_MS = 40;

export async function run(job: RunJob, helpers: JobHelpers): Promise<RunJobResult> {
  const recording = await helpers.recordings.load(job.recordingId);
  const engineRun = createRun(recording.columns, requestOf(job));
  const frames =
    job.framePoints > 0
      ? new LiveFrames(engineRun, {
          runId: job.runId,
          points: job.framePoints,
          expectedRows: (engineRun.extentS[1] - engineRun.extentS[0]) * job.outputRateHz,
          expectedEpochs: recording.columns.gnss.timeS.length,
        })
      : null;
  return keep(job, recording, engineRun, await drive(engineRun, helpers, frames), helpers);
}

/** Writes a run's tables to the store; answers its summary and where it comes from. */
export async function keep(
  spec: RunSpec,
  recording: LoadedRecording,
  { origin, extentS }: EngineRun,
  result: RunResult,
  { store }: JobHelpers,
): Promise<RunJobResult> {
  const resultSha256 = await writeRunTables(store, spec.runId, { ...result, origin, extentS });
  return {
    summary: result.summary,
    resultSha256,
    provenance: {
      engineVersion: ENGINE_VERSION,
      recordingSha256: recording.sha256,
      parametersSha256: sha256OfJson({ ...spec.parameters, leverArmM: spec.leverArmM }),
    },
  };
}

export const requestOf = (spec: RunSpec) => ({
  parameters: spec.parameters,
  leverArmM: spec.leverArmM,
  outages: spec.outages,
  outputRateHz: spec.outputRateHz,
  smooth: spec.smooth,
  errorBudget: spec.errorBudget,
});

/** Runs to the end in slices short enough that cancel is heard at once. `computeS` is the time spent in the filter. */
export async function drive(
  engineRun: EngineRun,
  helpers: JobHelpers,
  frames: LiveFrames | null,
): Promise<RunResult> {
  let samples = FIRST_SLICE_SAMPLES;
  let computeMs = 0;
  let framedAt = -Infinity;
  for (;;) {
    const started = performance.now();
    const done = engineRun.advance(samples);
    const now = performance.now();
    computeMs += now - started;
    if (done) break;
    samples = nextSlice(samples, now - started);
    if (frames && now - framedAt >= FRAME_INTERVAL_MS) {
      const frame = frames.next(false);
      if (frame) {
        helpers.frame(frame);
        framedAt = now;
      }
    }
    helpers.progress(engineRun.progress);
    await helpers.breathe();
  }
  const lastFrame = frames?.next(true);
  if (lastFrame) helpers.frame(lastFrame);
  const started = performance.now();
  const result = engineRun.finish();
  computeMs += performance.now() - started;
  return { ...result, summary: { ...result.summary, computeS: computeMs / 1000 } };
}

/** Samples that would have taken SLICE_MS; a lone slow slice does not throw it off. */
function nextSlice(samples: number, tookMs: number): number {
  const fitting = (samples * SLICE_MS) / Math.max(tookMs, 0.1);
  return Math.round(Math.min(samples * 2, Math.max(samples / 4, fitting, 200)));
}

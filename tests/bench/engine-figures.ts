/**
 * The engine alone on one core: an hour at 200 Hz with GNSS position and velocity at 5 Hz, everything included, against a
 * dense ml-matrix filter of the same model in the same run. Processor time, so that a busy machine tells the same.
 */
import { parametersSchema } from '@/shared/contracts/parameters';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { DenseFilter } from '@/tests/support/dense-filter';
import { createRun, type RecordingColumns } from '@/workers/engine';
import { align } from '@/workers/engine/alignment/align';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

const RATE_HZ = 200;
const LEVER_ARM = [0.4, -0.2, -1.1] as const;

function main(): void {
  const recording = longRecording(3600);
  runOnce(shorten(recording, 60_000), 0.05);
  console.log(`engine: 1 h at ${RATE_HZ} Hz, GNSS position and velocity at 5 Hz, one core`);
  for (const [label, intervalS, samplesOfDense] of [
    ['covariance at 20 Hz', 0.05, 20_000],
    ['covariance at every sample', 0, 4000],
  ] as const) {
    const { seconds, heapMb, samples } = runOnce(recording, intervalS);
    const perSample = (seconds / samples) * 1e9;
    const dense = denseNanosecondsPerSample(recording, intervalS, samplesOfDense);
    console.log(
      `  ${label.padEnd(27)} ${perSample.toFixed(0).padStart(6)} ns a sample  ${(1e3 / perSample).toFixed(2)} M samples/s  ` +
        `${Math.round(3600 / seconds)} × real time  ${(dense / perSample).toFixed(0)} × a dense ml-matrix filter (${(dense / 1000).toFixed(0)} µs)  ` +
        `heap ${heapMb >= 0 ? '+' : ''}${heapMb.toFixed(1)} MB`,
    );
  }
}

function longRecording(durationS: number): RecordingColumns {
  const scenario = scenarioSchema.parse({
    durationS,
    imuRateHz: RATE_HZ,
    gnssRateHz: 5,
    leverArmM: [...LEVER_ARM],
  });
  return { ...simulateScenario(scenario), reference: null };
}

function shorten(recording: RecordingColumns, samples: number): RecordingColumns {
  const cut = (axes: RecordingColumns['imu']['gyro']) =>
    [axes[0].slice(0, samples), axes[1].slice(0, samples), axes[2].slice(0, samples)] as const;
  const { imu } = recording;
  return {
    ...recording,
    imu: { ...imu, timeS: imu.timeS.slice(0, samples), gyro: cut(imu.gyro), accel: cut(imu.accel) },
  };
}

/** Processor seconds of the best of three runs, and how much the heap grew while the filter ran. */
function runOnce(recording: RecordingColumns, covarianceIntervalS: number) {
  const parameters = parametersSchema.parse({ mechanisation: { covarianceIntervalS } });
  const request = { parameters, leverArmM: LEVER_ARM, outages: [], outputRateHz: 10 };
  let seconds = Infinity;
  let heapMb = Infinity;
  for (let attempt = 0; attempt < 3; attempt += 1) {
    const before = process.cpuUsage();
    const run = createRun(recording, request);
    run.advance(2000);
    globalThis.gc?.();
    const heap = process.memoryUsage().heapUsed;
    while (!run.advance(100_000));
    heapMb = Math.min(heapMb, (process.memoryUsage().heapUsed - heap) / 2 ** 20);
    run.finish();
    const used = process.cpuUsage(before);
    seconds = Math.min(seconds, (used.user + used.system) / 1e6);
  }
  return { seconds, heapMb, samples: recording.imu.timeS.length };
}

/** The same filter written with dense ml-matrix products, over the first samples of the recording. */
function denseNanosecondsPerSample(recording: RecordingColumns, intervalS: number, samples: number): number {
  const parameters = parametersSchema.parse({ mechanisation: { covarianceIntervalS: intervalS } });
  const fixes = prepareFixes(recording.gnss, parameters.gnss);
  const start = align(recording.imu, fixes, parameters, LEVER_ARM);
  const filter = new DenseFilter(recording.imu, fixes, parameters, LEVER_ARM, start);
  for (let k = 0; k < samples / 10; k += 1) filter.advanceSample();
  const before = process.cpuUsage();
  for (let k = 0; k < samples; k += 1) filter.advanceSample();
  const used = process.cpuUsage(before);
  return ((used.user + used.system) * 1000) / samples;
}

main();

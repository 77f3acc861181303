/**
 * The engine alone on one core: an hour at 200 Hz with GNSS position and velocity at 5 Hz, everything included, against a
 * dense ml-matrix filter of the same model in the same run. Of wall and processor time the smaller counts, best of
 * five: what the work itself takes, be the machine busy or the collector at work beside it.
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
  const { seconds, rssMb, samples } = runOnce(recording, 0.05, true);
  console.log(
    `  ${'with the smoother'.padEnd(27)} ${((seconds / samples) * 1e9).toFixed(0).padStart(6)} ns a sample, resident memory ${rssMb.toFixed(0)} MB`,
  );
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

/** Seconds of the best of five runs, and how much the heap grew while the filter ran. */
function runOnce(recording: RecordingColumns, covarianceIntervalS: number, smooth = false) {
  const parameters = parametersSchema.parse({ mechanisation: { covarianceIntervalS } });
  const request = { parameters, leverArmM: LEVER_ARM, outages: [], outputRateHz: 10, smooth };
  let seconds = Infinity;
  let heapMb = Infinity;
  let rssMb = 0;
  for (let attempt = 0; attempt < (smooth ? 2 : 5); attempt += 1) {
    const clock = startClock();
    const run = createRun(recording, request);
    run.advance(2000);
    const pause = startClock();
    globalThis.gc?.();
    const heap = process.memoryUsage().heapUsed;
    const paused = pause();
    while (!run.advance(100_000));
    heapMb = Math.min(heapMb, (process.memoryUsage().heapUsed - heap) / 2 ** 20);
    run.finish();
    seconds = Math.min(seconds, clock() - paused);
    rssMb = Math.max(rssMb, process.memoryUsage().rss / 2 ** 20);
  }
  return { seconds, heapMb, rssMb, samples: recording.imu.timeS.length };
}

/** Answers the time since, s: the smaller of wall and processor time. */
function startClock(): () => number {
  const wall = performance.now();
  const processor = process.cpuUsage();
  return () => {
    const used = process.cpuUsage(processor);
    return Math.min((performance.now() - wall) / 1e3, (used.user + used.system) / 1e6);
  };
}

/** The same filter written with dense ml-matrix products, over the first samples of the recording. */
function denseNanosecondsPerSample(recording: RecordingColumns, intervalS: number, samples: number): number {
  const parameters = parametersSchema.parse({ mechanisation: { covarianceIntervalS: intervalS } });
  const fixes = prepareFixes(recording.gnss, parameters.gnss);
  const start = align(recording.imu, fixes, parameters, LEVER_ARM);
  const filter = new DenseFilter(recording.imu, fixes, parameters, LEVER_ARM, start);
  for (let k = 0; k < samples / 10; k += 1) filter.advanceSample();
  const clock = startClock();
  for (let k = 0; k < samples; k += 1) filter.advanceSample();
  return (clock() * 1e9) / samples;
}

main();

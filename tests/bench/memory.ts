/**
 * Peak memory of a run over a long log, smoother included: `npm run bench -- memory [hours]`. The log is made by one
 * process and read by another, so that the peak is the run's own.
 */
import { spawnSync } from 'node:child_process';
import { closeSync, mkdtempSync, openSync, readFileSync, readSync, rmSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { parametersSchema } from '@/shared/contracts/parameters';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { createRun, type RecordingColumns } from '@/workers/engine';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

const RATE_HZ = 200;

function main([hours = '4', file]: string[]): void {
  if (file !== undefined) return measure(Number(hours), file);
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-memory-'));
  try {
    const made = path.join(folder, 'columns');
    writeLog(made, Number(hours));
    const { status } = spawnSync(process.execPath, [__filename, hours, made], { stdio: 'inherit' });
    if (status !== 0) throw new Error(`The run ended with status ${status}.`);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

const columnsOf = ({ imu, gnss }: RecordingColumns) => [
  [imu.timeS, ...imu.gyro, ...imu.accel],
  [
    gnss.timeS,
    gnss.latRad,
    gnss.lonRad,
    gnss.heightM,
    ...gnss.velocityNed,
    ...gnss.positionSigma,
    ...gnss.velocitySigma,
  ],
];

function writeLog(file: string, hours: number): void {
  const scenario = scenarioSchema.parse({ durationS: hours * 3600, imuRateHz: RATE_HZ, gnssRateHz: 5 });
  const out = openSync(file, 'w');
  for (const columns of columnsOf(simulateScenario(scenario)))
    for (const column of [Float64Array.of(columns[0]!.length), ...columns])
      writeSync(out, new Uint8Array(column.buffer, column.byteOffset, column.byteLength));
  closeSync(out);
}

function readLog(file: string): RecordingColumns {
  const source = openSync(file, 'r');
  const next = (length: number) => {
    const column = new Float64Array(length);
    readSync(source, column);
    return column;
  };
  const three = (n: number) => [next(n), next(n), next(n)] as const;
  const [n] = next(1) as unknown as [number];
  const imu = { timeS: next(n), gyro: three(n), accel: three(n), sampling: 'mean-rate' as const };
  const [m] = next(1) as unknown as [number];
  const gnss = {
    timeS: next(m),
    latRad: next(m),
    lonRad: next(m),
    heightM: next(m),
    velocityNed: three(m),
    positionSigma: three(m),
    velocitySigma: three(m),
  };
  closeSync(source);
  return { imu, gnss, reference: null };
}

function measure(hours: number, file: string): void {
  const recording = readLog(file);
  const read = peakMegabytes();
  const began = process.cpuUsage().user;
  const run = createRun(recording, {
    parameters: parametersSchema.parse({}),
    leverArmM: [0, 0, 0],
    outages: [],
    outputRateHz: 10,
    smooth: true,
  });
  while (!run.advance(100_000));
  const { smoothed } = run.finish();
  const seconds = (process.cpuUsage().user - began) / 1e6;
  console.log(
    `${hours} h at ${RATE_HZ} Hz with the smoother: ${recording.imu.timeS.length} samples, ${smoothed!.time_s!.length} rows at 10 Hz; ` +
      `peak ${peakMegabytes()} MB of resident memory (${read} MB with the log alone), ${seconds.toFixed(1)} s of processor time`,
  );
}

/** Largest resident size that this process has had, MB. */
function peakMegabytes(): number {
  const status = readFileSync('/proc/self/status', 'utf8');
  return Math.round(Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? 0) / 1000);
}

main(process.argv.slice(2));

/**
 * The workers alone: decoding of a large CSV (rows/s, peak memory of the process), and what the pool adds to a run
 * (time to the first frame and to the result). `npm run bench -- ingest [megabytes]`.
 */
import { createWriteStream, mkdirSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { once } from 'node:events';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { buildWorker } from '@/scripts/build/server-bundle';
import { defaultParameters } from '@/shared/contracts/parameters';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { createPool, openStore, storeKeys, type RunJob, type StoreConfig, type WorkerPool } from '@/workers';

const MEGABYTE = 1e6;
const RUNS = 40;

export async function benchIngest(megabytes = 100): Promise<void> {
  const root = mkdtempSync(path.join(tmpdir(), 'driftwright-bench-'));
  const entry = path.resolve('node_modules/.cache/driftwright/bench-worker.js');
  mkdirSync(path.dirname(entry), { recursive: true });
  await buildWorker(entry);
  const store: StoreConfig = { kind: 'folder', root: path.join(root, 'store') };
  const log = { info: () => undefined, warn: console.warn, error: console.error };
  const pool = createPool({ size: 1, entry, store, log });
  try {
    await benchDecode(pool, store, root, megabytes);
    await benchRuns(pool);
  } finally {
    await pool.close();
    rmSync(root, { recursive: true, force: true });
  }
}

async function benchDecode(pool: WorkerPool, config: StoreConfig, root: string, megabytes: number) {
  const { file, rows } = await writeLog(root, megabytes * MEGABYTE);
  const store = openStore(config);
  const key = (role: string) => storeKeys.raw('large', role);
  await store.adopt(key('imu'), file);
  await store.put(key('gnss'), Buffer.from(gnssText(rows / 100)));
  const files = (['imu', 'gnss'] as const).map((role) => ({ role, name: `${role}.csv`, key: key(role) }));
  const job = {
    kind: 'decode' as const,
    recordingId: 'large',
    files,
    channelMap: null,
    vehicleAxes: IDENTITY_AXES,
  };
  let steps = 0;
  const pid = pool.pids[0]!;
  const cpuBefore = processorSeconds(pid);
  const started = performance.now();
  const result = await pool.submit(job, { onEvent: () => (steps += 1) }).result;
  const seconds = (performance.now() - started) / 1000;
  if (result.outcome !== 'ready') throw new Error(JSON.stringify(result.problems));
  const cpu = processorSeconds(pid) - cpuBefore;
  console.log(
    `decode: ${megabytes} MB, ${rows} rows in ${seconds.toFixed(1)} s = ${(rows / seconds / 1e6).toFixed(2)} M rows/s, ` +
      `processor ${cpu.toFixed(1)} s = ${(rows / cpu / 1e6).toFixed(2)} M rows/s, peak ${peakMegabytes(pid)} MB, ${steps} steps of progress`,
  );
}

/** What a slider does: one run after another, each on the recording that the process holds. */
async function benchRuns(pool: WorkerPool): Promise<void> {
  const scenario = scenarioSchema.parse({
    motion: 'crawler',
    durationS: 1200,
    imuRateHz: 100,
    gnssRateHz: 5,
  });
  const { files } = await pool.submit({ kind: 'scenario', recordingId: 'loop', scenario }).result;
  await pool.submit({
    kind: 'decode',
    recordingId: 'loop',
    files,
    channelMap: null,
    vehicleAxes: IDENTITY_AXES,
  }).result;
  const first: number[] = [];
  const whole: number[] = [];
  const filter: number[] = [];
  for (let i = 0; i < RUNS; i += 1) {
    const started = performance.now();
    let framed = NaN;
    const onEvent = () => {
      if (Number.isNaN(framed)) framed = performance.now() - started;
    };
    const { summary } = await pool.submit(runJob(i), { latestKey: 'bench', affinity: 'loop', onEvent })
      .result;
    // The first run also loads the recording and warms the code.
    if (i === 0) {
      console.log(
        `run, cold: first frame ${framed.toFixed(0)} ms, result ${(performance.now() - started).toFixed(0)} ms`,
      );
      continue;
    }
    first.push(framed);
    whole.push(performance.now() - started);
    filter.push(summary.computeS * 1000);
  }
  console.log(
    `run, 20 min at 100 Hz, warm: first frame ${spread(first)}, result ${spread(whole)}, filter ${spread(filter)}`,
  );
}

function runJob(i: number): RunJob {
  const parameters = defaultParameters();
  parameters.gnss.positionScale = 1 + i / 100;
  return {
    kind: 'run',
    runId: `run-${i}`,
    recordingId: 'loop',
    parameters,
    leverArmM: [0, 0, 0],
    outages: [{ startS: 600, endS: 660, withhold: 'gnss' }],
    outputRateHz: 10,
    smooth: false,
    errorBudget: false,
    framePoints: 1500,
  };
}

const spread = (values: number[]) => {
  const sorted = [...values].sort((a, b) => a - b);
  const at = (share: number) =>
    sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))]!.toFixed(0);
  return `p50 ${at(0.5)} ms, p95 ${at(0.95)} ms`;
};

/** An IMU log of about `bytes`, 100 Hz, seven columns, as a logger prints them. */
async function writeLog(root: string, bytes: number): Promise<{ file: string; rows: number }> {
  const file = path.join(root, 'imu.csv');
  const out = createWriteStream(file);
  out.write('time_s,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2\n');
  let rows = 0;
  for (let written = 0; written < bytes;) {
    let text = '';
    for (let i = 0; i < 5000; i += 1, rows += 1) text += imuLine(rows);
    written += text.length;
    if (!out.write(text)) await once(out, 'drain');
  }
  out.end();
  await once(out, 'close');
  return { file, rows };
}

const imuLine = (k: number) => {
  const wave = (i: number) => Math.sin(k * (0.01 + 0.003 * i)).toFixed(7);
  return `${(k / 100).toFixed(3)},${wave(1)},${wave(2)},${wave(3)},${wave(4)},${wave(5)},-9.8${String(k % 97).padStart(2, '0')}\n`;
};

const gnssText = (seconds: number) => {
  const rows = Array.from(
    { length: Math.min(20_000, Math.floor(seconds)) },
    (_, k) => `${k},47.21,${-14.63 + k * 1e-6},40`,
  );
  return `time_s,lat_deg,lon_deg,height_m\n${rows.join('\n')}\n`;
};

/** Largest resident size that a process has had, MB. */
function peakMegabytes(pid: number): number {
  const status = readFileSync(`/proc/${pid}/status`, 'utf8');
  return Math.round(Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? 0) / 1000);
}

/** Processor time of a process so far, user and system, s. */
function processorSeconds(pid: number): number {
  const fields = readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ')[1]!.split(' ');
  return (Number(fields[11]) + Number(fields[12])) / 100;
}

if (require.main === module)
  benchIngest(Number(process.argv[2] ?? 100)).catch((error: unknown) => {
    console.error(error);
    process.exitCode = 1;
  });

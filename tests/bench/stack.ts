/**
 * Slider release → first frame and → complete, through the whole stack: HTTP, database, worker process, websocket.
 * The recording is 20 minutes at 100 Hz with GNSS at 5 Hz; every bench moves a slider, waits for the run to complete,
 * and thinks for one to three seconds, as a person does.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { buildServer } from '@/scripts/build/server-bundle';
import { pause } from '@/scripts/lib/shell';
import { startLocalPostgres } from '@/scripts/local-postgres';
import type { ScenarioInput } from '@/shared/contracts/scenarios';
import { createRandom } from '@/workers/engine/random';
import { writeLogs } from '@/tests/support/log-files';
import { Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { LiveBench, type Timing } from './live-bench';

const SCENARIO: ScenarioInput = { motion: 'road', durationS: 1200, imuRateHz: 100, gnssRateHz: 5, seed: 20 };
const MOVES_PER_BENCH = 40;
const WARM_UP_MOVES = 3;

/** Measures and prints the table. */
export async function benchStack(): Promise<void> {
  await buildServer();
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-bench-'));
  const postgres = await startLocalPostgres();
  try {
    const stack = await Stack.boot(postgres.url);
    try {
      await benchOn(stack, folder);
    } finally {
      await stack.stop();
    }
  } finally {
    await postgres.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

async function benchOn(stack: Stack, folder: string): Promise<void> {
  const person = await Person.firstAdmin(stack.url);
  const recording = await person.upload('20 min, 100 Hz', writeLogs(folder, SCENARIO));
  console.log(
    '\nThe whole stack: 20 min, 100 Hz; two worker processes; a slider release every 1–3 s a bench\n',
  );
  console.log(header());
  for (const benches of [1, 5]) {
    console.log(row(benches, await measure(stack.url, person, recording.id, benches)));
  }
  console.log('\nGoals, p95: first frame ≤ 150 ms, complete ≤ 1000 ms.');
}

async function measure(
  server: string,
  person: Person,
  recordingId: string,
  benches: number,
): Promise<Timing[]> {
  const random = createRandom(benches);
  const open = await Promise.all(Array.from({ length: benches }, () => LiveBench.open(server, person)));
  const timings = await Promise.all(
    open.map(async (bench) => {
      const own: Timing[] = [];
      for (let move = 0; move < WARM_UP_MOVES + MOVES_PER_BENCH; move++) {
        await pause(1000 + 2000 * random.uniform());
        const whiteNoiseRadPerSqrtS = 1e-5 * 10 ** (2 * random.uniform());
        const timing = await bench.release({ recordingId, parameters: { gyro: { whiteNoiseRadPerSqrtS } } });
        if (move >= WARM_UP_MOVES) own.push(timing);
      }
      return own;
    }),
  );
  for (const bench of open) bench.close();
  return timings.flat();
}

const COLUMNS = ['benches', 'releases', 'accepted', 'first frame', 'complete'];
const header = () =>
  [
    COLUMNS.map((name) => name.padStart(16)).join(''),
    ['', '', ...Array<string>(3).fill('p50 / p95, ms')].map((text) => text.padStart(16)).join(''),
  ].join('\n');

function row(benches: number, timings: Timing[]): string {
  const pair = (key: keyof Timing) => {
    const sorted = timings.map((timing) => timing[key]).sort((a, b) => a - b);
    const at = (share: number) => sorted[Math.ceil(share * sorted.length) - 1]!.toFixed(0);
    return `${at(0.5)} / ${at(0.95)}`;
  };
  const cells = [benches, timings.length, pair('acceptedMs'), pair('firstFrameMs'), pair('completeMs')];
  return cells.map((cell) => String(cell).padStart(16)).join('');
}

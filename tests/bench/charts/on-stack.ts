/** The bench over the whole stack: redraws while a slider moves, release → curve redrawn, the heap over many runs. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Locator, Page } from 'playwright-core';
import { pause } from '@/scripts/lib/shell';
import { startLocalPostgres } from '@/scripts/local-postgres';
import { openWindow } from '@/tests/support/browser';
import { writeLogs } from '@/tests/support/log-files';
import { FIRST_ADMIN, Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { line, spread } from './print';
import { benchLog, clearLog, watchBench } from './probes';

const DRAGS = 24;
const DRAG_MS = 1200;
const HEAP_RUNS = 200;

/** `measure` with a stack and a folder of its own. */
export async function withStack(measure: (stack: Stack, folder: string) => Promise<void>): Promise<void> {
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-charts-'));
  const postgres = await startLocalPostgres();
  try {
    const stack = await Stack.boot(postgres.url);
    try {
      await measure(stack, folder);
    } finally {
      await stack.stop();
    }
  } finally {
    await postgres.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

export const benchOnStack = (browser: Browser): Promise<void> =>
  withStack(async (stack, folder) => {
    const person = await Person.firstAdmin(stack.url);
    const long = { motion: 'road', durationS: 1200, imuRateHz: 100, gnssRateHz: 5, seed: 20 } as const;
    const recording = await person.upload('20 min, 100 Hz', writeLogs(folder, long));
    const short = await person.upload(
      '1 min, 50 Hz',
      writeLogs(folder, { ...long, durationS: 60, imuRateHz: 50 }),
    );
    console.log(
      '\nThe bench over the whole stack: 20 min, 100 Hz, GNSS 5 Hz, two worker processes, wide screen',
    );
    const page = await openBench(browser, stack.url, recording.id);
    await measureDrags(page);
    await page.context().close();
    const small = await openBench(browser, stack.url, short.id);
    await measureHeap(small);
    await small.context().close();
  });

export async function signIn(page: Page): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('textbox', { name: 'E-mail', exact: true }).fill(FIRST_ADMIN.email);
  await page.getByRole('textbox', { name: 'Password', exact: true }).fill(FIRST_ADMIN.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.getByRole('heading', { name: 'Today' }).waitFor();
}

async function openBench(browser: Browser, server: string, recordingId: string): Promise<Page> {
  const { page } = await openWindow(browser, server, { viewport: 'wide' });
  await watchBench(page);
  await signIn(page);
  await page.goto(`/bench/${recordingId}`);
  await runIsDone(page);
  return page;
}

const runIsDone = (page: Page) =>
  page.getByRole('status').filter({ hasText: 'Run done' }).waitFor({ timeout: 60_000 });
const slider = (page: Page) => page.getByRole('slider', { name: 'White noise (ARW), gyro' });

async function measureDrags(page: Page): Promise<void> {
  const perSecond: number[] = [];
  const released: number[] = [];
  for (let drag = 0; drag < DRAGS; drag++) {
    await clearLog(page);
    const seconds = await dragSlider(page, slider(page), drag % 2 === 0);
    await runIsDone(page);
    await pause(300);
    const { redraws, frames, runs, releases } = await benchLog(page);
    const releasedAt = releases[0]!;
    perSecond.push(redraws.filter((at) => at <= releasedAt).length / seconds);
    // Of the run that was asked for by the release: its first frame, and the first redraw from then on.
    const asked = runs.filter(({ askedAt }) => askedAt >= releasedAt).at(-1);
    const frame = asked && frames.find(({ runId }) => runId === asked.runId);
    const redraw = frame && redraws.find((at) => at >= frame.at);
    if (redraw !== undefined) released.push(redraw - releasedAt);
  }
  line('redraws a second while dragging, least', Math.min(...perSecond).toFixed(1), 'goal ≥ 5');
  line('… p50 / p95 / max', spread(perSecond));
  line('release → curve redrawn, p50 / p95 / max', `${spread(released)} ms`, 'goal p95 ≤ 200 ms');
  line('… releases counted', `${released.length} of ${DRAGS}`);
}

/** A hand over the rule: about sixty moves a second. Answers how long it moved, s. */
async function dragSlider(page: Page, rule: Locator, up: boolean): Promise<number> {
  const box = (await rule.boundingBox())!;
  const y = box.y + box.height / 2;
  const at = (share: number) => box.x + box.width * (up ? 0.3 + 0.4 * share : 0.7 - 0.4 * share);
  await page.mouse.move(at(0), y);
  await page.mouse.down();
  const begun = performance.now();
  for (let share = 0; share < 1; share = (performance.now() - begun) / DRAG_MS) {
    await page.mouse.move(at(share), y);
    await pause(16);
  }
  const seconds = (performance.now() - begun) / 1000;
  await page.mouse.up();
  return seconds;
}

async function measureHeap(page: Page): Promise<void> {
  const runs = (count: number) => manyRuns(page, slider(page), count);
  await runs(20);
  const before = await heapOf(page);
  await runs(HEAP_RUNS);
  const after = await heapOf(page);
  line(
    `heap before and after ${HEAP_RUNS} runs`,
    `${before.mb.toFixed(1)} → ${after.mb.toFixed(1)} MB`,
    'goal: stable',
  );
  line('DOM nodes before and after', `${before.nodes} → ${after.nodes}`);
}

async function manyRuns(page: Page, rule: Locator, count: number): Promise<void> {
  await rule.focus();
  for (let run = 0; run < count; run++) {
    await clearLog(page);
    await page.keyboard.press(run % 2 === 0 ? 'ArrowRight' : 'ArrowLeft');
    await page.waitForFunction(
      () => (globalThis as unknown as { benchLog: { runs: unknown[] } }).benchLog.runs.length > 0,
    );
    await runIsDone(page);
  }
}

/** After a forced collection. */
async function heapOf(page: Page): Promise<{ mb: number; nodes: number }> {
  const session = await page.context().newCDPSession(page);
  await session.send('HeapProfiler.enable');
  for (let i = 0; i < 3; i++) await session.send('HeapProfiler.collectGarbage');
  const { usedSize } = await session.send('Runtime.getHeapUsage');
  const { nodes } = await session.send('Memory.getDOMCounters');
  await session.detach();
  return { mb: usedSize / 1e6, nodes };
}

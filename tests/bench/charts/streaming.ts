/** Six charts of four lines, 1500 points each, all new ten times a second, on the phone. */
import type { Browser } from 'playwright-core';
import type { ChartsBench } from './harness';
import { openHarness } from './harness-page';
import { line, longestTask, spread } from './print';

export async function benchStreaming(browser: Browser): Promise<void> {
  const page = await openHarness(browser);
  try {
    const run = (updates: number) =>
      page.evaluate(
        (count) =>
          (globalThis as unknown as { chartsBench: ChartsBench }).chartsBench.stream(6, 4, 1500, 10, count),
        updates,
      );
    await run(10);
    const { millis, longTasks, updates, draws } = await run(100);
    console.log('\nStreaming: 6 charts × 4 lines × 1500 points, all new 10 times a second, phone viewport');
    line('main thread an update, p50 / p95 / max', `${spread(millis)} ms`, 'goal ≤ 20 ms');
    line('updates drawn of those sent', `${draws} of ${updates}`, 'goal: every one');
    line('longest task', longestTask(longTasks), 'goal ≤ 50 ms');
  } finally {
    await page.context().close();
  }
}

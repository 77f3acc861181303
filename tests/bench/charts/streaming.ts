/** Six charts of four lines, 1500 points each, all new ten times a second, on the phone. */
import type { Browser } from 'playwright-core';
import type { ChartsBench } from './harness';
import { openHarness } from './harness-page';
import { drawsOf, stepped } from './main-thread';
import { line, longestTask, spread } from './print';

const UPDATES = 100;

export async function benchStreaming(browser: Browser): Promise<void> {
  const page = await openHarness(browser);
  try {
    await page.evaluate(() =>
      (globalThis as unknown as { chartsBench: ChartsBench }).chartsBench.stream(6, 4, 1500),
    );
    await stepped(page, 10, 100);
    const before = await drawsOf(page);
    const { millis, longTasks } = await stepped(page, UPDATES, 100);
    const draws = (await drawsOf(page)) - before;
    console.log('\nStreaming: 6 charts × 4 lines × 1500 points, all new 10 times a second, phone viewport');
    line('main thread an update, p50 / p95 / max', `${spread(millis)} ms`, 'goal ≤ 20 ms');
    line('updates drawn of those sent', `${draws} of ${UPDATES}`, 'goal: every one');
    line('longest task by the clock', longestTask(longTasks), 'goal ≤ 50 ms');
  } finally {
    await page.context().close();
  }
}

/** What updates cost a page's main thread: processor time of its tasks, so that what else the machine does is not counted. */
import type { Page } from 'playwright-core';
import { pause } from '@/scripts/lib/shell';
import type { ChartsBench } from './harness';

export interface UpdateTimes {
  /** Main thread, each update, ms of processor time: script, style, layout, painting. */
  millis: number[];
  /** Tasks of more than 50 ms by the clock, ms. */
  longTasks: number[];
}

interface Harness {
  chartsBench: ChartsBench;
}
interface Watched {
  longTasks: number[];
}

/** Steps the harness `count` times, one every `everyMs`. */
export async function stepped(page: Page, count: number, everyMs: number): Promise<UpdateTimes> {
  const session = await page.context().newCDPSession(page);
  await session.send('Performance.enable', { timeDomain: 'threadTicks' });
  const busyS = async () => {
    const { metrics } = await session.send('Performance.getMetrics');
    return metrics.find(({ name }) => name === 'TaskDuration')!.value;
  };
  await page.evaluate(() => {
    const longTasks: number[] = [];
    Object.assign(globalThis, { longTasks });
    new PerformanceObserver((list) => {
      for (const { duration } of list.getEntries()) longTasks.push(duration);
    }).observe({ type: 'longtask' });
  });
  const millis: number[] = [];
  for (let i = 0; i < count; i++) {
    const [begun, before] = [performance.now(), await busyS()];
    await page.evaluate(() => (globalThis as unknown as Harness).chartsBench.step());
    millis.push(1000 * ((await busyS()) - before));
    await pause(Math.max(0, everyMs - (performance.now() - begun)));
  }
  const longTasks = await page.evaluate(() => (globalThis as unknown as Watched).longTasks);
  await session.detach();
  return { millis, longTasks };
}

export const drawsOf = (page: Page): Promise<number> =>
  page.evaluate(() => (globalThis as unknown as Harness).chartsBench.draws());

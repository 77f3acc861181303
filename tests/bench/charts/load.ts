/** The first load of the built client in the phone viewport, the processor four times slower: bytes of scripts, time until it can be used. */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import type { Browser, Page } from 'playwright-core';
import { BUILD } from '@/scripts/lib/project';
import { pause } from '@/scripts/lib/shell';
import { openWindow } from '@/tests/support/browser';
import { writeLogs } from '@/tests/support/log-files';
import { Person } from '@/tests/support/person';
import { line } from './print';
import { signIn, withStack } from './on-stack';

const SLOWER = 4;
/** No task of more than 50 ms for so long: the page is at the person's service. */
const QUIET_MS = 1000;

export const benchLoad = (browser: Browser): Promise<void> =>
  withStack(async (stack, folder) => {
    const person = await Person.firstAdmin(stack.url);
    const scenario = { motion: 'road', durationS: 120, imuRateHz: 50, gnssRateHz: 2, seed: 3 } as const;
    const { id } = await person.upload('2 min, 50 Hz', writeLogs(folder, scenario));
    console.log(`\nFirst load, phone viewport, processor ${SLOWER} × slower, nothing cached`);
    for (const [what, route, ready] of [
      ['sign-in', '/sign-in', 'Sign in'],
      ['list of recordings', '/recordings', 'Recordings'],
      ['bench', `/bench/${id}`, '2 min, 50 Hz'],
    ] as const)
      await measureLoad(browser, stack.url, what, route, ready);
  });

async function measureLoad(browser: Browser, server: string, what: string, route: string, ready: string) {
  const { page } = await openWindow(browser, server, { viewport: 'phone' });
  try {
    if (route !== '/sign-in') await signIn(page);
    const cookies = await page.context().cookies();
    const fresh = await openWindow(browser, server, { viewport: 'phone' });
    await fresh.page.context().addCookies(cookies);
    const scripts = scriptsOf(fresh.page);
    const readyMs = await timeToInteractive(fresh.page, route, ready);
    const kb = scripts.map((file) => gzipSync(readFileSync(file)).length / 1000);
    const total = kb.reduce((sum, one) => sum + one, 0);
    line(
      `${what}: scripts, gzip`,
      `${total.toFixed(0)} kB in ${scripts.length}`,
      what === 'bench' ? '' : 'goal ≤ 450 kB',
    );
    line(`${what}: until it can be used`, `${(readyMs / 1000).toFixed(2)} s`);
    const charts = scripts.filter((file) => /\/(lab|QuietPlot)-/.test(file));
    if (what !== 'bench') line(`${what}: chunks of charts among them`, String(charts.length), 'goal: none');
    await fresh.page.context().close();
  } finally {
    await page.context().close();
  }
}

/** Files of the scripts that the page asks for, as it goes. */
function scriptsOf(page: Page): string[] {
  const files: string[] = [];
  page.on('request', (request) => {
    const { pathname } = new URL(request.url());
    if (pathname.endsWith('.js')) files.push(path.join(BUILD.client, decodeURIComponent(pathname)));
  });
  return files;
}

async function timeToInteractive(page: Page, route: string, ready: string): Promise<number> {
  const session = await page.context().newCDPSession(page);
  await session.send('Emulation.setCPUThrottlingRate', { rate: SLOWER });
  await page.addInitScript(() => {
    const busy = { untilMs: 0 };
    Object.assign(globalThis, { busy });
    new PerformanceObserver((list) => {
      for (const entry of list.getEntries())
        busy.untilMs = Math.max(busy.untilMs, entry.startTime + entry.duration);
    }).observe({ type: 'longtask', buffered: true });
  });
  await page.goto(route);
  await page.getByRole('heading', { name: ready }).first().waitFor();
  const shownMs = await page.evaluate(() => performance.now());
  for (;;) {
    const { now, untilMs } = await page.evaluate(() => ({
      now: performance.now(),
      untilMs: (globalThis as unknown as { busy: { untilMs: number } }).busy.untilMs,
    }));
    if (now - Math.max(untilMs, shownMs) > QUIET_MS) return Math.max(untilMs, shownMs);
    await pause(100);
  }
}

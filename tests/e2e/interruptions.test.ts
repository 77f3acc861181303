/** What a person sees when a part of the machine dies under their hands, and that nothing confirmed is lost. */
import { chmodSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { startLocalPostgres, type LocalPostgres } from '@/scripts/local-postgres';
import { launchBrowser, openWindow, picture } from '@/tests/support/browser';
import { writeLogs } from '@/tests/support/log-files';
import { FIRST_ADMIN, Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { button, dragAcross, heading, runIsDone, sendLogs, signIn } from './steps';

const NAME = 'Long loop';

let folder: string;
let postgres: LocalPostgres;
let stack: Stack;
let browser: Browser;
let page: Page;
let faults: string[];

const startDatabase = () => startLocalPostgres({ folder: path.join(folder, 'postgres') });

beforeAll(async () => {
  // A database of this file's own, because it will be killed.
  delete process.env.DATABASE_URL;
  folder = mkdtempSync(path.join(tmpdir(), 'driftwright-interruptions-'));
  chmodSync(folder, 0o755); // the database's account must be able to enter it
  postgres = await startDatabase();
  stack = await Stack.boot(postgres.url);
  const person = await Person.firstAdmin(stack.url);
  browser = await launchBrowser();
  ({ page, faults } = await openWindow(browser, stack.url, { viewport: 'wide' }));
  await signIn(page, FIRST_ADMIN.email, FIRST_ADMIN.password);

  const { id } = await person.upload(NAME, writeLogs(folder, { durationS: 1800, imuRateHz: 100, seed: 3 }));
  await page.goto(`/bench/${id}`);
  await heading(page, NAME).waitFor();
  await runIsDone(page);
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
  await postgres?.stop();
  rmSync(folder, { recursive: true, force: true });
});

const status = (words: RegExp) => page.getByRole('status').filter({ hasText: words });
const slider = () => page.getByRole('slider', { name: 'White noise (ARW), gyro' });

/** Moves the slider and waits until its run is under way. */
async function startRun(to: number): Promise<void> {
  await dragAcross(page, slider(), 0.5, to);
  await status(/under way/).waitFor();
}

test('a worker process dies in mid-run: the run begins again in another and comes to its end', async () => {
  const before = stack.workerPids();
  expect(before.length).toBeGreaterThan(0);
  await startRun(0.6);
  for (const pid of before) process.kill(pid, 'SIGKILL');
  await runIsDone(page);
  expect(await button(page, 'Run again').count()).toBe(0);
  const after = stack.workerPids();
  expect(after.filter((pid) => before.includes(pid))).toEqual([]);
});

test('the database dies in mid-run and comes back: the run comes to its end, and is still there after a reload', async () => {
  await startRun(0.4);
  const pidFile = path.join(folder, 'postgres/data/postmaster.pid');
  process.kill(Number(readFileSync(pidFile, 'utf8').split('\n')[0]), 'SIGKILL');
  await postgres.ended;
  postgres = await startDatabase();
  await runIsDone(page);
  const value = await slider().getAttribute('aria-valuenow');
  await page.reload();
  await runIsDone(page);
  expect(await slider().getAttribute('aria-valuenow')).toBe(value);
});

test('the server dies while the bench is open: the page says so, keeps what was set, and goes on when it is back', async () => {
  await stack.kill();
  await dragAcross(page, slider(), 0.5, 0.7);
  const value = await slider().getAttribute('aria-valuenow');
  await page.getByText('The connection to the server is lost').waitFor();
  await page.getByText(/it runs as soon as the server answers/).waitFor();
  await picture(page, 'interruptions', 'server-gone');
  await stack.start();
  // The change that could not be sent runs by itself.
  await page.getByText('The connection to the server is lost').waitFor({ state: 'hidden' });
  await runIsDone(page);
  expect(await slider().getAttribute('aria-valuenow')).toBe(value);
});

test('the server dies in mid-upload: the page says so, and nothing half-arrived is kept', async () => {
  const network = await page.context().newCDPSession(page);
  await network.send('Network.enable');
  await network.send('Network.emulateNetworkConditions', {
    offline: false,
    latency: 0,
    downloadThroughput: -1,
    uploadThroughput: 500_000,
  });
  const files = { imu: path.join(folder, 'imu.csv'), gnss: path.join(folder, 'gnss.csv') };
  await sendLogs(page, 'Cut short', files);
  await page.getByRole('progressbar', { name: /Uploading/ }).waitFor();
  await stack.kill();
  await page.getByText('The upload did not arrive').waitFor();
  await stack.start();
  await network.send('Network.disable');
  await page.goto('/recordings');
  await page.getByText(NAME).filter({ visible: true }).first().waitFor();
  expect(await page.getByText('Cut short').count()).toBe(0);
});

test('no page threw an error on the way', () => {
  expect(faults).toEqual([]);
});

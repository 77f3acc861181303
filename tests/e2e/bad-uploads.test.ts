/** Files that cannot be used, and files that need a word: what the person sees, and what they do about it. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { writeLogs, type LogFiles } from '@/tests/support/log-files';
import { Stack } from '@/tests/support/stack';
import { button, field, heading, sendLogs, signIn, uploadLogs } from './steps';

let stack: Stack;
let browser: Browser;
let page: Page;
let faults: string[];
let folder: string;
let logs: LogFiles;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'driftwright-logs-'));
  logs = writeLogs(folder, { durationS: 120, imuRateHz: 50, seed: 9 });
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  browser = await launchBrowser();
  ({ page, faults } = await openWindow(browser, stack.url, { viewport: 'phone' }));
  await signIn(page, DEMO_PEOPLE.find(({ role }) => role === 'engineer')!.email, DEMO_PASSWORD);
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
  rmSync(folder, { recursive: true, force: true });
});

/** The IMU log with its text changed, as a file of its own. */
function changedImu(name: string, change: (text: string) => string): string {
  const file = path.join(folder, name);
  writeFileSync(file, change(readFileSync(logs.imu, 'utf8')));
  return file;
}

test('text among the numbers: the page names file, line and column, and what to do', async () => {
  const imu = changedImu('text.csv', (text) => {
    const lines = text.split('\n');
    const cells = lines[41]!.split(',');
    cells[2] = 'sensor fault';
    lines[41] = cells.join(',');
    return lines.join('\n');
  });
  await uploadLogs(page, 'Text among numbers', { imu, gnss: logs.gnss });
  await heading(page, 'The files could not be used').waitFor();
  await page.getByText('IMU file · line 42 · column gyro_y_rad_s').waitFor();
  await page
    .getByText(/sensor fault/)
    .first()
    .waitFor();
});

test('an empty file is refused beside its name, and what was chosen stays', async () => {
  const imu = changedImu('empty.csv', () => '');
  await sendLogs(page, 'Empty', { imu, gnss: logs.gnss });
  await page.getByText('The file “empty.csv” is empty. Choose the log itself.').first().waitFor();
  expect(await field(page, 'Name').inputValue()).toBe('Empty');
  await page.getByText(/^gnss\.csv/).waitFor();
});

test('headers that say nothing are mapped by the person, and the recording becomes ready', async () => {
  const imu = changedImu('plain.csv', (text) =>
    text.replace(/^.*/, 'time_s,c4,c5,c6,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2'),
  );
  await uploadLogs(page, 'Plain headers', { imu, gnss: logs.gnss });
  await heading(page, 'Say what the columns mean').waitFor({ timeout: 60_000 });
  await button(page, 'Map the columns').click();
  await heading(page, 'Map the columns').waitFor();
  for (const [axis, column] of [
    ['x', 'c4'],
    ['y', 'c5'],
    ['z', 'c6'],
  ] as const) {
    await page.getByLabel(`Gyro ${axis}`, { exact: true }).selectOption(column);
  }
  await page.getByLabel('Gyro unit').selectOption('rad/s');
  await button(page, 'Use this map and decode').click();
  await button(page, 'Open in bench').waitFor({ timeout: 60_000 });
});

test('no page threw an error on the way', () => {
  expect(faults).toEqual([]);
});

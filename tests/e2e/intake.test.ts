/** Logs that do not say what they are: a person corrects the map under the preview's eyes; a clock that is off is put right and back. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { inRoot } from '@/scripts/lib/project';
import { STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import { launchBrowser, openWindow, picture } from '@/tests/support/browser';
import { writeLogs, type LogFiles } from '@/tests/support/log-files';
import { Stack } from '@/tests/support/stack';
import { button, chooseFile, field, heading, signIn, uploadLogs } from './steps';

const DECODED_MS = 60_000;
const GNSS_LATE_S = 2;
const THEMES = { phone: 'night', wide: 'paper' } as const;

let stack: Stack;
let browser: Browser;
let folder: string;
/** Headers a to g, the accelerometer in g. */
let nameless: LogFiles;
/** The receiver's clock is two seconds late. */
let late: LogFiles;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'driftwright-intake-'));
  const logs = writeLogs(folder, { motion: 'road', durationS: 300, imuRateHz: 50, gnssRateHz: 5, seed: 12 });
  nameless = { ...logs, imu: changed(logs.imu, 'nameless.csv', inG, 'a,b,c,d,e,f,g') };
  late = { ...logs, gnss: changed(logs.gnss, 'late.csv', later) };
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
  rmSync(folder, { recursive: true, force: true });
});

const inG = (cells: string[]) =>
  cells.map((cell, at) => (at < 4 ? cell : String(Number(cell) / STANDARD_GRAVITY_M_S2)));
const later = ([time, ...rest]: string[]) => [String(Number(time) + GNSS_LATE_S), ...rest];

/** The log row by row changed, as a file of its own; `header` takes the place of its first line. */
function changed(file: string, name: string, row: (cells: string[]) => string[], header?: string): string {
  const [first, ...rows] = readFileSync(file, 'utf8').trimEnd().split('\n');
  const text = [header ?? first, ...rows.map((line) => row(line.split(',')).join(','))].join('\n');
  const target = path.join(folder, name);
  writeFileSync(target, `${text}\n`);
  return target;
}

describe.each(['phone', 'wide'] as const)('on the %s screen', (viewport) => {
  const engineer = DEMO_PEOPLE.find(({ role }) => role === 'engineer')!;
  let page: Page;
  let faults: string[];

  beforeAll(async () => {
    ({ page, faults } = await openWindow(browser, stack.url, { viewport, theme: THEMES[viewport] }));
    await signIn(page, engineer.email, DEMO_PASSWORD);
  });
  afterAll(() => page?.context().close());

  const preview = () => page.getByRole('region', { name: 'Preview' });

  test('headers that say nothing lead to the mapping screen', async () => {
    await uploadLogs(page, `Nameless, ${viewport}`, nameless);
    await heading(page, 'Say what the columns mean').waitFor({ timeout: DECODED_MS });
    await button(page, 'Map the columns').click();
    await heading(page, 'Map the columns').waitFor();
    await preview().getByText('waits for the form').waitFor();
  });

  test('the preview tells the wrong unit, and its remedy corrects the form', async () => {
    const labels = ['Time column', ...['x', 'y', 'z'].map((axis) => `Gyro ${axis}`)];
    labels.push(...['x', 'y', 'z'].map((axis) => `Accelerometer ${axis}`));
    for (const [at, label] of labels.entries())
      await page.getByLabel(label, { exact: true }).first().selectOption('abcdefg'[at]!);
    await preview()
      .getByText(/accelerometer shows (0\.9|1\.0)\d* m\/s² instead of about 9.81/)
      .waitFor();
    await picture(page, 'intake', `${viewport}-in-g`);
    await preview().getByRole('button', { name: 'Read it in g' }).click();
    expect(await page.getByLabel('Accelerometer unit').inputValue()).toBe('g');
    await preview()
      .getByText(/along down: right/)
      .waitFor();
    await preview().getByText('up to date').waitFor();
    expect(await preview().getByRole('button', { name: 'Read it in g' }).count()).toBe(0);
    expect(await preview().getByRole('img').count()).toBe(6);
    await picture(page, 'intake', `${viewport}-right`);
  });

  test('the mapping screen has nothing that axe objects to', async () => {
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
      .analyze();
    expect(violations.flatMap(({ id, nodes }) => nodes.map(({ html }) => `${id}: ${html}`))).toEqual([]);
  });

  test('the map is saved as a template of a vehicle, and shown on its page later', async () => {
    await button(page, 'Save as template').click();
    const dialog = page.getByRole('dialog');
    await field(page, 'Name').fill(`Nameless logger, ${viewport}`);
    await dialog.getByLabel('Vehicle').selectOption({ index: 1 });
    await picture(page, 'intake', `${viewport}-template`);
    await button(page, 'Save template').click();
    await page.getByText('is saved').waitFor();
  });

  test('the map is used, and the recording becomes ready', async () => {
    await button(page, 'Use this map and decode').click();
    await button(page, 'Open in bench').waitFor({ timeout: DECODED_MS });
    expect(await page.getByText('Stops its use').count()).toBe(0);
  });

  test('the template maps the next upload of the vehicle', async () => {
    await page.goto('/recordings/upload');
    await chooseFile(page, 'IMU log', nameless.imu);
    await chooseFile(page, 'GNSS log', nameless.gnss);
    await field(page, 'Name').fill(`By template, ${viewport}`);
    await page.getByLabel('Vehicle').selectOption({ index: 1 });
    await page.getByLabel('Use a mapping template').selectOption(`Nameless logger, ${viewport}`);
    await button(page, 'Upload').click();
    await heading(page, `By template, ${viewport}`).waitFor();
    await button(page, 'Open in bench').waitFor({ timeout: DECODED_MS });
    await page.goto('/vehicles');
    await page
      .getByRole('link', { name: /Crawler 1/ })
      .first()
      .click();
    await page.getByRole('main').getByText(`Nameless logger, ${viewport}`).last().waitFor();
    await picture(page, 'intake', `${viewport}-templates`);
  });

  test('a clock that is off is found, shifted, and shifted back', async () => {
    await uploadLogs(page, `Late receiver, ${viewport}`, late);
    await button(page, 'Open in bench').waitFor({ timeout: DECODED_MS });
    const finding = page.getByText(/The GNSS stamps are .* late against the IMU’s/);
    const remedy = button(page, /^Shift GNSS by −(1\.9|2\.0)\d s$/);
    await remedy.waitFor();
    await finding.first().waitFor();
    await picture(page, 'intake', `${viewport}-late`);
    await remedy.click();
    await button(page, 'Take it back').waitFor({ timeout: DECODED_MS });
    expect(await finding.count()).toBe(0);
    await picture(page, 'intake', `${viewport}-shifted`);
    await button(page, 'Take it back').click();
    await remedy.waitFor({ timeout: DECODED_MS });
    await finding.first().waitFor();
    expect(await button(page, 'Take it back').count()).toBe(0);
  });

  test('one log that holds both sensors goes in alone', async () => {
    await page.goto('/recordings/upload');
    await chooseFile(page, 'IMU log', inRoot('fixtures', 'logs', 'merged.csv'));
    await field(page, 'Name').fill(`One log, ${viewport}`);
    await button(page, 'Upload').click();
    await heading(page, `One log, ${viewport}`).waitFor();
    await button(page, 'Open in bench').waitFor({ timeout: DECODED_MS });
    await button(page, 'Correct the mapping').click();
    await heading(page, 'GNSS in the IMU file').waitFor();
  });

  test('no page threw an error on the way', () => {
    expect(faults).toEqual([]);
  });
});

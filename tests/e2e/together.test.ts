/** Two people on one bench, and a comparison: what one sets the other sees; two tunings stand side by side. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { writeLogs } from '@/tests/support/log-files';
import { FIRST_ADMIN, Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { button, heading, runIsDone, signIn } from './steps';

const NAME = 'Inner basin';
const SLIDER = 'White noise (ARW), gyro';

let folder: string;
let stack: Stack;
let browser: Browser;
let one: Page;
let other: Page;
const faults: string[][] = [];

async function open(viewport: 'wide' | 'phone'): Promise<Page> {
  const window = await openWindow(browser, stack.url, { viewport });
  faults.push(window.faults);
  await signIn(window.page, FIRST_ADMIN.email, FIRST_ADMIN.password);
  return window.page;
}

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'driftwright-together-'));
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!);
  const person = await Person.firstAdmin(stack.url);
  browser = await launchBrowser();
  const { id } = await person.upload(NAME, writeLogs(folder, { durationS: 300, imuRateHz: 50, seed: 5 }));
  [one, other] = [await open('wide'), await open('wide')];
  for (const page of [one, other]) {
    await page.goto(`/bench/${id}?w=120~180`);
    await heading(page, NAME).waitFor();
    await runIsDone(page);
  }
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
  rmSync(folder, { recursive: true, force: true });
});

const slider = (page: Page) => page.getByRole('slider', { name: SLIDER });
const value = (page: Page) => slider(page).getAttribute('aria-valuetext');

test('two see each other; the one who follows sees what the other sets, and goes on from it', async () => {
  const before = await value(one);
  await button(other, /^Follow /).click();
  await other.getByText(/^Following: /).waitFor();
  await slider(one).press('PageUp');
  const set = await value(one);
  expect(set).not.toBe(before);
  await other.waitForFunction(
    ({ name, text }) =>
      document.querySelector(`[role=slider][aria-label="${name}"]`)?.getAttribute('aria-valuetext') === text,
    { name: SLIDER, text: set },
  );
  expect(await slider(other).getAttribute('aria-disabled')).toBe('true');
  await runIsDone(other);
  await button(other, 'Stop following').click();
  await slider(other).press('PageUp');
  await runIsDone(other);
  expect(await value(other)).not.toBe(set);
  expect(await value(one)).toBe(set);
});

test('who closes the bench is followed no more', async () => {
  await button(one, /^Follow /).click();
  await one.getByText(/^Following: /).waitFor();
  await other.goto('/recordings');
  await one.getByText(/has closed the bench/).waitFor();
  expect(await button(one, /^Follow /).count()).toBe(0);
  expect(await slider(one).getAttribute('aria-disabled')).not.toBe('true');
});

test('the run on screen stands beside the start values, in figures, parameters and curves', async () => {
  await runIsDone(one);
  await one.locator('body').press('c');
  await heading(one, /^Compare$/).waitFor();
  const figures = one.getByRole('table', { name: 'Figures' });
  await figures.getByRole('columnheader', { name: 'Start values' }).waitFor();
  const drift = figures.getByRole('row', { name: /Drift after 60 s/ });
  await drift.getByRole('cell').nth(1).getByText(/m$/).waitFor();
  const parameters = one.getByRole('table', { name: 'Parameters that differ' });
  expect(await parameters.getByRole('row').count()).toBe(2);
  await parameters.getByRole('row', { name: /White noise \(ARW\)/ }).waitFor();
  expect(await one.getByRole('group', { name: /^Coasting error, horizontal/ }).count()).toBe(1);
});

test('the address of a comparison opens the same one, on the phone as well', async () => {
  const phone = await open('phone');
  await phone.goto(one.url().replace(/^.*\/bench/, '/bench'));
  const figures = phone.getByRole('table', { name: 'Figures' });
  await figures.getByRole('row', { name: /Drift after 60 s/ }).waitFor();
  expect(await phone.getByRole('table', { name: 'Parameters that differ' }).getByRole('row').count()).toBe(2);
  expect(await phone.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
});

test('nothing went wrong in any window', () => {
  expect(faults.flat()).toEqual([]);
});

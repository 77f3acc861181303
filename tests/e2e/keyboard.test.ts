/** The main path without a mouse: sign in, open a recording, tune it over an outage, save a version, and read the keys. */
import type { Browser, Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { headlineFigure, heading, runIsDone } from './steps';

const RECORDING = 'Breakwater loop 3';
const MOST_TABS = 150;
const engineer = DEMO_PEOPLE.find(({ role }) => role === 'engineer')!;

let stack: Stack;
let browser: Browser;
let page: Page;
let faults: string[];

beforeAll(async () => {
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  const person = await Person.signIn(stack.url, engineer.email, DEMO_PASSWORD);
  const recordings = await person.list<{ id: string; name: string }>('/recordings');
  await person.decoded(recordings.find(({ name }) => name === RECORDING)!.id);
  browser = await launchBrowser();
  ({ page, faults } = await openWindow(browser, stack.url, { viewport: 'wide' }));
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
});

/** Name and role of what has the focus, as the screen reader tells it. */
const focused = () =>
  page.evaluate(() => {
    const element = document.activeElement as HTMLElement | null;
    const label =
      element?.getAttribute('aria-label') ?? (element as HTMLInputElement | null)?.labels?.[0]?.innerText;
    return `${element?.getAttribute('role') ?? element?.tagName.toLowerCase() ?? ''}: ${label ?? element?.innerText ?? ''}`;
  });

/** Presses Tab until what `name` fits has the focus, and answers how often. */
async function tabTo(name: RegExp): Promise<number> {
  const passed: string[] = [];
  for (let count = 1; count <= MOST_TABS; count++) {
    await page.keyboard.press('Tab');
    const at = await focused();
    if (name.test(at)) return count;
    passed.push(at.slice(0, 60));
  }
  throw new Error(`Tab never came to ${name}; it passed ${passed.join(' | ')}`);
}

/** What has the focus shows it: an outline, or a ring drawn otherwise. */
const focusShows = () =>
  page.evaluate(() => {
    const { outlineStyle, outlineWidth, boxShadow } = getComputedStyle(document.activeElement!);
    return (outlineStyle !== 'none' && parseFloat(outlineWidth) > 0) || boxShadow !== 'none';
  });

test('signs in', async () => {
  await page.goto('/sign-in');
  await heading(page, 'Sign in').waitFor();
  await tabTo(/E-mail/);
  expect(await focusShows()).toBe(true);
  await page.keyboard.type(engineer.email);
  await tabTo(/Password/);
  await page.keyboard.type(DEMO_PASSWORD);
  await page.keyboard.press('Enter');
  await heading(page, 'Today').first().waitFor();
});

test('goes to the recordings and opens one on the bench', async () => {
  await page.keyboard.press('g');
  await page.keyboard.press('r');
  await page.getByText(RECORDING).filter({ visible: true }).first().waitFor();
  await tabTo(new RegExp(`^(link|a): ${RECORDING}`));
  expect(await focusShows()).toBe(true);
  await page.keyboard.press('Enter');
  await heading(page, RECORDING).first().waitFor();
  await tabTo(/Open in bench/);
  await page.keyboard.press('Enter');
  await runIsDone(page);
});

test('adds an outage, moves it, and turns the noise up', async () => {
  await tabTo(/Enter adds an outage window/);
  await page.keyboard.press('Enter');
  await page.getByRole('dialog').waitFor();
  await tabTo(/^button: Apply/);
  await page.keyboard.press('Enter');
  await page.getByRole('dialog').waitFor({ state: 'detached' });
  await runIsDone(page);
  const before = await headlineFigure(page, /^Drift after/);
  expect(before.unit).toBe('m');
  await tabTo(/^slider: White noise \(ARW\), gyro/);
  expect(await focusShows()).toBe(true);
  for (let i = 0; i < 3; i++) await page.keyboard.press('PageUp');
  await page.waitForFunction(
    (old) => !document.querySelector('[aria-label="Headline figures"]')?.textContent?.includes(old),
    String(before.value),
  );
  await page.keyboard.press('Control+z');
  await runIsDone(page);
});

test('saves a version', async () => {
  await page.evaluate(() => (document.activeElement as HTMLElement | null)?.blur());
  await page.keyboard.press('s');
  await page.getByRole('dialog', { name: 'Save as a version' }).waitFor();
  await tabTo(/Name of the set/);
  await page.keyboard.type('By hand alone');
  await tabTo(/What changed and why/);
  await page.keyboard.type('By the keyboard alone.');
  await tabTo(/^button: Save version/);
  await page.keyboard.press('Enter');
  await page.getByRole('dialog').waitFor({ state: 'detached' });
});

test('reads which keys there are, and closes the map by Escape', async () => {
  await page.evaluate(() => (document.activeElement as HTMLElement | null)?.blur());
  await page.keyboard.press('?');
  const map = page.getByRole('dialog', { name: 'Keyboard' });
  await map.getByText('pins the run as baseline').waitFor();
  await page.keyboard.press('Escape');
  await map.waitFor({ state: 'detached' });
  expect(faults).toEqual([]);
});

/**
 * Every screen at twice the size: a window of 1440 × 900 px zoomed to 200 % is 720 × 450 CSS px (WCAG 2.2, 1.4.4), and no
 * screen scrolls sideways at 320 CSS px (1.4.10). What scrolls within itself (tabs, tables) may.
 */
import type { Browser } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { screensOf, type Screen } from '@/tests/support/screens';
import { Stack } from '@/tests/support/stack';
import { signIn } from './steps';

const SIZES = [
  ['zoomed to 200 %', { width: 720, height: 450 }],
  ['at the narrowest', { width: 320, height: 640 }],
] as const;

let stack: Stack;
let browser: Browser;
let screens: Screen[];

beforeAll(async () => {
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  browser = await launchBrowser();
  screens = await screensOf(stack.url);
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
});

test.each(SIZES)('%s no screen is wider than the window, and none loses its title', async (_, size) => {
  const found: string[] = [];
  for (const role of new Set(screens.map((screen) => screen.role))) {
    const { page, faults } = await openWindow(browser, stack.url, { viewport: 'phone' });
    await page.setViewportSize(size);
    const person = DEMO_PEOPLE.find((one) => one.role === role);
    if (person) await signIn(page, person.email, DEMO_PASSWORD);
    for (const screen of screens.filter((one) => one.role === role)) {
      await page.goto(screen.path);
      await screen.ready(page);
      const { wide, cut } = await page.evaluate(() => {
        const title = document.querySelector('h1');
        const box = title?.getBoundingClientRect();
        return {
          wide: document.documentElement.scrollWidth,
          cut: !box || box.right > innerWidth + 1 || box.left < -1,
        };
      });
      if (wide > size.width) found.push(`${screen.name}: ${wide} px wide`);
      if (cut) found.push(`${screen.name}: its title is cut off or not there`);
    }
    found.push(...faults);
    await page.context().close();
  }
  expect(found).toEqual([]);
});

/**
 * Every screen at 320 CSS px, which is a window of 1280 px at 400 % (WCAG 2.2, 1.4.10) and more than the 200 % of 1.4.4: none
 * scrolls sideways, none loses its title. What scrolls within itself (tabs, tables) may.
 */
import type { Browser } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { screensOf, type Screen } from '@/tests/support/screens';
import { Stack } from '@/tests/support/stack';
import { signIn } from './steps';

const SIZE = { width: 320, height: 640 };

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

test('no screen is wider than the window, and none loses its title', async () => {
  const found: string[] = [];
  for (const role of new Set(screens.map((screen) => screen.role))) {
    const { page, faults } = await openWindow(browser, stack.url, { viewport: 'phone' });
    await page.setViewportSize(SIZE);
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
      if (wide > SIZE.width) found.push(`${screen.name}: ${wide} px wide`);
      if (cut) found.push(`${screen.name}: its title is cut off or not there`);
    }
    found.push(...faults);
    await page.context().close();
  }
  expect(found).toEqual([]);
});

/** axe over every screen, on paper when wide and by night on the phone: WCAG 2.2 A and AA. */
import AxeBuilder from '@axe-core/playwright';
import type { Browser } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import type { Role } from '@/shared/contracts/roles';
import { launchBrowser, openWindow, type PageOptions } from '@/tests/support/browser';
import { screensOf, type Screen } from '@/tests/support/screens';
import { Stack } from '@/tests/support/stack';
import { signIn } from './steps';

const RULES = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

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

const LOOKS: PageOptions[] = [
  { viewport: 'wide', theme: 'paper' },
  { viewport: 'phone', theme: 'night' },
];

describe.each(LOOKS)('$viewport, $theme', (look) => {
  test.each<Role | 'signed out'>(['signed out', 'engineer', 'admin'])('screens of: %s', async (who) => {
    const { page } = await openWindow(browser, stack.url, look);
    const person = DEMO_PEOPLE.find(({ role }) => role === who);
    if (person) await signIn(page, person.email, DEMO_PASSWORD);
    const found: string[] = [];
    for (const screen of screens.filter(({ role }) => role === (person?.role ?? null))) {
      await page.goto(screen.path);
      await screen.ready(page);
      const { violations } = await new AxeBuilder({ page }).withTags(RULES).analyze();
      for (const { id, nodes } of violations) {
        found.push(...nodes.map(({ html }) => `${screen.name}: ${id}: ${html.slice(0, 160)}`));
      }
    }
    await page.context().close();
    expect(found).toEqual([]);
  });
});

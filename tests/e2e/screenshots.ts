/** npm run screenshots: every screen, in both themes and on both sizes, as artifacts/screens/<screen>-<size>-<theme>.png. */
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { buildAll } from '@/scripts/build';
import { failWith } from '@/scripts/lib/project';
import { startLocalPostgres } from '@/scripts/local-postgres';
import { launchBrowser, openWindow, picture, VIEWPORTS, type ViewportName } from '@/tests/support/browser';
import { screensOf } from '@/tests/support/screens';
import { Stack } from '@/tests/support/stack';
import { signIn } from './steps';

async function main(): Promise<void> {
  await buildAll(console.log);
  const postgres = await startLocalPostgres();
  const stack = await Stack.boot(postgres.url, { demo: true });
  const browser = await launchBrowser();
  try {
    const screens = await screensOf(stack.url);
    for (const viewport of Object.keys(VIEWPORTS) as ViewportName[]) {
      for (const theme of ['paper', 'night'] as const) {
        for (const role of new Set(screens.map((screen) => screen.role))) {
          const { page, faults } = await openWindow(browser, stack.url, { viewport, theme });
          const person = DEMO_PEOPLE.find((one) => one.role === role);
          if (person) await signIn(page, person.email, DEMO_PASSWORD);
          for (const screen of screens.filter((one) => one.role === role)) {
            await page.goto(screen.path);
            await screen.ready(page);
            await picture(page, 'screens', `${screen.name}-${viewport}-${theme}`);
          }
          if (faults.length > 0) console.error(faults.join('\n'));
          await page.context().close();
        }
      }
    }
    console.log('artifacts/screens holds them.');
  } finally {
    await browser.close();
    await stack.stop();
    await postgres.stop();
  }
}

main().catch(failWith);

/** Lists, units and hints: narrowed down and found again by address, chosen once and kept, read once and gone. */
import type { Browser, Locator, Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { launchBrowser, openWindow, picture } from '@/tests/support/browser';
import { Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { button, dragAcross, headlineFigure, heading, runIsDone, signIn } from './steps';

let stack: Stack;
let browser: Browser;
let page: Page;
let faults: string[];
let recordings: { id: string; name: string; vehicleName: string }[];

beforeAll(async () => {
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  const engineer = DEMO_PEOPLE.find(({ role }) => role === 'engineer')!;
  const person = await Person.signIn(stack.url, engineer.email, DEMO_PASSWORD);
  recordings = await person.list('/recordings?sort=name');
  for (const { id } of recordings) await person.decoded(id);
  browser = await launchBrowser();
  ({ page, faults } = await openWindow(browser, stack.url, { viewport: 'wide', theme: 'paper' }));
  await signIn(page, engineer.email, DEMO_PASSWORD);
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
});

const shown = (target: Locator) => target.filter({ visible: true }).first();
const list = () => page.getByRole('region', { name: 'Recordings' });
const search = () => shown(page.getByRole('searchbox', { name: 'Search recordings' }));
const inList = (name: string) => list().getByRole('link', { name: new RegExp(name) });

test('a search by vehicle is kept in the address, also beside what is opened from it', async () => {
  const [first, ...others] = recordings;
  const other = others.find(({ vehicleName }) => vehicleName !== first!.vehicleName)!;
  await page.goto('/recordings');
  await search().pressSequentially(other.vehicleName);
  await page.waitForURL(/q=/);
  await inList(first!.name).waitFor({ state: 'detached' });
  expect(await search().inputValue()).toBe(other.vehicleName);
  await inList(other.name).click();
  await page.waitForURL(new RegExp(`/recordings/${other.id}.*q=`));
  await page.reload();
  await inList(other.name).waitFor();
  expect(await inList(first!.name).count()).toBe(0);
  expect(await search().inputValue()).toBe(other.vehicleName);
});

test('a list that its filter has emptied says so, and leads back', async () => {
  await shown(button(page, /Filter and order/)).click();
  await shown(page.getByLabel('Status')).selectOption('rejected');
  await heading(page, 'No recordings match').waitFor();
  await picture(page, 'places', 'no-match');
  await button(page, 'Clear search and filter').click();
  await inList(recordings[0]!.name).waitFor();
  expect(await search().inputValue()).toBe('');
  expect(new URL(page.url()).search).toBe('');
});

test('a hint that was read does not come back', async () => {
  await shown(button(page, 'Got it')).click();
  await button(page, 'Got it').waitFor({ state: 'detached' });
  await page.reload();
  await inList(recordings[0]!.name).waitFor();
  expect(await button(page, 'Got it').count()).toBe(0);
});

test('units that were chosen are those of the bench: fields and figures', async () => {
  const bench = `/bench/${recordings[0]!.id}?w=120~180`;
  await page.goto(bench);
  await runIsDone(page);
  const metres = await headlineFigure(page, /^Drift after/);
  expect(metres.unit).toBe('m');
  await page.goto('/profile');
  await page.getByLabel('Gyro white noise (ARW)').selectOption('rad/√s');
  await page.getByLabel('Lengths').selectOption('ft');
  await button(page, 'Back to the usual units').waitFor();
  await page.goto(bench);
  await runIsDone(page);
  await page.getByRole('textbox', { name: 'White noise (ARW), rad/√s' }).waitFor();
  const feet = await headlineFigure(page, /^Drift after/);
  expect(feet.unit).toBe('ft');
  expect((feet.value * 0.3048) / metres.value).toBeCloseTo(1, 2);
});

test('a stretch at rest is drawn on the strip, resized by keys and typed', async () => {
  await page.goto(`/recordings/${recordings[0]!.id}/noise`);
  await heading(page, 'Gyro: Allan deviation').waitFor();
  await dragAcross(page, page.getByRole('img', { name: /at rest found/ }), 0.1, 0.3);
  const start = page.getByRole('slider', { name: 'Chosen stretch, start' });
  const from = page.getByRole('textbox', { name: 'From, s' });
  const drawn = Number(await from.inputValue());
  expect(drawn).toBeGreaterThan(0);
  await start.focus();
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('PageUp');
  expect(Number(await from.inputValue())).toBe(drawn + 11);
  expect(await start.getAttribute('aria-valuenow')).toBe(String(drawn + 11));
  await picture(page, 'places', 'stretch');
});

test('no page threw an error on the way', () => {
  expect(faults).toEqual([]);
});

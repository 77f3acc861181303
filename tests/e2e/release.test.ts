/** From a draft to a release, with three people: an engineer, a lead on the phone, and an integrator with a token. */
import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import type { ExportDocument } from '@/shared/contracts/exports';
import type { Verification } from '@/shared/contracts/verification';
import type { Role } from '@/shared/contracts/roles';
import { formatNumber } from '@/shared/format';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { needPoppler, pdfText } from '@/tests/support/pdf-text';
import { Person } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { button, field, heading, signIn } from './steps';

const SET = 'Crawler harbour set';

let stack: Stack;
let browser: Browser;
let setId: string;
let vehicleId: string;
const faults: string[][] = [];
const windows = {} as Record<'engineer' | 'lead' | 'admin', Page>;

const emailOf = (role: Role) => DEMO_PEOPLE.find((one) => one.role === role)!.email;

async function windowOf(role: Role, viewport: 'wide' | 'phone'): Promise<Page> {
  const window = await openWindow(browser, stack.url, { viewport });
  faults.push(window.faults);
  await signIn(window.page, emailOf(role), DEMO_PASSWORD);
  return window.page;
}

beforeAll(async () => {
  needPoppler();
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  browser = await launchBrowser();
  const engineer = await Person.signIn(stack.url, emailOf('engineer'), DEMO_PASSWORD);
  const recordings = await engineer.list<{ id: string; name: string }>('/recordings');
  const recording = recordings.find(({ name }) => name === 'Breakwater loop 3')!;
  await engineer.decoded(recording.id);
  const sets = await engineer.list<{ id: string; name: string; vehicleId: string }>('/parameter-sets');
  ({ id: setId, vehicleId } = sets.find(({ name }) => name === SET)!);
  windows.engineer = await windowOf('engineer', 'wide');
  windows.lead = await windowOf('approver', 'phone');
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
});

const version = (page: Page, number: number) => page.goto(`/sets/${setId}?version=${number}`);
const settled = (page: Page, words: RegExp) => page.getByText(words).first().waitFor();

test('the engineer says what is required', async () => {
  const page = windows.engineer;
  await page.goto('/requirements');
  await button(page, 'Add a requirement').click();
  await field(page, 'Name').fill('Drift after a minute');
  await page.getByRole('combobox', { name: 'Of which vehicle' }).selectOption({ label: 'Crawler 1' });
  await button(page, 'Add the requirement').click();
  await page.getByText('Give the limit.').waitFor();
  await page.getByRole('textbox', { name: /^Limit/ }).fill('1');
  await page.getByRole('checkbox', { name: /^Breakwater loop 3/ }).click();
  await button(page, 'Add the requirement').click();
  await page
    .getByText('Horizontal drift after 60 s of coasting, 95th percentile: at most 1')
    .first()
    .waitFor();
});

test('the engineer submits a version; nobody changes it any more', async () => {
  const page = windows.engineer;
  await version(page, 1);
  await button(page, 'Submit for review').click();
  await settled(page, /^Submitted by/);
  expect(await button(page, 'Edit the note').count()).toBe(0);
  await settled(page, /waits for an approver/);
});

test('the lead reads it on the phone, comments and returns it', async () => {
  const page = windows.lead;
  await page.goto('/');
  await page.getByText(SET).first().click();
  await heading(page, 'Version 1').waitFor();
  await field(page, 'Comment').fill('Why is the turn-on bias so large?');
  await button(page, /^Comment$/).click();
  await page.getByText('Why is the turn-on bias so large?').first().waitFor();
  await button(page, /^Return$/).click();
  await button(page, 'Return it').click();
  await page.getByText('Say what is to be mended.').waitFor();
  await field(page, 'What is to be mended').fill('Verify it first, please.');
  await button(page, 'Return it').click();
  await settled(page, /^Returned by/);
});

test('the engineer goes on with a draft from it, verifies and submits', async () => {
  const page = windows.engineer;
  await version(page, 1);
  await page.getByText('Verify it first, please.').waitFor();
  await button(page, 'Draft from it').click();
  await heading(page, 'Version 2').waitFor();
  await button(page, 'Edit the note').click();
  await field(page, 'What changed and why').fill('The same figures, verified.');
  await button(page, /^Save$/).click();
  await page.getByText('The same figures, verified.').first().waitFor();
  await button(page, /^Verify$/).click();
  await settled(page, /^2 of 3 pass, 1 fail$/);
  await button(page, 'Submit for review').click();
  await settled(page, /^Submitted by/);
});

test('the lead cannot release what fails, waives it in writing, and releases', async () => {
  const page = windows.lead;
  await version(page, 2);
  await button(page, /^Release$/).click();
  await page.getByText('1 of 3 cells stand in the way').waitFor();
  await button(page, 'Cancel').click();
  await page.getByRole('link', { name: 'Open the matrix' }).click();
  await button(page, /^Drift after a minute, Breakwater loop 3, fails/).click();
  await field(page, 'Why it may be waived').fill('The limit was meant in tens of metres; see the drift.');
  await button(page, 'Waive this cell').click();
  await button(page, /^Drift after a minute, Breakwater loop 3, waived/).waitFor();
  await version(page, 2);
  await button(page, /^Release$/).click();
  await page.getByText('The verification is complete').waitFor();
  await page.getByText('Keep an independent means of navigation.').first().waitFor();
  await page.getByRole('dialog').getByRole('button', { name: 'Release', exact: true }).click();
  await settled(page, /^Released by/);
});

test('the admin makes a token; a build fetches the released set with it', async () => {
  windows.admin = await windowOf('admin', 'wide');
  const page = windows.admin;
  await page.goto('/team');
  await button(page, 'New token').click();
  await field(page, 'Name').fill('Flight code build');
  await button(page, 'Make it').click();
  const token = await field(page, 'Token').inputValue();
  const fetched = await fetch(`${stack.url}/api/v1/vehicles/${vehicleId}/released-set`, {
    headers: { Authorization: `Bearer ${token}` },
  });
  expect(fetched.status).toBe(200);
  const document = (await fetched.json()) as ExportDocument;
  expect(document).toMatchObject({ released: true, version: { number: 2 }, set: { name: SET } });
  const again = await fetch(`${stack.url}/api/v1/vehicles/${vehicleId}/released-set`, {
    headers: { Authorization: `Bearer ${token}`, 'If-None-Match': fetched.headers.get('etag')! },
  });
  expect(again.status).toBe(304);
  const beyond = await fetch(`${stack.url}/api/v1/recordings`, {
    headers: { Authorization: `Bearer ${token}` },
  });
  expect(beyond.status).toBe(403);
  await button(page, 'Done').click();
  await page.reload();
  await page.getByText(/last used/).waitFor();
});

test('the same is fetched by the page, and the report as a PDF', async () => {
  const page = windows.engineer;
  await version(page, 2);
  const header = page.waitForEvent('download');
  await page.getByRole('link', { name: `${SET} v2 as C header` }).click();
  const source = readFileSync(await (await header).path(), 'utf8');
  expect(source).toContain('RELEASED for Crawler 1');
  expect(source).toContain('static const double');
  const report = page.waitForEvent('download');
  await page.getByRole('link', { name: `Report of ${SET} v2 as PDF` }).click();
  const { text, pages } = pdfText(readFileSync(await (await report).path()));
  expect(pages.length).toBeGreaterThan(3);
  expect(text).toContain('RELEASED for Crawler 1');
  expect(text).toContain('2 of 3 cells pass, 1 waived in writing');
  expect(text).toContain('The limit was meant in tens of metres; see the drift.');
  const engineer = await Person.signIn(stack.url, emailOf('engineer'), DEMO_PASSWORD);
  const verification = (await engineer.json(
    'GET',
    `/parameter-sets/${setId}/versions/2/verification`,
  )) as Verification;
  const drift = verification.evidence!.cells.find(({ waiver }) => waiver !== null)!;
  expect(text).toContain(`${formatNumber(drift.value!)} m`);
  await page.getByRole('link', { name: `Read the report of ${SET} v2` }).click();
  await page
    .getByText(/^RELEASED for Crawler 1/)
    .first()
    .waitFor();
});

test('the trail tells it all', async () => {
  const page = windows.admin;
  await page.goto('/audit');
  const changes = page.getByRole('list', { name: 'Changes' });
  await changes.getByText(`Released: ${SET}`).waitFor();
  for (const words of ['Cell waived', 'Returned', 'Submitted for review', 'API token made'])
    await changes
      .getByText(new RegExp(`^${words}`))
      .first()
      .waitFor();
  await page.getByRole('combobox', { name: 'What was done' }).selectOption({ label: 'Cell waived' });
  await changes.getByText(`Released: ${SET}`).waitFor({ state: 'detached' });
  await changes.getByText(/^Cell waived/).waitFor();
  expect(await changes.getByRole('listitem').count()).toBe(1);
});

test('nothing went wrong in any window', () => {
  expect(faults.flat()).toEqual([]);
});

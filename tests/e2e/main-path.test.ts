/**
 * The main job as people do it, on the phone and on a wide screen: sign in, upload, see it decode, tune over live
 * charts, cut GNSS, read the drift, save; a second person opens it; a viewer may look and not save.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { API_PREFIX, CSRF_HEADER } from '@/shared/contracts/common';
import { defaultParameters } from '@/shared/contracts/parameters';
import type { Role } from '@/shared/contracts/roles';
import { launchBrowser, openWindow, picture, type ViewportName } from '@/tests/support/browser';
import { FrameWatch } from '@/tests/support/frame-watch';
import { writeLogs, type LogFiles } from '@/tests/support/log-files';
import { Stack } from '@/tests/support/stack';
import { button, dragAcross, heading, headlineFigure, runIsDone, signIn, strip, uploadLogs } from './steps';

const NOTE = 'Position scale raised: the receiver is too sure of itself near the sheds.';

const DRIFT = /^Drift after 60(\.0)? s$/;

let stack: Stack;
let browser: Browser;
let folder: string;
let logs: LogFiles;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'driftwright-logs-'));
  logs = writeLogs(folder, { motion: 'road', durationS: 1200, imuRateHz: 100, gnssRateHz: 5, seed: 4 });
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
  rmSync(folder, { recursive: true, force: true });
});

const person = (role: Role) => DEMO_PEOPLE.find((one) => one.role === role)!;

describe.each<ViewportName>(['phone', 'wide'])('on the %s screen', (viewport) => {
  const recordingName = `Breakwater loop, ${viewport}`;
  const setName = `Harbour, ${viewport}`;
  const faults: string[][] = [];
  let page: Page;
  let watch: FrameWatch;
  let benchAddress: string;

  async function windowOf(role: Role): Promise<Page> {
    const opened = await openWindow(browser, stack.url, { viewport });
    faults.push(opened.faults);
    watch ??= new FrameWatch(opened.page);
    await signIn(opened.page, person(role).email, DEMO_PASSWORD);
    return opened.page;
  }
  /** Not one of those that save a chart; where it is off, its reason follows. */
  const saveVersion = (from: Page) => button(from, viewport === 'phone' ? /^Save(\.|$)/ : 'Save version');
  afterAll(() => page?.context().close());

  test('the engineer signs in', async () => {
    page = await windowOf('engineer');
  });

  test('uploads paired logs and sees them decode', async () => {
    await uploadLogs(page, recordingName, logs);
    await page
      .getByText(/Waiting for a free worker|Decoding/)
      .first()
      .waitFor();
    await picture(page, 'main-path', `${viewport}-decoding`);
    await button(page, 'Open in bench').waitFor({ timeout: 60_000 });
    await page.getByText('Usable').first().waitFor();
  });

  test('opens the bench and watches frames arrive while the run goes on', async () => {
    await button(page, 'Open in bench').click();
    await heading(page, recordingName).waitFor();
    await page
      .getByRole('status')
      .filter({ hasText: /under way/ })
      .waitFor();
    await picture(page, 'main-path', `${viewport}-run-under-way`);
    await runIsDone(page);
    expect(watch.framesBeforeSummary[0]).toBeGreaterThan(1);
  });

  test('moves a slider, and a new run answers', async () => {
    const runsBefore = watch.summaries;
    if (viewport === 'phone') await button(page, 'Open the parameters').click();
    const slider = page.getByRole('slider', { name: 'Position σ × scale, GNSS' });
    const before = await slider.getAttribute('aria-valuenow');
    await dragAcross(page, slider, 0.5, 0.62);
    const after = Number(await slider.getAttribute('aria-valuenow'));
    expect(after).toBeGreaterThan(Number(before));
    await runIsDone(page);
    await expectEventually(
      () => watch.summaries,
      (count) => count > runsBefore,
    );
    await picture(page, 'main-path', `${viewport}-slider-moved`);
    if (viewport === 'phone') await button(page, 'Close the parameters').click();
  });

  test('draws an outage on the strip by dragging, and reads the drift', async () => {
    await dragAcross(page, strip(page), 0.5, 0.6);
    await page.getByRole('toolbar', { name: 'Selected outage window' }).waitFor();
    const headline = page.getByRole('region', { name: 'Headline figures' });
    await headline.getByText(DRIFT).waitFor();
    await runIsDone(page);
    const drift = await headlineFigure(page, DRIFT);
    expect(drift.unit).toBe('m');
    expect(drift.value).toBeGreaterThan(0.1);
    benchAddress = page.url();
  });

  test('saves a version with a note', async () => {
    await saveVersion(page).click();
    const dialog = page.getByRole('dialog', { name: 'Save as a version' });
    await dialog.getByLabel('Into').selectOption({ label: 'a new set' });
    await dialog.getByLabel('Name of the set').fill(setName);
    await dialog.getByLabel('What changed and why').fill(NOTE);
    await picture(page, 'main-path', `${viewport}-saving`);
    await dialog.getByRole('button', { name: 'Save version' }).click();
    await heading(page, setName).waitFor();
    await page.getByText(NOTE).filter({ visible: true }).first().waitFor();
  });

  test('a second person signs in and opens that version on the bench', async () => {
    const second = await windowOf('approver');
    await second.goto('/sets');
    await second.getByRole('link', { name: new RegExp(`^${setName}`) }).click();
    await heading(second, setName).waitFor();
    await second.getByText(NOTE).filter({ visible: true }).first().waitFor();
    await second.getByText(person('engineer').name).filter({ visible: true }).first().waitFor();
    await second
      .getByText(new RegExp(`^Tuned on ${recordingName}`))
      .filter({ visible: true })
      .first()
      .waitFor();
    await button(second, 'Open on the bench').filter({ visible: true }).first().click();
    await heading(second, recordingName).waitFor();
    await runIsDone(second);
    await second.getByText(DRIFT).waitFor();
    await picture(second, 'main-path', `${viewport}-second-person`);
    await second.context().close();
  });

  test('a viewer cannot save, in the client or past it', async () => {
    const viewer = await windowOf('viewer');
    await viewer.goto(benchAddress);
    const save = saveVersion(viewer);
    await save.waitFor();
    expect(await save.getAttribute('aria-disabled')).toBe('true');
    await save.click({ force: true });
    expect(await viewer.getByRole('dialog').count()).toBe(0);
    await picture(viewer, 'main-path', `${viewport}-viewer`);
    const version = { note: NOTE, parameters: defaultParameters() };
    const answer = await viewer.request.post(`${API_PREFIX}/parameter-sets`, {
      headers: { [CSRF_HEADER]: '1' },
      data: { name: 'Not mine to save', version },
    });
    expect(answer.status()).toBe(403);
    expect(((await answer.json()) as { type: string }).type).toBe('urn:driftwright:problem:forbidden');
    await viewer.context().close();
  });

  test('no page threw an error on the way', () => {
    expect(faults.flat()).toEqual([]);
  });
});

/** Waits until `read` answers something that `isRight` accepts. */
async function expectEventually<T>(read: () => T, isRight: (value: T) => boolean): Promise<void> {
  const deadline = Date.now() + 20_000;
  while (!isRight(read()) && Date.now() < deadline) await new Promise((resolve) => setTimeout(resolve, 50));
  expect(isRight(read())).toBe(true);
}

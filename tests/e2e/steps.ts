/** What people do again and again, by the words that they see. */
import type { Locator, Page } from 'playwright-core';
import type { LogFiles } from '@/tests/support/log-files';

export const field = (page: Page, label: string) => page.getByRole('textbox', { name: label, exact: true });
export const button = (page: Page, name: string | RegExp) => page.getByRole('button', { name });
export const heading = (page: Page, name: string | RegExp) => page.getByRole('heading', { name });

export async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto('/sign-in');
  await field(page, 'E-mail').fill(email);
  await field(page, 'Password').fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await heading(page, 'Today').waitFor();
}

/** Picks the files and sends them; resolves on the recording's own page. */
export async function uploadLogs(page: Page, name: string, files: LogFiles): Promise<void> {
  await sendLogs(page, name, files);
  await heading(page, name).waitFor();
}

/** Picks the files and presses Upload. */
export async function sendLogs(page: Page, name: string, files: LogFiles): Promise<void> {
  await page.goto('/recordings/upload');
  await chooseFile(page, 'IMU log', files.imu);
  await chooseFile(page, 'GNSS log', files.gnss);
  await field(page, 'Name').fill(name);
  await button(page, 'Upload').click();
}

/** Picks one file of the upload screen. */
export async function chooseFile(page: Page, what: string, file: string): Promise<void> {
  const chooser = page.waitForEvent('filechooser');
  await button(page, `Choose the ${what}`).click();
  await (await chooser).setFiles(file);
}

/** The bench's line about its run, once it says that the run is done. */
export const runIsDone = (page: Page) => page.getByRole('status').filter({ hasText: 'Run done' }).waitFor();

/** The strip at the head of the bench, on which windows are drawn. */
export const strip = (page: Page) => page.getByRole('group', { name: /Enter adds an outage window/ });

/** Drags with the mouse from one share of the element's width to another, at half its height. */
export async function dragAcross(page: Page, target: Locator, from: number, to: number): Promise<void> {
  await target.scrollIntoViewIfNeeded();
  const box = await target.boundingBox();
  if (!box) throw new Error('What is to be dragged on is not on screen.');
  const y = box.y + box.height / 2;
  await page.mouse.move(box.x + from * box.width, y);
  await page.mouse.down();
  for (const share of [0.25, 0.5, 0.75, 1]) {
    await page.mouse.move(box.x + (from + share * (to - from)) * box.width, y);
  }
  await page.mouse.up();
}

/** The number that a headline figure shows, read as a person does: its label, then the figure with its unit. */
export async function headlineFigure(page: Page, label: RegExp): Promise<{ value: number; unit: string }> {
  const text = await page.getByRole('region', { name: 'Headline figures' }).innerText();
  const lines = text.split('\n').map((line) => line.trim());
  const at = lines.findIndex((line) => label.test(line));
  const figure = (lines[at + 1] ?? '').match(/^([\d.\u2009\u202f ]*\d)[\s\u202f]*(\S*)$/);
  if (at < 0 || !figure) throw new Error(`No figure is shown for ${label}: ${text}`);
  return { value: Number(figure[1]!.replace(/[\s\u2009\u202f]/g, '')), unit: figure[2]! };
}

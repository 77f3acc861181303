/** From an empty installation to a team: the first admin, an invitation by mail, a forgotten password. */
import type { Browser, Page } from 'playwright-core';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { FIRST_ADMIN } from '@/tests/support/person';
import { Stack } from '@/tests/support/stack';
import { button, field, heading, signIn } from './steps';

const GUEST = { name: 'Ilo Marsh', email: 'ilo@kelmar.test', password: 'slack water at noon' };

let stack: Stack;
let browser: Browser;
let admin: Page;
let guest: Page;
const faults: string[][] = [];

beforeAll(async () => {
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!);
  browser = await launchBrowser();
  for (const viewport of ['wide', 'phone'] as const) {
    const window = await openWindow(browser, stack.url, { viewport });
    faults.push(window.faults);
    if (viewport === 'wide') admin = window.page;
    else guest = window.page;
  }
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
});

/** The link in the letter of that subject, which is the newest, as the admin reads it in the app. */
async function linkIn(subject: string): Promise<string> {
  await admin.goto('/mail');
  await heading(admin, subject).waitFor();
  const address = await admin.getByRole('main').getByRole('link').first().getAttribute('href');
  if (!address) throw new Error('The letter has no link.');
  return address;
}

test('the first visitor of an empty installation becomes its admin', async () => {
  await admin.goto('/');
  await heading(admin, 'Set up Driftwright').waitFor();
  await field(admin, 'Your name').fill(FIRST_ADMIN.name);
  await field(admin, 'E-mail').fill(FIRST_ADMIN.email);
  await field(admin, 'Password').fill('short');
  await field(admin, 'Workspace').fill('Kelmar survey');
  await button(admin, 'Set up and sign in').click();
  await admin.getByText('At least 10 characters.').first().waitFor();

  await field(admin, 'Password').fill(FIRST_ADMIN.password);
  await button(admin, 'Set up and sign in').click();
  await heading(admin, 'Today').waitFor();
});

test('an invitation goes out by mail, and the guest joins with it', async () => {
  await admin.goto('/team');
  await field(admin, 'E-mail').fill(GUEST.email);
  await button(admin, 'Invite').click();
  await admin.getByText(`${GUEST.email} is invited.`, { exact: false }).waitFor();

  await guest.goto(await linkIn(`${FIRST_ADMIN.name} invites you to Kelmar survey`));
  await heading(guest, 'Join Kelmar survey').waitFor();
  await field(guest, 'Your name').fill(GUEST.name);
  await field(guest, `Password for ${GUEST.email}`).fill(GUEST.password);
  await button(guest, 'Join').click();
  await heading(guest, 'Today').waitFor();

  await admin.goto('/team');
  await admin.getByText(GUEST.name).first().waitFor();
});

test('a password that was forgotten is replaced by mail, and the old one no longer works', async () => {
  const replaced = 'ebb tide before dawn';
  await guest.goto('/profile');
  await button(guest, 'Sign out').click();
  await guest.getByRole('link', { name: 'Forgot the password?' }).click();
  await field(guest, 'E-mail').fill(GUEST.email);
  await button(guest, 'Send the link').click();
  await guest.getByText('On its way', { exact: true }).waitFor();

  await guest.goto(await linkIn('Set a new password'));
  await field(guest, 'New password').fill(replaced);
  await button(guest, 'Change the password').click();
  await guest.getByText('The password is changed').waitFor();

  await guest.goto('/sign-in');
  await field(guest, 'E-mail').fill(GUEST.email);
  await field(guest, 'Password').fill(GUEST.password);
  await guest.getByRole('button', { name: 'Sign in', exact: true }).click();
  await guest.getByText('Not signed in').waitFor();
  await signIn(guest, GUEST.email, replaced);
});

test('no page threw an error on the way', () => {
  expect(faults.flat()).toEqual([]);
});

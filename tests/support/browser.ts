/** Chromium for tests. */
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { chromium, type Browser, type Page } from 'playwright-core';
import { findChromium } from '@/scripts/lib/chromium';
import { inRoot } from '@/scripts/lib/project';

export const VIEWPORTS = {
  phone: { width: 390, height: 844 },
  tablet: { width: 768, height: 1024 },
  wide: { width: 1440, height: 900 },
} as const;
export type ViewportName = keyof typeof VIEWPORTS;
export type ThemeName = 'paper' | 'night';

const FLAGS = [
  ...['--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'],
  ...['--disable-background-networking', '--disable-component-update', '--disable-sync'],
];
const WAIT_MS = 30_000;

export const launchBrowser = (): Promise<Browser> =>
  chromium.launch({ executablePath: findChromium(console.log), args: FLAGS });

export interface PageOptions {
  viewport: ViewportName;
  theme?: ThemeName;
}

const openPages = new Map<Page, string>();

/** A person's own window: cookies and storage are shared with nobody. Its errors are collected in `faults`. */
export async function openWindow(
  browser: Browser,
  baseURL: string,
  { viewport, theme = 'paper' }: PageOptions,
): Promise<{ page: Page; faults: string[] }> {
  const context = await browser.newContext({
    baseURL,
    viewport: VIEWPORTS[viewport],
    hasTouch: viewport === 'phone',
    colorScheme: theme === 'night' ? 'dark' : 'light',
    reducedMotion: 'reduce',
    locale: 'en-GB',
    timezoneId: 'UTC',
  });
  context.setDefaultTimeout(WAIT_MS);
  // tsx names functions through a helper that the page does not have.
  await context.addInitScript('globalThis.__name = (x) => x');
  const page = await context.newPage();
  const faults: string[] = [];
  openPages.set(page, viewport);
  page.on('close', () => openPages.delete(page));
  page.on('pageerror', (error) => faults.push(error.stack ?? error.message));
  return { page, faults };
}

/** Saves every open window under the name of a test that has just ended, well or not. */
export async function pictureAll(folder: string, name: string): Promise<void> {
  let count = 0;
  for (const [page, viewport] of openPages) await picture(page, folder, `${name}-${++count}-${viewport}`);
}

/** Saves what a person sees as artifacts/<folder>/<name>.png, which git ignores. */
export async function picture(page: Page, folder: string, name: string): Promise<void> {
  const target = inRoot('artifacts', folder);
  mkdirSync(target, { recursive: true });
  await page.screenshot({ path: path.join(target, `${name}.png`) });
}

/** The harness as a page in Chromium: bundled in memory, opened in the phone viewport. */
import { build } from 'esbuild';
import type { Browser, Page } from 'playwright-core';
import { inRoot } from '@/scripts/lib/project';
import { openWindow } from '@/tests/support/browser';

const EXTENSIONS = ['.web.tsx', '.web.ts', '.web.js', '.tsx', '.ts', '.mjs', '.js', '.json'];

export async function openHarness(browser: Browser): Promise<Page> {
  const script = await bundle();
  const { page, faults } = await openWindow(browser, 'http://localhost', { viewport: 'phone' });
  await page.setContent('<!doctype html><html><body style="margin:0"><div id="root"></div></body></html>');
  await page.addScriptTag({ content: script });
  if (faults.length > 0) throw new Error(`The harness does not start: ${faults.join('\n')}`);
  return page;
}

async function bundle(): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: [inRoot('tests/bench/charts/harness.tsx')],
    bundle: true,
    write: false,
    minify: true,
    format: 'iife',
    target: 'chrome110',
    jsx: 'automatic',
    mainFields: ['browser', 'module', 'main'],
    resolveExtensions: EXTENSIONS,
    alias: { 'react-native': 'react-native-web' },
    tsconfig: inRoot('tsconfig.json'),
    loader: { '.js': 'jsx', '.ttf': 'empty', '.png': 'empty' },
    define: {
      'process.env.NODE_ENV': '"production"',
      'process.env.EXPO_OS': '"web"',
      __DEV__: 'false',
      global: 'globalThis',
    },
    logLevel: 'error',
  });
  return outputFiles[0]!.text;
}

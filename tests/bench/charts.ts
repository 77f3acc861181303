/**
 * The charts in Chromium, rendered by software: what updates cost the main thread, redraws while a slider is dragged, the heap
 * over many runs, and the first load. `npm run bench -- charts [streaming|look|bench|load]`.
 */
import { launchBrowser } from '@/tests/support/browser';
import { benchLoad } from './charts/load';
import { benchLook } from './charts/look';
import { benchOnStack } from './charts/on-stack';
import { benchStreaming } from './charts/streaming';

const PARTS = { streaming: benchStreaming, look: benchLook, bench: benchOnStack, load: benchLoad } as const;

/** All parts, or those named. */
export async function benchCharts(names: readonly string[]): Promise<void> {
  const unknown = names.find((name) => !Object.hasOwn(PARTS, name));
  if (unknown) throw new Error(`There is no part "${unknown}". Parts: ${Object.keys(PARTS).join(', ')}.`);
  const browser = await launchBrowser();
  try {
    for (const [name, run] of Object.entries(PARTS))
      if (names.length === 0 || names.includes(name)) await run(browser);
  } finally {
    await browser.close();
  }
}

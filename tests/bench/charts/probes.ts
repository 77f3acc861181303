/** Watches an open bench from inside its page: redraws of curves, and when frames of which run arrive. */
import type { Page } from 'playwright-core';

export interface BenchLog {
  /** Animation frames in which a curve changed, ms of the page's clock. */
  redraws: number[];
  /** Frames as they arrive. */
  frames: { at: number; runId: string }[];
  /** Runs as the server takes them, and when they were asked for. */
  runs: { askedAt: number; runId: string }[];
  /** Releases of the slider. */
  releases: number[];
}

interface Watched {
  benchLog: BenchLog;
}

/** Before the page loads. */
export async function watchBench(page: Page): Promise<void> {
  await page.addInitScript(install);
}

export const benchLog = (page: Page): Promise<BenchLog> =>
  page.evaluate(() => (globalThis as unknown as Watched).benchLog);

export const clearLog = (page: Page): Promise<void> =>
  page.evaluate(() => {
    const { benchLog: log } = globalThis as unknown as Watched;
    for (const list of Object.values(log)) (list as unknown[]).length = 0;
  });

/** Runs in the page; refers to nothing outside itself. */
function install(): void {
  const log: BenchLog = { redraws: [], frames: [], runs: [], releases: [] };
  Object.assign(globalThis, { benchLog: log });
  addEventListener('pointerup', () => log.releases.push(performance.now()), true);

  let pending = false;
  const onChange = () => {
    if (pending) return;
    pending = true;
    const at = performance.now();
    queueMicrotask(() => {
      pending = false;
      log.redraws.push(at);
    });
  };
  // Curves of a plot are cut to it; strip and sliders are not.
  const watch = () =>
    new MutationObserver((changes) => {
      const curve = changes.some(
        ({ target }) => target instanceof SVGPathElement && target.closest('g[clip-path]') !== null,
      );
      if (curve) onChange();
    }).observe(document, { subtree: true, attributes: true, attributeFilter: ['d'] });
  watch();

  const decoder = new TextDecoder();
  const OwnSocket = class extends WebSocket {
    constructor(url: string | URL, protocols?: string | string[]) {
      super(url, protocols);
      this.addEventListener('message', ({ data }) => {
        if (!(data instanceof ArrayBuffer)) return;
        const head = decoder.decode(new Uint8Array(data, 4, new DataView(data).getUint32(0, true)));
        log.frames.push({ at: performance.now(), runId: (JSON.parse(head) as { runId: string }).runId });
      });
    }
  };
  globalThis.WebSocket = OwnSocket;

  const ownFetch = globalThis.fetch;
  globalThis.fetch = async (...request) => {
    const askedAt = performance.now();
    const answer = await ownFetch(...request);
    if (request[1]?.method === 'POST' && String(request[0]).endsWith('/runs')) {
      const { id } = (await answer.clone().json()) as { id: string };
      log.runs.push({ askedAt, runId: id });
    }
    return answer;
  };
}

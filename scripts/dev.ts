/** npm run dev: as npm start, and builds again what changes: the server restarts, the page is reloaded by hand. */
import { existsSync, watch } from 'node:fs';
import { buildClient, CLIENT_INPUTS } from './build/client-export';
import { buildServer, SERVER_INPUTS } from './build/server-bundle';
import { inRoot } from './lib/project';
import { pause } from './lib/shell';
import { start } from './start';
import type { Stack } from './start/stack';

/** A save touches several files. */
const SETTLE_MS = 200;

async function rebuild(stack: Stack, stopping: AbortSignal): Promise<void> {
  let changed = false;
  const watchers = [...new Set([...CLIENT_INPUTS, ...SERVER_INPUTS])]
    .filter((input) => existsSync(inRoot(input)))
    .map((input) => watch(inRoot(input), { recursive: true }, () => (changed = true)));
  while (!stopping.aborted) {
    await pause(SETTLE_MS);
    if (!changed) continue;
    changed = false;
    try {
      if (await buildServer()) {
        await stack.restartServer();
        console.log('The server runs the new code.');
      }
      if (await buildClient(console.log, stopping)) console.log('The client is new: reload the page.');
    } catch (error) {
      console.error(error instanceof Error ? error.message : error);
    }
  }
  for (const watcher of watchers) watcher.close();
}

void start({ startedAt: performance.now(), beside: rebuild });

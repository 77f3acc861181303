/** npm start: everything from a fresh clone to a running Driftwright. */
import { prepare } from './lib/prepare.mjs';

const startedAt = performance.now();
await prepare();
const { start } = await import('./start.ts');
await start(startedAt);

/** npm start: everything from a fresh clone to a running Driftwright. */
import { prepare } from './lib/prepare.mjs';

const startedAt = performance.now();
const require = await prepare();
await require('./start.ts').start({ startedAt });

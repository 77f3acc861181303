/** npm run worker: takes jobs off the queue of a running Driftwright, here or on another machine. */
import { prepare } from './lib/prepare.mjs';

const require = await prepare();
await require('./worker.ts').work();

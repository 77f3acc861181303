/** npm test: every check there is, from a fresh clone. */
import { prepare } from './lib/prepare.mjs';

const require = await prepare();
await require('./test.ts').test(process.argv.slice(2));

/** A process that opens a pool, names its children on stdout, keeps one busy and waits to be killed. */
import { createPool } from '@/workers/pool';
import { runOf } from './static-recording';

const [entry, root] = process.argv.slice(2) as [string, string];
const log = { info: () => undefined, warn: () => undefined, error: () => undefined };
const pool = createPool({ size: 2, entry, store: { kind: 'folder', root }, log });
let named = false;
const onEvent = () => {
  if (!named) process.stdout.write(JSON.stringify(pool.pids));
  named = true;
};
pool.submit(runOf('long', 'orphan'), { onEvent }).result.catch(() => undefined);

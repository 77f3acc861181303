/** Before the browser tests: what the API tests have, and a built client and server. */
import { buildAll } from '../../scripts/build';
import startPostgres from './global-postgres';

export default async function setup(): Promise<void> {
  await buildAll(console.log);
  await startPostgres();
}

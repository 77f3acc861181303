/** npm run build: client and server, each only where something has changed. */
import { buildClient } from './build/client-export';
import { buildServer } from './build/server-bundle';
import { failWith } from './lib/project';

/** Brings dist/ up to date. */
export async function buildAll(log: (line: string) => void, signal?: AbortSignal): Promise<void> {
  await buildServer();
  await buildClient(log, signal);
}

if (require.main === module) {
  buildAll(console.log).then(() => console.log('dist/ is up to date.'), failWith);
}

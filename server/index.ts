/** The server's entry point: reads the environment, starts, stops on a signal; a second signal does not wait. */
import { ConfigError, loadConfig } from './config';
import { startServer } from './start';

export { loadConfig } from './config';
export { startServer, type RunningServer } from './start';

async function main(): Promise<void> {
  const starting = startServer(loadConfig(process.env));
  let asked = false;
  const stop = () => {
    if (asked) process.exit(130);
    asked = true;
    starting.then((server) => server.stop()).then(
      () => process.exit(0),
      (error: unknown) => fail(error),
    ); // prettier-ignore
  };
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, stop);
  // Whoever started us over a channel waits for this word; when it is gone, so are we.
  process.on('disconnect', stop);
  await starting;
  process.send?.('ready');
}

function fail(error: unknown): never {
  console.error(error instanceof ConfigError ? error.message : error);
  process.exit(1);
}

if (require.main === module) main().catch(fail);

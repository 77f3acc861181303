/** The server's entry point: reads the environment, starts, stops on a signal; a second signal does not wait. */
import { ConfigError, loadConfig } from './config';
import { startServer } from './start';

export { loadConfig } from './config';
export { startServer, type RunningServer } from './start';

async function main(): Promise<void> {
  const server = await startServer(loadConfig(process.env));
  let asked = false;
  const stop = () => {
    if (asked) process.exit(130);
    asked = true;
    server.stop().then(
      () => process.exit(0),
      (error: unknown) => {
        server.ctx.log.error({ err: error }, 'the stop was not clean');
        process.exit(1);
      },
    );
  };
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, stop);
  // Whoever started us over a channel waits for this word; when it is gone, so are we.
  process.send?.('ready');
  process.on('disconnect', stop);
}

if (require.main === module) {
  main().catch((error: unknown) => {
    process.stderr.write(
      error instanceof ConfigError ? `${error.message}\n` : `${String((error as Error).stack)}\n`,
    );
    process.exit(1);
  });
}

/** What the entry points share: start, stop on a signal; a second signal does not wait. */
import { ConfigError } from './config';

/** Runs what `start` answers until somebody asks for its end. */
export async function runUntilStopped(start: () => Promise<{ stop(): Promise<void> }>): Promise<void> {
  const starting = start();
  let asked = false;
  const stop = () => {
    if (asked) process.exit(130);
    asked = true;
    starting.then((running) => running.stop()).then(
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

/** The last words: one line for what the operator can mend. */
export function fail(error: unknown): never {
  const words = error instanceof ConfigError ? error.message : String((error as Error)?.stack ?? error);
  process.stderr.write(`${words}\n`);
  process.exit(1);
}

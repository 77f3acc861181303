/** The server's entry point: reads the environment, starts, stops on a signal; a second signal does not wait. */
import { loadConfig } from './config';
import { fail, runUntilStopped } from './main';
import { startServer } from './start';

export { loadConfig } from './config';
export { startServer, type RunningServer } from './start';

if (require.main === module) {
  runUntilStopped(async () => startServer(loadConfig(process.env))).catch(fail);
}

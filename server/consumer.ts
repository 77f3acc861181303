/** Entry point of a process that takes jobs off the queue and has no HTTP side. */
import { loadConfig } from './config';
import { fail, runUntilStopped } from './main';
import { startConsumer } from './start-consumer';

if (require.main === module) {
  runUntilStopped(async () => startConsumer(loadConfig(process.env))).catch(fail);
}

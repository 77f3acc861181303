/** After the API tests: nothing stays. */
import { rmSync } from 'node:fs';
import './global-postgres';

export default async function teardown(): Promise<void> {
  await globalThis.testStack?.postgres.stop();
  if (globalThis.testStack) rmSync(globalThis.testStack.folder, { recursive: true, force: true });
}

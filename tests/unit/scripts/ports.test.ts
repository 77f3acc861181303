import { createServer } from 'node:net';
import { once } from 'node:events';
import { freePort, isPortFree } from '@/scripts/lib/ports';

test('a port counts as busy exactly while somebody listens on it', async () => {
  const port = await freePort();
  expect(await isPortFree(port)).toBe(true);
  const server = createServer().listen(port, '127.0.0.1');
  await once(server, 'listening');
  expect(await isPortFree(port)).toBe(false);
  server.close();
  await once(server, 'close');
  expect(await isPortFree(port)).toBe(true);
});

import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { takeLock } from '@/scripts/start/lock';

let folder: string;
const lockFile = () => path.join(folder, 'running.json');
beforeEach(() => (folder = mkdtempSync(path.join(tmpdir(), 'driftwright-lock-'))));
afterEach(() => rmSync(folder, { recursive: true, force: true }));

test('a free folder is taken, and released without a trace', () => {
  const lock = takeLock(folder, 'http://127.0.0.1:4600');
  expect(lock.taken).toBe(true);
  expect(JSON.parse(readFileSync(lockFile(), 'utf8'))).toEqual({
    pid: process.pid,
    address: 'http://127.0.0.1:4600',
  });
  if (lock.taken) lock.release();
  expect(() => readFileSync(lockFile())).toThrow(/ENOENT/);
});

test('while the start command lives, the second one is told where', async () => {
  const other = spawn(process.execPath, ['-e', 'process.stdin.resume()', 'scripts/start.mjs'], {
    stdio: ['pipe', 'ignore', 'ignore'],
  });
  await once(other, 'spawn');
  const holder = { pid: other.pid, address: 'http://127.0.0.1:4633' };
  writeFileSync(lockFile(), JSON.stringify(holder));
  expect(takeLock(folder, 'http://127.0.0.1:4600')).toEqual({ taken: false, holder });

  other.kill();
  await once(other, 'exit');
  expect(takeLock(folder, 'http://127.0.0.1:4600').taken).toBe(true);
});

test.each([
  ['belongs to another program by now', JSON.stringify({ pid: 1, address: 'http://127.0.0.1:4600' })],
  ['was cut short', '{"pid": 12'],
])('a lock that %s is taken over', (_, content) => {
  writeFileSync(lockFile(), content);
  expect(takeLock(folder, 'http://127.0.0.1:4600').taken).toBe(true);
});

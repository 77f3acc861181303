import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { hashInputs } from '@/scripts/build/stamp';

test('the hash of a build’s inputs changes with a content and with a new file, and with nothing else', () => {
  const root = mkdtempSync(path.join(tmpdir(), 'driftwright-stamp-'));
  const write = (name: string, text: string) => writeFileSync(path.join(root, 'app', name), text);
  mkdirSync(path.join(root, 'app'));
  write('a.ts', 'one');
  const first = hashInputs(['app'], root);
  write('a.ts', 'one');
  expect(hashInputs(['app', 'no-such-folder'], root)).toBe(first);
  write('a.ts', 'two');
  const second = hashInputs(['app'], root);
  expect(second).not.toBe(first);
  write('b.ts', '');
  expect(hashInputs(['app'], root)).not.toBe(second);
  rmSync(root, { recursive: true, force: true });
});

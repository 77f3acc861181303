import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { tar, type TarEntry } from '@/server/exports/tar';

const entry = (at: string, text: string): TarEntry => {
  const content = Buffer.from(text, 'utf8');
  return { path: at, bytes: content.byteLength, content: [content] };
};
async function* listed(entries: TarEntry[]): AsyncGenerator<TarEntry> {
  yield* entries;
}
async function archive(...entries: TarEntry[]): Promise<Buffer> {
  const parts = [];
  for await (const part of tar(listed(entries), new Date('2026-01-02T03:04:05Z'))) parts.push(part);
  return Buffer.concat(parts);
}

describe('a tar archive', () => {
  it('is unpacked by tar: empty files, whole blocks, long paths', async () => {
    const long = `${'folder-of-some-length/'.repeat(6)}${'name'.repeat(20)}.json`;
    const bytes = await archive(entry('a.txt', 'Kelmar Haven\n'), entry('empty', ''), entry('block', 'x'.repeat(512)), entry(long, '{}')); // prettier-ignore
    expect(bytes.length % 512).toBe(0);
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-tar-'));
    execFileSync('tar', ['-xf', '-', '-C', folder], { input: bytes });
    const read = (file: string) => fs.readFileSync(path.join(folder, file), 'utf8');
    expect([read('a.txt'), read('empty'), read('block').length, read(long)]).toEqual([
      'Kelmar Haven\n',
      '',
      512,
      '{}',
    ]);
    expect(fs.statSync(path.join(folder, 'a.txt')).mtime.toISOString()).toBe('2026-01-02T03:04:05.000Z');
    fs.rmSync(folder, { recursive: true, force: true });
  });

  it('refuses a path that does not fit, and a content of another length', async () => {
    await expect(archive(entry('x'.repeat(101), ''))).rejects.toThrow(/too long/);
    await expect(archive({ ...entry('a', 'four'), bytes: 5 })).rejects.toThrow(
      'a was said to have 5 bytes and has 4.',
    );
  });
});

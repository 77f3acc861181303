/** The store on a local folder. A key is a file below the root; temporary files wait in a folder beside. */
import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdir, open, readFile, readdir, rename, rm, stat, type FileHandle } from 'node:fs/promises';
import { hostname } from 'node:os';
import { dirname, join } from 'node:path';
import { Readable } from 'node:stream';
import { assertStoreKey, assertStorePrefix } from './keys';
import { StoreFailed, StoreKeyMissing, type Store } from './types';

/** Keys never start with a dot, so this folder cannot be one of them. */
const TEMPORARY = '.incoming';

export class FolderStore implements Store {
  /** `root` is made when it is missing. */
  constructor(private readonly root: string) {}

  async put(key: string, source: Readable | Uint8Array): Promise<{ bytes: number }> {
    const target = this.pathOf(key);
    const temporary = this.temporaryPath();
    try {
      const handle = await this.openFor(temporary);
      try {
        await writeAll(handle, source);
        await handle.sync();
      } finally {
        await handle.close();
      }
      const { size } = await stat(temporary);
      await moveInto(temporary, target);
      return { bytes: size };
    } catch (error) {
      if (source instanceof Readable) source.destroy();
      await rm(temporary, { force: true }).catch(() => undefined);
      throw inPlainWords(error, 'write');
    }
  }

  async adopt(key: string, localPath: string): Promise<{ bytes: number }> {
    const target = this.pathOf(key);
    try {
      const { size } = await stat(localPath);
      await syncFile(localPath);
      await moveInto(localPath, target);
      return { bytes: size };
    } catch (error) {
      if (!isCode(error, 'EXDEV')) throw inPlainWords(error, 'write');
      const copied = await this.put(key, createReadStream(localPath));
      await rm(localPath, { force: true });
      return copied;
    }
  }

  async stream(key: string): Promise<Readable> {
    try {
      const handle = await open(this.pathOf(key), 'r');
      return handle.createReadStream({ highWaterMark: 64 * 1024 });
    } catch (error) {
      throw missingOr(error, key);
    }
  }

  async bytes(key: string): Promise<Uint8Array> {
    try {
      return await readFile(this.pathOf(key));
    } catch (error) {
      throw missingOr(error, key);
    }
  }

  async has(key: string): Promise<boolean> {
    return (await this.statOf(key)) !== null;
  }

  async size(key: string): Promise<number> {
    const found = await this.statOf(key);
    if (!found) throw new StoreKeyMissing(key);
    return found.size;
  }

  async list(prefix: string): Promise<string[]> {
    assertStorePrefix(prefix);
    const folder = prefix.slice(0, prefix.lastIndexOf('/') + 1);
    const entries = await this.entriesBelow(folder);
    return entries.filter((key) => key.startsWith(prefix));
  }

  async removePrefix(prefix: string): Promise<void> {
    try {
      if (prefix.endsWith('/')) {
        assertStorePrefix(prefix);
        // A worker that was just told to stop may put one more file in while the folder is being emptied.
        const again = { maxRetries: 10, retryDelay: 20 };
        await rm(join(this.root, prefix), { recursive: true, force: true, ...again });
      } else {
        for (const key of await this.list(prefix)) await rm(this.pathOf(key), { force: true });
      }
    } catch (error) {
      throw inPlainWords(error, 'remove');
    }
  }

  /**
   * Removes what puts of dead processes left behind. Files of other machines that share the folder stay.
   * `pid`: only what that process left; left out: whatever belongs to no living process.
   */
  async sweep(pid?: number): Promise<void> {
    const names = await readdir(join(this.root, TEMPORARY)).catch(() => []);
    for (const name of names) {
      const [owner, ownerPid] = name.split('~');
      if (owner !== ownerName()) continue;
      const dead = pid === undefined ? !isAlive(Number(ownerPid)) : Number(ownerPid) === pid;
      if (dead) await rm(join(this.root, TEMPORARY, name), { force: true });
    }
  }

  private pathOf(key: string): string {
    assertStoreKey(key);
    return join(this.root, key);
  }

  private temporaryPath(): string {
    return join(this.root, TEMPORARY, `${ownerName()}~${process.pid}~${randomUUID()}`);
  }

  private async openFor(path: string): Promise<FileHandle> {
    try {
      return await open(path, 'wx');
    } catch (error) {
      if (!isCode(error, 'ENOENT')) throw error;
      await mkdir(dirname(path), { recursive: true });
      return open(path, 'wx');
    }
  }

  private async statOf(key: string) {
    try {
      const found = await stat(this.pathOf(key));
      return found.isFile() ? found : null;
    } catch (error) {
      if (isCode(error, 'ENOENT') || isCode(error, 'ENOTDIR')) return null;
      throw inPlainWords(error, 'read');
    }
  }

  private async entriesBelow(folder: string): Promise<string[]> {
    try {
      const entries = await readdir(join(this.root, folder), { recursive: true, withFileTypes: true });
      const base = join(this.root, folder);
      return entries
        .filter((entry) => entry.isFile())
        .map((entry) => folder + join(entry.parentPath, entry.name).slice(base.length).replace(/^\//, ''));
    } catch (error) {
      if (isCode(error, 'ENOENT') || isCode(error, 'ENOTDIR')) return [];
      throw inPlainWords(error, 'read');
    }
  }
}

async function writeAll(handle: FileHandle, source: Readable | Uint8Array): Promise<void> {
  if (source instanceof Uint8Array) return handle.writeFile(source);
  for await (const chunk of source as AsyncIterable<Uint8Array>) await handle.writeFile(chunk);
}

/** Renames within the store and makes the new name durable. */
async function moveInto(from: string, to: string): Promise<void> {
  try {
    await rename(from, to);
  } catch (error) {
    if (!isCode(error, 'ENOENT')) throw error;
    await mkdir(dirname(to), { recursive: true });
    await rename(from, to);
  }
  await syncFile(dirname(to));
}

async function syncFile(path: string): Promise<void> {
  const handle = await open(path, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

const ownerName = () => hostname().replace(/[^A-Za-z0-9.-]/g, '-');
const isCode = (error: unknown, code: string) => (error as NodeJS.ErrnoException | null)?.code === code;

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return isCode(error, 'EPERM');
  }
}

const missingOr = (error: unknown, key: string) =>
  isCode(error, 'ENOENT') || isCode(error, 'EISDIR') || isCode(error, 'ENOTDIR')
    ? new StoreKeyMissing(key)
    : inPlainWords(error, 'read');

const REASONS: Record<string, string> = {
  ENOSPC: 'the disk is full. Free some space, then try again.',
  EDQUOT: 'the disk quota is used up. Free some space, then try again.',
  EACCES: 'the program may not touch the folder. Check who owns it.',
  EPERM: 'the program may not touch the folder. Check who owns it.',
  EROFS: 'the disk is mounted read-only.',
  EMFILE: 'too many files are open. Try again in a moment.',
  ENFILE: 'too many files are open. Try again in a moment.',
  EIO: 'the disk reports a fault. Check the disk.',
  ENOTDIR: 'a file stands where a folder belongs.',
};

/** System faults become StoreFailed; anything else (a fault of the source, say) passes unchanged. */
function inPlainWords(error: unknown, doing: 'read' | 'write' | 'remove'): unknown {
  const code = (error as NodeJS.ErrnoException | null)?.code;
  const reason = code === undefined ? undefined : REASONS[code];
  if (code === undefined || reason === undefined) return error;
  return new StoreFailed(code, `The file store could not ${doing} a file: ${reason}`, { cause: error });
}

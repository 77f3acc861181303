/** Where uploads are received, a folder a process, so that what a dead one left is known as such. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { codeOf } from '../error-details';

const machine = os.hostname().replace(/[^A-Za-z0-9-]/g, '-');

export const uploadFolder = (dataDir: string): string =>
  path.join(dataDir, 'uploads', `${machine}.${process.pid}`);

/** Removes what dead processes of this machine left, and makes this one's own folder afresh. */
export async function sweepUploads(dataDir: string): Promise<void> {
  const root = path.join(dataDir, 'uploads');
  await fs.promises.mkdir(root, { recursive: true });
  for (const name of await fs.promises.readdir(root)) {
    const [host, pid] = name.split('.');
    if (host === machine && isDead(Number(pid))) {
      await fs.promises.rm(path.join(root, name), { recursive: true, force: true });
    }
  }
  await fs.promises.mkdir(uploadFolder(dataDir), { recursive: true });
}

function isDead(pid: number): boolean {
  if (pid === process.pid) return true; // an earlier process of the same number
  try {
    process.kill(pid, 0);
    return false;
  } catch (error) {
    return codeOf(error) !== 'EPERM';
  }
}

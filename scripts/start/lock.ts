/** One Driftwright a data folder: a file names the process that runs there. */
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';

export interface Holder {
  pid: number;
  address: string;
}

export type Lock = { taken: true; release(): void } | { taken: false; holder: Holder };

/** Takes the lock of `dataFolder`, or says who holds it. One left behind by a dead process is taken over. */
export function takeLock(dataFolder: string, address: string): Lock {
  mkdirSync(dataFolder, { recursive: true });
  const file = path.join(dataFolder, 'running.json');
  const holder = readHolder(file);
  if (holder && isDriftwright(holder.pid)) return { taken: false, holder };
  rmSync(file, { force: true });
  // Fails where somebody else was quicker by a moment.
  writeFileSync(file, JSON.stringify({ pid: process.pid, address } satisfies Holder), { flag: 'wx' });
  return { taken: true, release: () => rmSync(file, { force: true }) };
}

function readHolder(file: string): Holder | undefined {
  if (!existsSync(file)) return undefined;
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as Holder;
  } catch {
    return undefined; // cut short by a kill
  }
}

/** The number of a dead process may belong to another program by now, so its command line is asked as well. */
function isDriftwright(pid: number): boolean {
  if (pid === process.pid) return false;
  const commandLine = `/proc/${pid}/cmdline`;
  return existsSync(commandLine) && /scripts\/(start|dev)\b/.test(readFileSync(commandLine, 'utf8'));
}

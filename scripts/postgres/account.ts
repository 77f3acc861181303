/** The account that the database server runs as: PostgreSQL refuses to run as root. */
import { chownSync, existsSync, readFileSync } from 'node:fs';
import { userInfo } from 'node:os';
import path from 'node:path';
import { isRoot, run } from '../lib/shell';

/** `uid` and `gid` are set only where they differ from our own, which is when we are root. */
export interface Account {
  name: string;
  uid?: number;
  gid?: number;
}

/** Ourselves; for root the account "postgres" that Debian's package makes, else "nobody". */
export function databaseAccount(): Account {
  if (!isRoot()) return { name: userInfo().username };
  const rows = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .map((line) => line.split(':'));
  const row = rows.find(([name]) => name === 'postgres') ?? rows.find(([name]) => name === 'nobody');
  if (!row) throw new Error('Running as root, and there is no account "postgres" to run the database as.');
  return { name: row[0]!, uid: Number(row[2]), gid: Number(row[3]) };
}

/** Whether the account can enter `folder`, or the nearest parent that exists (root's own home is closed to it). */
export function canEnter(account: Account, folder: string): boolean {
  if (account.uid === undefined) return true;
  let nearest = path.resolve(folder);
  while (!existsSync(nearest)) nearest = path.dirname(nearest);
  return run('/usr/bin/test', ['-x', nearest], { uid: account.uid, gid: account.gid }).ok;
}

/** Hands a file or folder over to the account. */
export function giveTo(account: Account, target: string): void {
  if (account.uid !== undefined && account.gid !== undefined) chownSync(target, account.uid, account.gid);
}

/** The files of a private PostgreSQL cluster: its folder, its passwords, what initdb makes. */
import { createHash, randomBytes } from 'node:crypto';
import {
  chmodSync,
  existsSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { run } from '../lib/shell';
import { canEnter, giveTo, type Account } from './account';
import { findPostgres } from './binaries';

/** Kept beside the data, readable by its owner alone. */
export interface Secret {
  adminPassword: string;
  password: string;
  /** The port of last time, taken again where it is free; 0 at first. */
  port: number;
  /** Role and database have been made. */
  ready: boolean;
}

export interface Cluster {
  home: string;
  data: string;
  logFile: string;
  secretFile: string;
  programs: string;
  account: Account;
  throwaway: boolean;
}

/** Opens the cluster in `folder` (a temporary one when undefined) and makes it where there is none yet. */
export function openCluster(
  account: Account,
  folder: string | undefined,
  log: (line: string) => void,
): Cluster {
  const home = folder === undefined ? temporaryHome(account) : keptHome(account, folder, log);
  const data = path.join(home, 'data');
  const secretFile = path.join(home, 'secret.json');
  const versionFile = path.join(data, 'PG_VERSION');
  const major = existsSync(versionFile) ? readFileSync(versionFile, 'utf8').trim() : undefined;
  if (major && !existsSync(secretFile)) {
    throw new Error(
      `${secretFile}, which holds the password of the database in ${data}, is missing. ` +
        `Put it back, or move ${home} away to start with an empty database.`,
    );
  }
  const programs = findPostgres(major);
  if (!programs) throw new Error(missingVersion(data, major));
  const cluster: Cluster = {
    home,
    data,
    secretFile,
    programs,
    account,
    logFile: path.join(home, 'server.log'),
    throwaway: folder === undefined,
  };
  if (!major) initialise(cluster);
  return cluster;
}

export const readSecret = (cluster: Cluster): Secret =>
  JSON.parse(readFileSync(cluster.secretFile, 'utf8')) as Secret;

export const writeSecret = (cluster: Cluster, secret: Secret): void =>
  writeFileSync(cluster.secretFile, JSON.stringify(secret), { mode: 0o600 });

/** Options with which the database's own programs are started. */
export const runAs = ({ account, home }: Cluster) => ({
  uid: account.uid,
  gid: account.gid,
  cwd: home,
  env: { PATH: process.env.PATH, LC_ALL: 'C.UTF-8', HOME: home } as unknown as NodeJS.ProcessEnv,
});

/** The server that really holds this data folder, if any; a pid file that lies is removed. */
export function runningServer(data: string): { pid: number; port: number } | undefined {
  const pidFile = path.join(data, 'postmaster.pid');
  if (!existsSync(pidFile)) return undefined;
  const lines = readFileSync(pidFile, 'utf8').split('\n');
  const pid = Number(lines[0]);
  const commandLine = `/proc/${pid}/cmdline`;
  const command = existsSync(commandLine) ? readFileSync(commandLine, 'utf8') : '';
  if (command.includes('postgres') && command.includes(data)) return { pid, port: Number(lines[3]) };
  // Left behind by a kill or a power cut; the number may belong to another program by now.
  rmSync(pidFile, { force: true });
  return undefined;
}

function missingVersion(data: string, major: string | undefined): string {
  return major
    ? `The database in ${data} needs PostgreSQL ${major}. Install it (apt-get install postgresql-${major}), or set DATABASE_URL.`
    : 'PostgreSQL was not found. Install it (apt-get install postgresql), or set DATABASE_URL.';
}

function temporaryHome(account: Account): string {
  const base = canEnter(account, tmpdir()) ? tmpdir() : '/var/tmp';
  const home = mkdtempSync(path.join(base, 'driftwright-postgres-'));
  giveTo(account, home);
  return home;
}

/** Where the cluster of `folder` lies: elsewhere where its account cannot enter the folder. */
export function homeOf(account: Account, folder: string): string {
  const home = path.resolve(folder);
  if (canEnter(account, path.dirname(home))) return home;
  const tag = createHash('sha256').update(home).digest('hex').slice(0, 10);
  return `/var/tmp/driftwright-postgres-${tag}`;
}

function keptHome(account: Account, folder: string, log: (line: string) => void): string {
  mkdirSync(path.dirname(path.resolve(folder)), { recursive: true });
  const home = homeOf(account, folder);
  if (home !== path.resolve(folder)) {
    log(`The database is kept in ${home}: account "${account.name}" cannot enter the project's folder.`);
  }
  mkdirSync(home, { recursive: true });
  // /var/tmp is everybody's: never adopt a folder or a link that somebody else put there.
  const found = lstatSync(home);
  if (!found.isDirectory() || ![process.getuid?.(), account.uid].includes(found.uid)) {
    throw new Error(
      `${home} belongs to another user (uid ${found.uid}). Move it away, or set DATA_DIR to another folder.`,
    );
  }
  giveTo(account, home);
  chmodSync(home, 0o700);
  return home;
}

function initialise(cluster: Cluster): void {
  const { home, data, programs, account, throwaway } = cluster;
  // Renamed when complete, so that an interrupted initdb never looks like a cluster.
  const unfinished = `${data}.new`;
  rmSync(unfinished, { recursive: true, force: true });
  const secret = { adminPassword: newPassword(), password: newPassword(), port: 0, ready: false };
  const passwordFile = path.join(home, 'password');
  writeFileSync(passwordFile, secret.adminPassword, { mode: 0o600 });
  giveTo(account, passwordFile);
  const result = run(
    path.join(programs, 'initdb'),
    [
      ...['-D', unfinished, '-U', 'postgres', '-A', 'scram-sha-256', `--pwfile=${passwordFile}`],
      ...['-E', 'UTF8', '--locale=C.UTF-8', throwaway ? '--no-sync' : '--data-checksums'],
    ],
    runAs(cluster),
  );
  rmSync(passwordFile, { force: true });
  if (!result.ok) throw new Error(`PostgreSQL's initdb failed in ${home}: ${result.stderr.trim()}`);
  writeSecret(cluster, secret);
  renameSync(unfinished, data);
}

const newPassword = () => randomBytes(18).toString('hex');

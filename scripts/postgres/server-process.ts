/** The running database server: started under a supervisor that outlives no parent. */
import { spawn, type ChildProcess } from 'node:child_process';
import { closeSync, openSync, readFileSync } from 'node:fs';
import type { Socket } from 'node:net';
import path from 'node:path';
import { freePort, isPortFree } from '../lib/ports';
import { ended, hasEnded, pause, run } from '../lib/shell';
import { giveTo } from './account';
import { runAs, type Cluster } from './cluster';

export interface ServerProcess {
  port: number;
  /** Resolves when the server is gone, for whatever reason. */
  ended: Promise<void>;
  stop(): Promise<void>;
}

/**
 * Holds the read end of a pipe from us. However we die (also by kill -9) the pipe closes,
 * and the server is told to shut down fast, so that no orphan stays.
 */
const SUPERVISOR = `exec 3<&0
"$@" </dev/null 3<&- & server=$!
( cat <&3 >/dev/null; kill -INT $server 2>/dev/null ) & watcher=$!
exec 3<&-
trap 'kill -INT $server 2>/dev/null' TERM INT HUP
while :; do wait $server; status=$?; kill -0 $server 2>/dev/null || break; done
kill $watcher 2>/dev/null; exit $status`;

const KEPT = { shared_buffers: '128MB' };
/** Loses everything in a power cut, which is what a throwaway database may do; in return it is fast. */
const THROWAWAY = {
  fsync: 'off',
  synchronous_commit: 'off',
  full_page_writes: 'off',
  shared_buffers: '64MB',
  max_wal_size: '512MB',
  autovacuum: 'off',
};
const ATTEMPTS = 6;
const READY_LIMIT_MS = 60_000; // crash recovery may take a while
const STOP_LIMIT_MS = 20_000;

/** Starts the server on `preferredPort`, or a free one where that is 0 or taken. Throws with the end of the log. */
export async function startServer(cluster: Cluster, preferredPort: number): Promise<ServerProcess> {
  for (let attempt = 0; attempt < ATTEMPTS; attempt++) {
    const again = preferredPort > 0 && (await isPortFree(preferredPort));
    const port = again ? preferredPort : await freePort();
    const child = launch(cluster, port);
    if (await becomesReady(cluster, child, port)) {
      // Neither the process nor its pipe keeps our event loop alive.
      child.unref();
      (child.stdin as Socket).unref();
      return { port, ended: ended(child), stop: stopper(child) };
    }
    child.stdin?.end();
    // The port was taken meanwhile, or processes of a killed server are still leaving.
    await pause(500 * (attempt + 1));
  }
  const end = readFileSync(cluster.logFile, 'utf8').trim().split('\n').slice(-6).join('\n');
  throw new Error(`PostgreSQL did not start. The end of ${cluster.logFile}:\n${end}`);
}

function launch(cluster: Cluster, port: number): ChildProcess {
  const settings: Record<string, string> = {
    listen_addresses: '127.0.0.1',
    port: String(port),
    unix_socket_directories: '',
    max_connections: '120',
    jit: 'off',
    ...(cluster.throwaway ? THROWAWAY : KEPT),
  };
  const log = openSync(cluster.logFile, 'a', 0o600);
  giveTo(cluster.account, cluster.logFile);
  const child = spawn(
    '/bin/bash',
    [
      ...['-c', SUPERVISOR, 'driftwright-postgres'],
      ...[path.join(cluster.programs, 'postgres'), '-D', cluster.data],
      ...Object.entries(settings).flatMap(([name, value]) => ['-c', `${name}=${value}`]),
    ],
    { ...runAs(cluster), detached: true, stdio: ['pipe', log, log] },
  );
  closeSync(log);
  child.stdin?.on('error', () => undefined); // the supervisor may be gone before its pipe is closed
  return child;
}

async function becomesReady(cluster: Cluster, child: ChildProcess, port: number): Promise<boolean> {
  const probe = path.join(cluster.programs, 'pg_isready');
  const deadline = Date.now() + READY_LIMIT_MS;
  while (!hasEnded(child) && Date.now() < deadline) {
    if (run(probe, ['-q', '-h', '127.0.0.1', '-p', String(port)]).ok) return !hasEnded(child);
    await pause(25);
  }
  return false;
}

function stopper(child: ChildProcess): () => Promise<void> {
  let stopping: Promise<void> | undefined;
  return () => (stopping ??= stop(child));
}

async function stop(child: ChildProcess): Promise<void> {
  if (hasEnded(child)) return;
  child.ref();
  child.stdin?.end();
  const force = setTimeout(() => killGroup(child), STOP_LIMIT_MS);
  await ended(child);
  clearTimeout(force);
}

/** The child was started detached: its group holds the supervisor and its server alone. */
function killGroup(child: ChildProcess): void {
  if (child.pid === undefined || hasEnded(child)) return;
  process.kill(-child.pid, 'SIGQUIT');
}

/** Everything a service may need from outside, handed down; tests swap members. */
import type { Logger } from 'pino';
import type { Role } from '@/shared/contracts/roles';
import type { Pool, Store } from '@/workers';
import type { Config } from './config';
import type { Instance } from './instance';
import type { Mailer } from './mail/mailer';
import type { Database } from './models';
import type { Queue } from './queue/queue';
import type { Live } from './realtime/live';
import type { ActiveJobs } from './services/active-jobs';
import type { ActiveRuns } from './services/active-runs';

export interface Context {
  config: Config;
  log: Logger;
  db: Database;
  store: Store;
  pool: Pool;
  queue: Queue;
  mail: Mailer;
  live: Live;
  instance: Instance;
  activeRuns: ActiveRuns;
  activeJobs: ActiveJobs;
  clock: () => Date;
  /** Aborted when the server stops: whoever waits or retries ends then. */
  stopping: AbortSignal;
}

/** A signed-in person, not yet in any workspace. */
export interface Person {
  userId: string;
  name: string;
  email: string;
  /** Where the request came from. */
  address: string | null;
  memberships: { workspaceId: string; workspaceName: string; role: Role }[];
}

/** A person at work in one workspace. */
export interface Actor extends Person {
  workspaceId: string;
  workspaceName: string;
  role: Role;
}

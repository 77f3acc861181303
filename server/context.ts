/** Everything a service may need from outside, handed down; tests swap members. */
import type { Logger } from 'pino';
import type { Preferences } from '@/shared/contracts/preferences';
import type { Role, TokenScope } from '@/shared/contracts/roles';
import type { Pool, Store } from '@/workers';
import type { Config } from './config';
import type { Instance } from './instance';
import type { Mailer } from './mail/mailer';
import type { Database } from './models';
import type { Queue } from './queue/queue';
import type { Live } from './realtime/live';
import type { Relay } from './realtime/relay';
import type { ActiveJobs } from './services/active-jobs';
import type { ActiveRuns } from './services/active-runs';

export interface Context extends JobContext {
  config: Config;
  mail: Mailer;
  live: Live;
  activeRuns: ActiveRuns;
}

/** The part of it that the queue's jobs need: all that a process without an HTTP side has. */
export interface JobContext {
  log: Logger;
  db: Database;
  store: Store;
  /** Clears away what processes of this machine that died in the middle of a write left in the store. */
  sweepStore: () => Promise<void>;
  pool: Pool;
  queue: Queue;
  live: Pick<Live, 'recordingChanged'>;
  instance: Instance;
  relay: Relay;
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
  preferences: Preferences;
  memberships: { workspaceId: string; workspaceName: string; role: Role }[];
}

/** A person at work in one workspace. */
export interface Actor extends Person {
  workspaceId: string;
  workspaceName: string;
  role: Role;
  /** Set where a token calls: its scopes count, not a role; `userId` is who made it. */
  token?: { id: string; name: string; scopes: TokenScope[] };
}

/** A database for each test file: a clone of one migrated template. */
import { randomUUID } from 'node:crypto';
import { pino } from 'pino';
import { Client } from 'pg';
import { migrate, MIGRATIONS } from '@/server/migrations';
import { openDatabase } from '@/server/models';
import { openQueue } from '@/server/queue/queue';

export interface TestDatabase {
  url: string;
  drop(): Promise<void>;
}

const TEMPLATE = 'migrated_template';
const TEMPLATE_LOCK = 5_523_411;

/** Clones the template, and makes it first where this is the first file of the test run. */
export async function createDatabase(): Promise<TestDatabase> {
  const adminUrl = process.env.TEST_POSTGRES_URL;
  if (!adminUrl) throw new Error('TEST_POSTGRES_URL is not set: run these tests by jest’s project “api”.');
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  await asAdmin(adminUrl, async (admin) => {
    await admin.query('SELECT pg_advisory_lock($1)', [TEMPLATE_LOCK]); // files start side by side
    const { rows } = await admin.query('SELECT FROM pg_database WHERE datname = $1', [TEMPLATE]);
    if (rows.length === 0) await makeTemplate(adminUrl, admin);
    await admin.query(`CREATE DATABASE ${name} TEMPLATE ${TEMPLATE}`);
  });
  return {
    url: named(adminUrl, name),
    drop: () =>
      asAdmin(adminUrl, async (admin) => void (await admin.query(`DROP DATABASE ${name} WITH (FORCE)`))),
  };
}

/** Under another name until it is complete, so that a run that is cut short leaves none that only looks right. */
async function makeTemplate(adminUrl: string, admin: Client): Promise<void> {
  const draft = `${TEMPLATE}_draft`;
  await admin.query(`DROP DATABASE IF EXISTS ${draft}`);
  await admin.query(`CREATE DATABASE ${draft}`);
  const url = named(adminUrl, draft);
  const applied = await migrate(url);
  if (applied.length !== MIGRATIONS.length) throw new Error('The template lacks migrations.');
  const log = pino({ level: 'silent' });
  const db = openDatabase(url, log);
  const queue = await openQueue(url, db.sequelize, log); // makes the queue's own tables
  await queue.stop(1_000);
  await db.close();
  await admin.query(`ALTER DATABASE ${draft} RENAME TO ${TEMPLATE}`);
}

async function asAdmin<T>(url: string, work: (admin: Client) => Promise<T>): Promise<T> {
  const admin = new Client({ connectionString: url });
  await admin.connect();
  try {
    return await work(admin);
  } finally {
    await admin.end();
  }
}

function named(url: string, database: string): string {
  const other = new URL(url);
  other.pathname = `/${database}`;
  return other.href;
}

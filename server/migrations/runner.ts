/** Runs migrations with umzug: each in a transaction, one server at a time. */
import { Client } from 'pg';
import type { UmzugStorage } from 'umzug';

/** SQL that imports no model, so that an old one keeps running whatever the models become. */
export interface Migration {
  name: string;
  up: string;
  down: string;
}

/** Any number will do, as long as nobody else on the same database uses it. */
const MIGRATION_LOCK = 727_401_955;

/** Applies what is missing. Servers that start together wait for one another. */
export async function runMigrations(url: string, migrations: readonly Migration[]): Promise<string[]> {
  return withClient(url, async (client) => {
    await client.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    const done = await new MigrationTable(client).executed();
    if (migrations.every(({ name }) => done.includes(name))) return [];
    const applied = await (await umzug(client, migrations)).up();
    return applied.map((migration) => migration.name);
  });
}

/** Takes the newest `steps` migrations back. */
export async function revertMigrations(url: string, migrations: readonly Migration[], steps: number) {
  return withClient(url, async (client) => {
    await client.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    const reverted = await (await umzug(client, migrations)).down({ step: steps });
    return reverted.map((migration) => migration.name);
  });
}

async function withClient<T>(url: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: url, connectionTimeoutMillis: 10_000 });
  client.on('error', () => undefined); // the query in hand rejects by itself
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end(); // gives the lock back
  }
}

/** Loaded when there is something to do: a quarter of a second of every other start. */
async function umzug(client: Client, migrations: readonly Migration[]) {
  const { Umzug } = await import('umzug');
  const inTransaction = async (sql: string) => {
    await client.query('BEGIN');
    try {
      await client.query(sql);
      await client.query('COMMIT');
    } catch (error) {
      await client.query('ROLLBACK');
      throw error;
    }
  };
  return new Umzug({
    migrations: migrations.map(({ name, up, down }) => ({
      name,
      up: () => inTransaction(up),
      down: () => inTransaction(down),
    })),
    storage: new MigrationTable(client),
    logger: undefined,
  });
}

class MigrationTable implements UmzugStorage {
  constructor(private readonly client: Client) {}

  async executed(): Promise<string[]> {
    await this.client.query(
      'CREATE TABLE IF NOT EXISTS migrations (name text PRIMARY KEY, applied_at timestamptz NOT NULL DEFAULT now())',
    );
    const { rows } = await this.client.query<{ name: string }>('SELECT name FROM migrations ORDER BY name');
    return rows.map((row) => row.name);
  }

  async logMigration({ name }: { name: string }): Promise<void> {
    await this.client.query('INSERT INTO migrations (name) VALUES ($1)', [name]);
  }

  async unlogMigration({ name }: { name: string }): Promise<void> {
    await this.client.query('DELETE FROM migrations WHERE name = $1', [name]);
  }
}

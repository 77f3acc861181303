/**
 * Before the API tests: one throwaway PostgreSQL and one worker bundle for the whole test run.
 * Test files find them through the environment: TEST_POSTGRES_URL (a role that may create databases; the database of
 * the URL itself is empty) and WORKER_ENTRY.
 */
import { mkdirSync, mkdtempSync } from 'node:fs';
import path from 'node:path';
import { buildWorker } from '../../scripts/build/server-bundle';
import { inRoot } from '../../scripts/lib/project';
import { startLocalPostgres, type LocalPostgres } from '../../scripts/local-postgres';

export interface TestStack {
  postgres: LocalPostgres;
  folder: string;
}
declare global {
  var testStack: TestStack | undefined;
}

export default async function setup(): Promise<void> {
  // Below the project, so that the bundle finds its packages.
  mkdirSync(inRoot('dist'), { recursive: true });
  const folder = mkdtempSync(inRoot('dist', 'tests-'));
  const workerEntry = path.join(folder, 'worker.js');
  const [postgres] = await Promise.all([startLocalPostgres({ log: console.log }), buildWorker(workerEntry)]);
  process.env.TEST_POSTGRES_URL = postgres.url;
  process.env.WORKER_ENTRY = workerEntry;
  globalThis.testStack = { postgres, folder };
}

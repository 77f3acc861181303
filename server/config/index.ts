/** The environment, read once and checked. Nothing else in the server looks at `process.env`. */
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import type { StoreConfig } from '@/workers';
import { storeConfig, storeEnvironment } from './store';

const megabytes = 1_000_000;
const count = (fallback: number, low: number, high: number) =>
  z.coerce.number().int().min(low).max(high).default(fallback);
const onOff = (fallback: 'on' | 'off') => z.enum(['on', 'off']).default(fallback);

const environmentSchema = z.object({
  PORT: count(4600, 0, 65_535),
  HOST: z.string().default('127.0.0.1'),
  DATABASE_URL: z.string().regex(/^postgres(ql)?:\/\//, 'must be a postgres:// address'),
  DATA_DIR: z.string().default('.data'),
  ...storeEnvironment,
  SMTP_URL: z.string().optional(),
  MAIL_FROM: z.string().default('Driftwright <driftwright@localhost>'),
  PUBLIC_URL: z.url().optional(),
  SESSION_SECRET: z.string().min(16, 'must have at least 16 characters').optional(),
  WORKERS: count(2, 1, 64),
  DEMO: onOff('on'),
  CLIENT_DIR: z.string().default('dist/client'),
  WORKER_ENTRY: z.string().default('dist/server/worker.js'),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info'),
  /** Whole upload request, MB. */
  UPLOAD_LIMIT_MB: count(4000, 1, 100_000),
  /** Failed sign-ins, and reset requests, that one address may make for one e-mail in 15 minutes. */
  SIGN_IN_ATTEMPTS: count(10, 1, 1_000_000),
  /** How many proxies in front may be believed about the caller's address. */
  TRUST_PROXY: count(0, 0, 10),
});

export interface Config {
  port: number;
  host: string;
  databaseUrl: string;
  dataDir: string;
  /** Where files are kept: below the data folder unless STORE_URL names object storage. */
  store: StoreConfig;
  smtpUrl: string | null;
  mailFrom: string;
  /** Where people reach this server; null: http://host:port as it listens. */
  publicUrl: string | null;
  sessionSecret: string;
  workers: number;
  demo: boolean;
  clientDir: string;
  workerEntry: string;
  logLevel: string;
  uploadLimitBytes: number;
  signInAttempts: number;
  trustProxy: number;
}

/** What the environment says, defaults filled in. Throws ConfigError in one line that names each fault. */
export function loadConfig(env: Record<string, string | undefined>): Config {
  const given = Object.fromEntries(Object.entries(env).filter(([, value]) => value !== ''));
  const read = environmentSchema.safeParse(given);
  if (!read.success) {
    const faults = read.error.issues.map((issue) => `${issue.path.join('.')} ${issue.message}`);
    throw new ConfigError(`The configuration is not usable: ${faults.join('; ')}.`);
  }
  const e = read.data;
  const dataDir = path.resolve(e.DATA_DIR);
  return {
    port: e.PORT,
    host: e.HOST,
    databaseUrl: e.DATABASE_URL,
    dataDir,
    store: storeConfig(e, dataDir),
    smtpUrl: e.SMTP_URL ?? null,
    mailFrom: e.MAIL_FROM,
    publicUrl: e.PUBLIC_URL?.replace(/\/+$/, '') ?? null,
    sessionSecret: e.SESSION_SECRET ?? keptSecret(dataDir),
    workers: e.WORKERS,
    demo: e.DEMO === 'on',
    clientDir: path.resolve(e.CLIENT_DIR),
    workerEntry: path.resolve(e.WORKER_ENTRY),
    logLevel: e.LOG_LEVEL,
    uploadLimitBytes: e.UPLOAD_LIMIT_MB * megabytes,
    signInAttempts: e.SIGN_IN_ATTEMPTS,
    trustProxy: e.TRUST_PROXY,
  };
}

export class ConfigError extends Error {
  constructor(message: string) {
    super(message);
    this.name = 'ConfigError';
  }
}

/** Made once and kept, so that a restart signs nobody out. Written whole or not at all. */
function keptSecret(dataDir: string): string {
  const file = path.join(dataDir, 'session-secret');
  try {
    return fs.readFileSync(file, 'utf8').trim();
  } catch {
    fs.mkdirSync(dataDir, { recursive: true });
    const draft = `${file}.${process.pid}`;
    fs.writeFileSync(draft, randomBytes(32).toString('hex'), { mode: 0o600 });
    fs.renameSync(draft, file);
    return fs.readFileSync(file, 'utf8').trim();
  }
}

/** Where things are, and what the environment says about them. */
import path from 'node:path';

export const ROOT = path.resolve(__dirname, '../..');
export const inRoot = (...parts: string[]): string => path.join(ROOT, ...parts);

export const BUILD = {
  stamp: inRoot('dist/.stamp'),
  client: inRoot('dist/client'),
  server: inRoot('dist/server/index.js'),
  worker: inRoot('dist/server/worker.js'),
  consumer: inRoot('dist/server/consumer.js'),
};

export interface Settings {
  host: string;
  port: number;
  dataFolder: string;
}

/** PORT, HOST and DATA_DIR with their defaults. Throws for a PORT that is none. */
export function readSettings(env: NodeJS.ProcessEnv = process.env): Settings {
  const port = Number(env.PORT ?? 4600);
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new Error(`PORT is "${env.PORT}". Give a whole number from 1 to 65535.`);
  }
  return {
    host: env.HOST ?? '127.0.0.1',
    port,
    dataFolder: path.resolve(ROOT, env.DATA_DIR ?? '.data'),
  };
}

/** Scripts fail with a sentence; a stack trace only on DEBUG. */
export function failWith(error: unknown): void {
  const message = error instanceof Error ? error.message : String(error);
  console.error(process.env.DEBUG && error instanceof Error ? error.stack : message);
  process.exitCode = 1;
}

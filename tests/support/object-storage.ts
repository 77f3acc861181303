/** An S3-compatible server on loopback, with one empty bucket, in this process. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import S3rver from 's3rver';
import { S3Store } from '@/workers/store/s3';
import type { S3StoreConfig } from '@/workers/store/types';

export interface ObjectStorage {
  config: S3StoreConfig;
  /** What the server's configuration reads of it. */
  env: Record<string, string>;
  /** All objects, the prefix taken off, sorted. */
  keys(): Promise<string[]>;
  stop(): Promise<void>;
}

const BUCKET = 'breakwater';
const PREFIX = 'lab/one';

export async function startObjectStorage(): Promise<ObjectStorage> {
  const directory = mkdtempSync(path.join(tmpdir(), 'driftwright-s3-'));
  const configureBuckets = [{ name: BUCKET, configs: [] }];
  const server = new S3rver({ address: '127.0.0.1', port: 0, directory, silent: true, configureBuckets });
  const { port } = await server.run();
  const endpoint = `http://127.0.0.1:${port}`;
  const credentials = { accessKeyId: 'S3RVER', secretAccessKey: 'S3RVER' };
  const config: S3StoreConfig = {
    kind: 's3', bucket: BUCKET, prefix: PREFIX, region: 'us-east-1', endpoint, credentials,
  }; // prettier-ignore
  const whole = new S3Store({ ...config, prefix: '' });
  return {
    config,
    env: {
      STORE_URL: `s3://${BUCKET}/${PREFIX}`,
      AWS_ENDPOINT_URL_S3: endpoint,
      AWS_REGION: config.region,
      AWS_ACCESS_KEY_ID: credentials.accessKeyId,
      AWS_SECRET_ACCESS_KEY: credentials.secretAccessKey,
    },
    async keys() {
      return (await whole.list('lab/')).map((key) => key.slice(PREFIX.length + 1)).sort();
    },
    async stop() {
      await server.close();
      rmSync(directory, { recursive: true, force: true });
    },
  };
}

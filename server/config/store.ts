/** Where files are kept: a folder, or S3-compatible object storage named by STORE_URL and the usual AWS_ variables. */
import path from 'node:path';
import { z } from 'zod';
import type { StoreConfig } from '@/workers';

/** s3://bucket, s3://bucket/prefix or s3://bucket/pre/fix. */
const STORE_URL =
  /^s3:\/\/(?<bucket>[a-z0-9][a-z0-9.-]{1,61}[a-z0-9])(?:\/(?<prefix>[A-Za-z0-9_-][A-Za-z0-9._/-]*?))?\/*$/;

export const storeEnvironment = {
  STORE_URL: z.string().regex(STORE_URL, 'must be s3://bucket or s3://bucket/prefix').optional(),
  AWS_ENDPOINT_URL_S3: z.url('must be an http:// or https:// address').optional(),
  AWS_ENDPOINT_URL: z.url('must be an http:// or https:// address').optional(),
  AWS_REGION: z.string().optional(),
  AWS_DEFAULT_REGION: z.string().optional(),
  AWS_ACCESS_KEY_ID: z.string().optional(),
  AWS_SECRET_ACCESS_KEY: z.string().optional(),
  AWS_SESSION_TOKEN: z.string().optional(),
};
type StoreEnvironment = z.infer<z.ZodObject<typeof storeEnvironment>>;

/** A server of one's own rarely has regions, but the protocol wants one to be named. */
const ANY_REGION = 'us-east-1';

/** The folder `store` below `dataDir` where STORE_URL is not set. */
export function storeConfig(e: StoreEnvironment, dataDir: string): StoreConfig {
  const groups = STORE_URL.exec(e.STORE_URL ?? '')?.groups;
  if (!groups) return { kind: 'folder', root: path.join(dataDir, 'store') };
  return {
    kind: 's3',
    bucket: groups.bucket!,
    prefix: groups.prefix ?? '',
    region: e.AWS_REGION ?? e.AWS_DEFAULT_REGION ?? ANY_REGION,
    endpoint: e.AWS_ENDPOINT_URL_S3 ?? e.AWS_ENDPOINT_URL ?? null,
    credentials: credentialsOf(e),
  };
}

function credentialsOf(e: StoreEnvironment) {
  const { AWS_ACCESS_KEY_ID: accessKeyId, AWS_SECRET_ACCESS_KEY: secretAccessKey } = e;
  if (!accessKeyId || !secretAccessKey) return null;
  const sessionToken = e.AWS_SESSION_TOKEN;
  return { accessKeyId, secretAccessKey, ...(sessionToken ? { sessionToken } : {}) };
}

/** Where raw uploads, decoded recordings and run results live. Keys are relative paths with '/'. */
import type { Readable } from 'node:stream';

export interface Store {
  /** Writes `source` under `key`. The key appears whole or not at all, also when the process dies in between. */
  put(key: string, source: Readable | Uint8Array): Promise<{ bytes: number }>;
  /** Takes over a finished local file (an upload); moves it where the backing can. */
  adopt(key: string, localPath: string): Promise<{ bytes: number }>;
  /** Throws StoreKeyMissing. */
  stream(key: string): Promise<Readable>;
  /** Throws StoreKeyMissing. */
  bytes(key: string): Promise<Uint8Array>;
  has(key: string): Promise<boolean>;
  /** Bytes stored under `key`. Throws StoreKeyMissing. */
  size(key: string): Promise<number>;
  /** Keys that start with `prefix`, in any order. */
  list(prefix: string): Promise<string[]>;
  /** Removes every key that starts with `prefix`; silent where there is none. */
  removePrefix(prefix: string): Promise<void>;
}

export class StoreKeyMissing extends Error {
  constructor(readonly key: string) {
    super(`Nothing is stored under ${key}.`);
    this.name = 'StoreKeyMissing';
  }
}

/** The backing refused (disk full, no permission …): `message` says so in plain words, `code` is the system's. */
export class StoreFailed extends Error {
  constructor(
    readonly code: string,
    message: string,
    options?: ErrorOptions,
  ) {
    super(message, options);
    this.name = 'StoreFailed';
  }
}

export interface S3StoreConfig {
  kind: 's3';
  bucket: string;
  /** All keys lie below it; '' for none. */
  prefix: string;
  region: string;
  /** Of an S3-compatible server; null: the SDK's own choice for the region. */
  endpoint: string | null;
  /** Null: what the SDK finds by itself (the machine's role, a profile). */
  credentials: { accessKeyId: string; secretAccessKey: string; sessionToken?: string } | null;
}

/** How a worker process opens the same store as the server. */
export type StoreConfig = { kind: 'folder'; root: string } | S3StoreConfig;

/** The one place that knows the layout of keys. */
export const storeKeys = {
  recording: (recordingId: string) => `recordings/${recordingId}/`,
  raw: (recordingId: string, role: string) => `recordings/${recordingId}/raw/${role}`,
  imu: (recordingId: string) => `recordings/${recordingId}/imu.arrow`,
  gnss: (recordingId: string) => `recordings/${recordingId}/gnss.arrow`,
  reference: (recordingId: string) => `recordings/${recordingId}/reference.arrow`,
  /** Barometer, heading or odometer. */
  aid: (recordingId: string, kind: string) => `recordings/${recordingId}/aid-${kind}.arrow`,
  /** What the decoded files are and their hashes; written last, so that a recording without it is not decoded. */
  decoded: (recordingId: string) => `recordings/${recordingId}/decoded.json`,
  /** GNSS-only baseline track. */
  gnssOnly: (recordingId: string) => `recordings/${recordingId}/gnss-only.arrow`,
  recordingExport: (recordingId: string, name: string) => `recordings/${recordingId}/exports/${name}`,
  run: (runId: string) => `runs/${runId}/`,
  solution: (runId: string) => `runs/${runId}/solution.arrow`,
  /** Only where the run was smoothed. */
  smoothed: (runId: string) => `runs/${runId}/smoothed.arrow`,
  innovations: (runId: string) => `runs/${runId}/innovations.arrow`,
  coasting: (runId: string) => `runs/${runId}/coasting.arrow`,
  export: (runId: string, name: string) => `runs/${runId}/exports/${name}`,
};

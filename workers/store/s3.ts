/**
 * The store on S3-compatible object storage. A key is an object below the configuration's prefix. An object appears
 * when it is complete, so that a put is whole or nothing whatever dies in between. The SDK takes a while to load and is
 * loaded by the first use, so that whoever keeps a folder never pays for it.
 */
import { createReadStream } from 'node:fs';
import { rm } from 'node:fs/promises';
import { Readable } from 'node:stream';
import type * as Sdk from '@aws-sdk/client-s3';
import type { Upload as SdkUpload } from '@aws-sdk/lib-storage';
import { assertStoreKey, assertStorePrefix } from './keys';
import { isMissing, s3Failure, type Doing } from './s3-failures';
import { StoreKeyMissing, type S3StoreConfig, type Store } from './types';

/** Streams are sent in parts of this size, which must be 5 MiB or more; 10 000 of them are the longest object, bytes. */
const PART_BYTES = 16 * 1024 * 1024;
const PARTS_AT_ONCE = 2;
/** Objects that one request may remove. */
const REMOVED_AT_ONCE = 1000;
/** A connection that says nothing for this long is given up, ms. */
const SILENCE_MS = 60_000;
const CONNECT_MS = 5_000;

interface Connection {
  client: Sdk.S3Client;
  sdk: typeof Sdk;
  Upload: typeof SdkUpload;
}

export class S3Store implements Store {
  private opened: Promise<Connection> | undefined;

  constructor(private readonly config: S3StoreConfig) {}

  async put(key: string, source: Readable | Uint8Array): Promise<{ bytes: number }> {
    assertStoreKey(key);
    return source instanceof Uint8Array ? this.putWhole(key, source) : this.putStream(key, source);
  }

  async adopt(key: string, localPath: string): Promise<{ bytes: number }> {
    assertStoreKey(key);
    const written = await this.put(key, createReadStream(localPath, { highWaterMark: 1024 * 1024 }));
    await rm(localPath, { force: true });
    return written;
  }

  async stream(key: string): Promise<Readable> {
    assertStoreKey(key);
    return this.tell('read', key, async ({ client, sdk }) => {
      const { Body } = await client.send(new sdk.GetObjectCommand(this.at(key)));
      return Body as Readable; // on Node it is one
    });
  }

  async bytes(key: string): Promise<Uint8Array> {
    assertStoreKey(key);
    return this.tell('read', key, async ({ client, sdk }) => {
      const { Body } = await client.send(new sdk.GetObjectCommand(this.at(key)));
      return (await Body?.transformToByteArray()) ?? new Uint8Array(0);
    });
  }

  async has(key: string): Promise<boolean> {
    return (await this.sizeOf(key)) !== null;
  }

  async size(key: string): Promise<number> {
    const size = await this.sizeOf(key);
    if (size === null) throw new StoreKeyMissing(key);
    return size;
  }

  async list(prefix: string): Promise<string[]> {
    assertStorePrefix(prefix);
    const keys: string[] = [];
    for await (const page of this.pages(prefix)) keys.push(...page);
    return keys;
  }

  async removePrefix(prefix: string): Promise<void> {
    assertStorePrefix(prefix);
    const keys = await this.list(prefix);
    while (keys.length > 0) {
      const Objects = keys.splice(0, REMOVED_AT_ONCE).map((key) => ({ Key: this.at(key).Key }));
      await this.tell('remove', undefined, async ({ client, sdk }) => {
        const input = { Bucket: this.config.bucket, Delete: { Objects, Quiet: true } };
        const { Errors = [] } = await client.send(new sdk.DeleteObjectsCommand(input));
        if (Errors[0]) throw refusalOf(Errors[0]);
      });
    }
  }

  private async putStream(key: string, source: Readable): Promise<{ bytes: number }> {
    const watched = watch(source);
    try {
      const { client, Upload } = await this.connection();
      const params = { ...this.at(key), Body: Readable.from(watched.pieces(), { objectMode: false }) };
      await new Upload({ client, params, partSize: PART_BYTES, queueSize: PARTS_AT_ONCE }).done();
      return { bytes: watched.bytes };
    } catch (error) {
      // What the source said says more than what giving its parts up came to.
      throw watched.failure ?? s3Failure(error, 'write');
    } finally {
      source.destroy();
    }
  }

  private putWhole(key: string, bytes: Uint8Array): Promise<{ bytes: number }> {
    return this.tell('write', undefined, async ({ client, sdk }) => {
      await client.send(
        new sdk.PutObjectCommand({ ...this.at(key), Body: bytes, ContentLength: bytes.length }),
      );
      return { bytes: bytes.length };
    });
  }

  /** Null where nothing is stored under `key`. */
  private async sizeOf(key: string): Promise<number | null> {
    assertStoreKey(key);
    return this.tell('read', undefined, async ({ client, sdk }) => {
      try {
        return (await client.send(new sdk.HeadObjectCommand(this.at(key)))).ContentLength ?? 0;
      } catch (error) {
        if (isMissing(error)) return null;
        throw error;
      }
    });
  }

  /** Keys page by page, our own prefix taken off. */
  private async *pages(prefix: string): AsyncGenerator<string[]> {
    const { Bucket, Key: Prefix } = this.at(prefix);
    const ours = Prefix.length - prefix.length;
    let StartAfter: string | undefined; // understood by more servers than tokens to continue by
    do {
      const input = { Bucket, Prefix, StartAfter };
      const page = await this.tell('read', undefined, ({ client, sdk }) =>
        client.send(new sdk.ListObjectsV2Command(input)),
      );
      const keys = (page.Contents ?? []).flatMap(({ Key }) => Key ?? []);
      yield keys.map((key) => key.slice(ours));
      StartAfter = page.IsTruncated ? keys.at(-1) : undefined;
    } while (StartAfter !== undefined);
  }

  private at(key: string): { Bucket: string; Key: string } {
    const { bucket, prefix } = this.config;
    return { Bucket: bucket, Key: prefix === '' ? key : `${prefix}/${key}` };
  }

  private connection(): Promise<Connection> {
    return (this.opened ??= connect(this.config));
  }

  /** Does `work`; what goes wrong is told in plain words. */
  private async tell<T>(
    doing: Doing,
    key: string | undefined,
    work: (connection: Connection) => Promise<T>,
  ): Promise<T> {
    try {
      return await work(await this.connection());
    } catch (error) {
      throw s3Failure(error, doing, key);
    }
  }
}

/** Checksums only where the protocol wants them: servers other than the first of their kind store what they do not know. */
async function connect({ region, endpoint, credentials }: S3StoreConfig): Promise<Connection> {
  const [sdk, { Upload }] = await Promise.all([import('@aws-sdk/client-s3'), import('@aws-sdk/lib-storage')]);
  const client = new sdk.S3Client({
    region,
    ...(endpoint === null ? {} : { endpoint }),
    ...(credentials === null ? {} : { credentials }),
    forcePathStyle: endpoint !== null,
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    requestHandler: { connectionTimeout: CONNECT_MS, socketTimeout: SILENCE_MS },
  });
  return { client, sdk, Upload };
}

/** One object of many that was not removed, as the error that a request for it alone would have been. */
const refusalOf = ({ Code, Message }: Sdk._Error) =>
  Object.assign(new Error(Message), { name: Code ?? 'Unknown', $metadata: { httpStatusCode: 400 } });

interface Watched {
  bytes: number;
  /** Why the source ended early. */
  failure: Error | null;
  pieces(): AsyncGenerator<Uint8Array>;
}

/** The source's pieces, counted. */
function watch(source: Readable): Watched {
  const watched: Watched = {
    bytes: 0,
    failure: null,
    async *pieces() {
      try {
        for await (const piece of source as AsyncIterable<Uint8Array>) {
          watched.bytes += piece.length;
          yield piece;
        }
      } catch (error) {
        watched.failure = error as Error;
        throw error;
      }
    },
  };
  return watched;
}

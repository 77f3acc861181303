/** Receives a recording's files: to disk, hashed on the way, in flat memory; gone again unless they were taken over. */
import { createHash, randomUUID } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Request } from 'express';
import multer, { type StorageEngine } from 'multer';
import { type RecordingMeta, fileRoleSchema, recordingMetaSchema } from '@/shared/contracts/recordings';
import { formatBytes } from '@/shared/format';
import type { Context } from '../context';
import { messageOf } from '../error-details';
import { badRequest, invalid, noSpace, tooLarge, unsupportedMedia } from '../errors';
import type { ReceivedFile } from '../services/recordings';
import { uploadFolder } from '../services/upload-folder';
import { isFull } from './problems';
import { validate } from './validate';

const META_LIMIT_BYTES = 1_000_000;
/** Left on the disk for the decoded columns and for the database. */
const RESERVE_BYTES = 200_000_000;
/** A caller whose body is refused may go on sending; after this the connection is cut, ms. */
const REFUSED_DRAIN_MS = 5_000;

/** Reads the multipart body, hands it to `take`, and removes whatever is still in the temporary place. */
export async function receiveUpload<T>(
  ctx: Context,
  req: Request,
  take: (meta: RecordingMeta, files: ReceivedFile[]) => Promise<T>,
): Promise<T> {
  const folder = path.join(uploadFolder(ctx.config.dataDir), randomUUID());
  try {
    await refuseAtOnce(ctx, req);
    await fs.promises.mkdir(folder, { recursive: true });
    await readBody(ctx, req, folder);
    const files = receivedFiles(req);
    const meta = validate(recordingMetaSchema, parseMeta(req.body), 'part “meta”');
    checkFiles(files);
    return await take(meta, files);
  } finally {
    await fs.promises.rm(folder, { recursive: true, force: true });
  }
}

/** What can be told from the headers is told before a byte of the body is read. */
async function refuseAtOnce(ctx: Context, req: Request): Promise<void> {
  const claimed = Number(req.get('Content-Length') ?? 0);
  const limit = ctx.config.uploadLimitBytes;
  if (claimed > limit) {
    dropBody(req);
    throw tooLarge(
      `The upload says it has ${formatBytes(claimed)}; this server takes ${formatBytes(limit)}. Cut the log into shorter pieces, or compress it with gzip.`,
    );
  }
  if (!req.is('multipart/form-data')) {
    dropBody(req);
    throw unsupportedMedia(
      'Send multipart/form-data with the parts imu, gnss (unless the IMU log holds the fixes), meta and, if there are such, imu2, reference and aids.',
    );
  }
  const { bavail, bsize } = await fs.promises.statfs(ctx.config.dataDir);
  if (claimed + RESERVE_BYTES > bavail * bsize) {
    dropBody(req);
    throw noSpace(
      `The server’s disk has no room for ${formatBytes(claimed)}. Tell the operator, or try a smaller file.`,
    );
  }
}

/** Lets the refusal reach a caller who is still sending, but not for long. */
function dropBody(req: Request): void {
  req.res?.setHeader('Connection', 'close');
  req.resume();
  setTimeout(() => req.socket.destroy(), REFUSED_DRAIN_MS).unref();
}

function readBody(ctx: Context, req: Request, folder: string): Promise<void> {
  const receive = multer({
    storage: hashingStorage(folder),
    limits: {
      fileSize: ctx.config.uploadLimitBytes,
      files: fileRoleSchema.options.length,
      fields: 1,
      fieldSize: META_LIMIT_BYTES,
      fieldNameSize: 100,
      parts: fileRoleSchema.options.length + 1,
    },
  }).fields(fileRoleSchema.options.map((name) => ({ name, maxCount: 1 })));
  return new Promise((resolve, reject) => {
    const { res } = req;
    if (!res) throw new Error('A request without its response.');
    receive(req, res, (error: unknown) => {
      if (error) reject(isCut(error, req) ? badRequest(CUT_SHORT) : error);
      else resolve();
    });
  });
}

const CUT_SHORT = 'The upload was cut short. Nothing of it was kept; send it again.';

const isCut = (error: unknown, req: Request) =>
  !(error instanceof multer.MulterError) &&
  ((req.destroyed && !req.complete) || /Unexpected end of form|Request aborted/i.test(messageOf(error)));

interface Stored {
  path: string;
  size: number;
  sha256: string;
}

/** Multer's way of keeping a file, with its hash made while it passes. */
function hashingStorage(folder: string): StorageEngine {
  return {
    _handleFile(_req, file, done) {
      const target = path.join(folder, randomUUID());
      const hash = createHash('sha256');
      let size = 0;
      file.stream.on('data', (chunk: Buffer) => {
        hash.update(chunk);
        size += chunk.length;
      });
      pipeline(file.stream, fs.createWriteStream(target, { mode: 0o600 })).then(
        () => {
          const stored: Stored = { path: target, size, sha256: hash.digest('hex') };
          done(null, stored);
        },
        (error: unknown) => done(storageFault(error)),
      );
    },
    _removeFile(_req, file, done) {
      fs.rm(file.path, { force: true }, done);
    },
  };
}

const storageFault = (error: unknown) =>
  isFull(error)
    ? noSpace('The server’s disk is full. Nothing of the upload was kept. Tell the operator.')
    : error;

function receivedFiles(req: Request): ReceivedFile[] {
  const byField = (req.files ?? {}) as Record<string, (Express.Multer.File & Stored)[]>;
  return fileRoleSchema.options.flatMap((role) => {
    const [file] = byField[role] ?? [];
    if (!file) return [];
    return [
      { role, name: plainName(file.originalname), path: file.path, bytes: file.size, sha256: file.sha256 },
    ];
  });
}

/** Only what stands after the last separator, as UTF-8 (the parser reads header bytes one by one), for display. */
function plainName(name: string): string {
  const last = Buffer.from(name, 'latin1').toString('utf8').split(/[\\/]/).pop() ?? '';
  const printable = last.replace(/\p{Cc}/gu, '').slice(0, 200);
  return printable || 'file';
}

function parseMeta(body: unknown): unknown {
  const text = typeof body === 'object' && body !== null && 'meta' in body ? body.meta : undefined;
  if (typeof text !== 'string') {
    const message = 'The part “meta” is missing: JSON with at least {"name": "…"}.';
    throw invalid(message, { errors: [{ path: 'meta', message }] });
  }
  try {
    return JSON.parse(text);
  } catch {
    throw badRequest('The part “meta” is not valid JSON.');
  }
}

/** An IMU file, which may hold the fixes too, and none empty. */
function checkFiles(files: ReceivedFile[]): void {
  const lacks = (role: ReceivedFile['role']) => !files.some((file) => file.role === role);
  const missing = lacks('imu') ? (['imu', 'gnss'] as const).filter(lacks) : [];
  const errors = [
    ...missing.map((role) => ({ path: role, message: `The ${role.toUpperCase()} file is missing.` })),
    ...files
      .filter((file) => file.bytes === 0)
      .map(({ role, name }) => ({
        path: role,
        message: `The file “${name}” is empty. Choose the log itself.`,
      })),
  ];
  if (errors.length > 0) throw invalid(errors.map((error) => error.message).join(' '), { errors });
}

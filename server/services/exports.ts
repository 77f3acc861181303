/** Versions as files for those who build them in. */
import { createHash } from 'node:crypto';
import type { ExportFormat } from '@/shared/contracts/exports';
import { safeFileName } from '@/workers';
import type { Actor, Context } from '../context';
import { notFound } from '../errors';
import { exportDocument } from '../exports/document';
import { FORMATS } from '../exports/formats';
import type { SetVersion } from '../models/parameter-set';
import { findVehicle } from './vehicles';
import { getVersion, PEOPLE } from './versions';

export interface ExportedFile {
  body: Buffer;
  type: string;
  fileName: string;
  /** Strong: over the body. */
  etag: string;
  /** When it came to be as it is. */
  changedAt: Date;
}

export async function exportVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  format: ExportFormat,
): Promise<ExportedFile> {
  return write(ctx, await getVersion(ctx, actor, setId, number), format);
}

/** Throws 404 where nothing is released for the vehicle. */
export async function exportReleased(
  ctx: Context,
  { workspaceId }: Actor,
  vehicleId: string,
  format: ExportFormat,
): Promise<ExportedFile> {
  const { name } = await findVehicle(ctx, workspaceId, vehicleId);
  const where = { vehicleId, state: 'released' as const };
  const version = await ctx.db.SetVersion.findOne({ where, include: PEOPLE });
  if (!version) throw notFound(`No parameter set is released for “${name}”.`);
  return write(ctx, version, format);
}

async function write(ctx: Context, version: SetVersion, format: ExportFormat): Promise<ExportedFile> {
  const { setId, runId, recordingId, number } = version;
  const [set, run, recording] = await Promise.all([
    ctx.db.ParameterSet.findByPk(setId, { include: ['vehicle'], rejectOnEmpty: true }),
    runId ? ctx.db.Run.findByPk(runId, { attributes: ['id', 'provenance'] }) : null,
    recordingId ? ctx.db.Recording.findByPk(recordingId, { attributes: ['id', 'name', 'sha256'] }) : null,
  ]);
  const tunedOn = recording && { id: recording.id, name: recording.name, sha256: recording.sha256 ?? null };
  const { type, extension, write: text } = FORMATS[format];
  const body = Buffer.from(text(exportDocument({ set, version, run, recording: tunedOn })), 'utf8');
  return {
    body,
    type,
    fileName: `${safeFileName(`${set.name}-v${number}`)}.${extension}`,
    etag: `"${createHash('sha256').update(body).digest('hex')}"`,
    changedAt: version.reviewedAt ?? version.submittedAt ?? version.createdAt,
  };
}

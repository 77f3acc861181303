/** A decoded recording as files for other programs. */
import type { DecodedChannel, HealthFile } from '@/shared/contracts/recording-files';
import { safeFileName, storeKeys } from '@/workers';
import type { Actor, Context } from '../context';
import { conflict, notFound } from '../errors';
import type { Recording } from '../models/recording';
import { presentRecording } from '../presenters/recording';
import { getReadyRecording, getRecording } from './recordings';
import type { Download } from './runs';

/** The columns of `channel` as they are kept. Throws 409 unless decoded, 404 for a reference that there is not. */
export async function decodedArrow(
  ctx: Context,
  actor: Actor,
  id: string,
  channel: DecodedChannel,
): Promise<Download> {
  const recording = await readyWith(ctx, actor, id, channel);
  return download(ctx, storeKeys[channel](id), fileName(recording, `${channel}.arrow`));
}

/** The same as text; made once and kept with the recording. */
export async function decodedCsv(
  ctx: Context,
  actor: Actor,
  id: string,
  channel: DecodedChannel,
): Promise<Download> {
  const recording = await readyWith(ctx, actor, id, channel);
  // Named by content: a recording that is decoded anew gets another file.
  const name = `${channel}-${recording.sha256?.slice(0, 12) ?? 'decoded'}.csv`;
  const key = storeKeys.recordingExport(id, name);
  if (!(await ctx.store.has(key))) {
    const job = { kind: 'recording-export', recordingId: id, channel, name } as const;
    await ctx.pool.submit(job, { affinity: id, retryOnCrash: true }).result;
  }
  return download(ctx, key, fileName(recording, `${channel}.csv`));
}

export interface HealthDownload {
  body: HealthFile;
  fileName: string;
}

export async function healthFile(ctx: Context, actor: Actor, id: string): Promise<HealthDownload> {
  const recording = await getRecording(ctx, actor, id);
  const { name, vehicleName, startS, endS, timeOrigin, files, channelMap, remedies, health } =
    presentRecording(recording);
  if (!health || startS === null || endS === null) {
    throw conflict(
      `“${name}” has no health report: that comes with decoding. Open the recording to see where it is.`,
    );
  }
  const madeAt = ctx.clock().toISOString();
  const decodedSha256 = recording.sha256;
  const body = {
    recordingId: id, name, vehicleName, madeAt, startS, endS, timeOrigin, files, decodedSha256, channelMap, remedies, health,
  }; // prettier-ignore
  return { body, fileName: fileName(recording, 'health.json') };
}

async function readyWith(
  ctx: Context,
  actor: Actor,
  id: string,
  channel: DecodedChannel,
): Promise<Recording> {
  const recording = await getReadyRecording(ctx, actor, id);
  if (channel === 'reference' && !recording.hasReference) {
    throw notFound(`“${recording.name}” has no reference trajectory.`);
  }
  return recording;
}

async function download(ctx: Context, key: string, name: string): Promise<Download> {
  const bytes = await ctx.store.size(key);
  return { stream: await ctx.store.stream(key), bytes, fileName: name };
}

const fileName = (recording: Recording, ending: string) => `${safeFileName(recording.name)}-${ending}`;

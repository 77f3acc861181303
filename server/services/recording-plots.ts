/** Thinned channels of a decoded recording, for plots. */
import type { BaselineTrack, Series, SeriesQuery } from '@/shared/contracts/recordings';
import type { Actor, Context } from '../context';
import { getReadyRecording } from './recordings';

export async function recordingSeries(
  ctx: Context,
  actor: Actor,
  id: string,
  query: SeriesQuery,
): Promise<Series> {
  await getReadyRecording(ctx, actor, id);
  const { channels, from = null, to = null, points } = query;
  const job = { kind: 'recording-series', recordingId: id, channels, fromS: from, toS: to, points } as const;
  return ctx.pool.submit(job, { affinity: id, retryOnCrash: true }).result;
}

export async function baselineTrack(
  ctx: Context,
  actor: Actor,
  id: string,
  points: number,
): Promise<BaselineTrack> {
  await getReadyRecording(ctx, actor, id);
  const job = { kind: 'baseline-track', recordingId: id, points } as const;
  return ctx.pool.submit(job, { affinity: id, retryOnCrash: true }).result;
}

/** Sensor noise of a recording, computed when asked for. */
import type { NoiseAnalysis, NoiseRequest } from '@/shared/contracts/noise';
import { JobFailed } from '@/workers';
import type { Actor, Context } from '../context';
import { invalid } from '../errors';
import { getReadyRecording } from './recordings';

/** Throws 409 for a recording that is not decoded, 422 where there is nothing to analyse. */
export async function sensorNoise(
  ctx: Context,
  actor: Actor,
  id: string,
  { fromS, toS }: NoiseRequest,
): Promise<NoiseAnalysis> {
  await getReadyRecording(ctx, actor, id);
  const spanS: [number, number] | null = fromS === undefined || toS === undefined ? null : [fromS, toS];
  const job = { kind: 'noise', recordingId: id, spanS } as const;
  return ctx.pool.submit(job, { affinity: id, retryOnCrash: true }).result.catch((error: unknown) => {
    if (error instanceof JobFailed && NOTHING_TO_ANALYSE.has(error.code)) throw invalid(error.message);
    throw error;
  });
}

const NOTHING_TO_ANALYSE: ReadonlySet<string> = new Set(['no-rest', 'too-short']);

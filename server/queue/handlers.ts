/** Who does the queue's jobs: the same in a server and in a process without an HTTP side. */
import type { JobContext } from '../context';
import { decode } from '../services/decoding';
import { verify } from '../services/verification-jobs';
import type { JobHandlers } from './queue';

export const jobHandlers = (ctx: JobContext): JobHandlers => ({
  decode: (payload, lastAttempt) => decode(ctx, payload, lastAttempt),
  verify: (payload, lastAttempt) => verify(ctx, payload, lastAttempt),
});

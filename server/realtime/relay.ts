/**
 * What one process does and those beside it should hear of at once, over PostgreSQL's notifications. Nothing rests on a
 * message arriving: pages look again by themselves, and a decoding that is void finds out at its next report.
 */
import { QueryTypes, type Sequelize } from 'sequelize';
import type { Logger } from 'pino';
import { z } from 'zod';
import { recordingStatusSchema } from '@/shared/contracts/recordings';
import { CHANNEL } from '../instance';

const messageSchema = z.discriminatedUnion('type', [
  z.object({
    type: z.literal('recording-changed'),
    workspaceId: z.string(),
    recordingId: z.string(),
    status: recordingStatusSchema.nullable(),
    progress: z.number(),
  }),
  /** Decodings of generations before `before` are void; null: all of them. */
  z.object({ type: z.literal('stop-decoding'), recordingId: z.string(), before: z.number().nullable() }),
]);
export type RelayMessage = z.infer<typeof messageSchema>;
const envelopeSchema = z.object({ from: z.string(), message: messageSchema });

export class Relay {
  private readonly listeners: ((message: RelayMessage) => void)[] = [];
  private own: { id: string; sequelize: Sequelize } | null = null;

  constructor(private readonly log: Logger) {}

  /** From now on it can tell: in the name of the process `id`. */
  join(id: string, sequelize: Sequelize): void {
    this.own = { id, sequelize };
  }

  /** `listener` gets what other processes tell. */
  on(listener: (message: RelayMessage) => void): void {
    this.listeners.push(listener);
  }

  tell(message: RelayMessage): void {
    if (!this.own) return;
    const { id: from, sequelize } = this.own;
    const bind = [CHANNEL, JSON.stringify({ from, message })];
    sequelize
      .query('SELECT pg_notify($1, $2)', { bind, type: QueryTypes.SELECT })
      .catch((error: unknown) => this.log.debug({ err: error }, 'the other servers were not told'));
  }

  /** Takes in what came over the channel; what another version says and this one does not know is passed over. */
  hear(text: string): void {
    let parsed: unknown;
    try {
      parsed = JSON.parse(text);
    } catch {
      return;
    }
    const { data } = envelopeSchema.safeParse(parsed);
    if (data && data.from !== this.own?.id) for (const listener of this.listeners) listener(data.message);
  }
}

/** Where a person is signed in, and signing out elsewhere. */
import { QueryTypes } from 'sequelize';
import type { Context, Person } from '../context';
import { notFound } from '../errors';
import { hashToken } from './secrets';

interface Row {
  sid: string;
  sess: { startedAt?: number; seenAt?: number; address?: string | null; userAgent?: string };
}

export interface OpenSession extends Row {
  /** Names it without opening it. */
  id: string;
  current: boolean;
}

/** The most recently used first. */
export async function listSessions(
  ctx: Context,
  { userId }: Person,
  currentSid: string,
): Promise<OpenSession[]> {
  const sql = `SELECT sid, sess FROM sessions WHERE sess ->> 'userId' = $1 AND expire >= now()`;
  const rows = await ctx.db.sequelize.query<Row>(sql, { bind: [userId], type: QueryTypes.SELECT });
  return rows
    .map((row) => ({ ...row, id: hashToken(row.sid), current: row.sid === currentSid }))
    .sort((a, b) => (b.sess.seenAt ?? 0) - (a.sess.seenAt ?? 0));
}

/** Throws 404 for one that is not the person's own, or has ended. */
export async function endSessionOf(
  ctx: Context,
  person: Person,
  currentSid: string,
  id: string,
): Promise<void> {
  const found = (await listSessions(ctx, person, currentSid)).find((one) => one.id === id);
  if (!found) throw notFound('You have no such session any more: it has ended.');
  await end(ctx, [found]);
}

/** Signs the person out everywhere but where they ask from. */
export async function endOtherSessions(ctx: Context, person: Person, currentSid: string): Promise<void> {
  await end(
    ctx,
    (await listSessions(ctx, person, currentSid)).filter(({ current }) => !current),
  );
}

async function end(ctx: Context, ended: OpenSession[]): Promise<void> {
  for (const { sid } of ended) {
    await ctx.db.sequelize.query('DELETE FROM sessions WHERE sid = $1', {
      bind: [sid],
      type: QueryTypes.DELETE,
    });
    ctx.live.endSession(sid);
  }
}

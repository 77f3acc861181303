/** Letters that have not left yet, for an admin to see and to try again. */
import type { PageQuery } from '@/shared/contracts/common';
import type { Actor, Context } from '../context';
import { noSuch } from '../errors';
import type { MailMessage } from '../models/messages';
import { recordBy } from './audit';
import { type Found, newestFirst } from './paging';
import { lettersOf } from './sink-mail';

const UNSENT = { state: ['waiting', 'failed'] };

/** Newest first; without their words, which may hold somebody's link to a new password. */
export async function listQueuedMail(
  ctx: Context,
  actor: Actor,
  query: PageQuery,
): Promise<Found<MailMessage>> {
  const where = { ...UNSENT, ...(await lettersOf(ctx, actor)) };
  return newestFirst(ctx.db.MailMessage, query, where, { attributes: { exclude: ['text', 'html'] } });
}

/**
 * Has the letter `id` tried at once, or all that have not left. One that is being tried just now is left to that. Throws
 * 404 for what is no unsent letter of the workspace.
 */
export async function retryMail(ctx: Context, actor: Actor, id: string | null): Promise<void> {
  const where = { ...UNSENT, ...(id ? { id } : {}), ...(await lettersOf(ctx, actor)) };
  await ctx.db.transaction(async (transaction) => {
    if (id && (await ctx.db.MailMessage.count({ where, transaction })) === 0) throw noSuch('unsent letter');
    const lock = transaction.LOCK.UPDATE;
    const letters = await ctx.db.MailMessage.findAll({
      where,
      attributes: ['id', 'subject'],
      lock,
      skipLocked: true,
      transaction,
    });
    if (letters.length === 0) return;
    const again = { state: 'waiting', dueAt: ctx.clock() } as const;
    const ids = letters.map((letter) => letter.id);
    await ctx.db.MailMessage.update(again, { where: { id: ids }, transaction });
    const subject = letters.length === 1 ? letters[0]!.subject : `${letters.length} letters`;
    await recordBy(ctx, actor, { action: 'mail.tried-again', subject }, transaction);
    ctx.mail.wakeAfter(transaction);
  });
}

/** What the local mail sink holds, for an admin to read. */
import { Op, type WhereOptions } from 'sequelize';
import type { PageQuery } from '@/shared/contracts/common';
import type { Actor, Context } from '../context';
import { notFound } from '../errors';
import type { SinkLetter } from '../models/messages';
import { escapeLike } from './audit';
import { type Found, newestFirst } from './paging';

/** Throws 404 where mail goes to a real server. */
export async function listSinkMail(ctx: Context, actor: Actor, query: PageQuery): Promise<Found<SinkLetter>> {
  if (ctx.config.smtpUrl) throw notFound('Mail goes to a mail server: nothing is kept here.');
  const mine = await lettersOf(ctx, actor);
  const where: WhereOptions<SinkLetter> = query.search
    ? { ...mine, subject: { [Op.iLike]: `%${escapeLike(query.search)}%` } }
    : mine;
  return newestFirst(ctx.db.SinkLetter, query, where);
}

/**
 * Letters that are the workspace's to see: those about its work, and those about the account of somebody who belongs to
 * it or is invited. Never those about another workspace's work, whoever gets them.
 */
export async function lettersOf(ctx: Context, { workspaceId }: Actor) {
  const [members, invitations] = await Promise.all([
    ctx.db.Membership.findAll({ where: { workspaceId }, include: ['user'] }),
    ctx.db.Invitation.findAll({ where: { workspaceId }, attributes: ['email'] }),
  ]);
  const recipient = [
    ...members.map((member) => member.user?.email ?? ''),
    ...invitations.map((i) => i.email),
  ];
  return { [Op.or]: [{ workspaceId }, { workspaceId: null, recipient }] };
}

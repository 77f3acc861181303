/** What the local mail sink holds, for an admin to read. */
import { Op, type WhereOptions } from 'sequelize';
import type { PageQuery } from '@/shared/contracts/common';
import type { Actor, Context } from '../context';
import { notFound } from '../errors';
import type { SinkLetter } from '../models/messages';
import { escapeLike } from './audit';
import { type Found, newestFirst } from './paging';

/** Letters to members and invited people of the workspace alone. Throws 404 where mail goes to a real server. */
export async function listSinkMail(ctx: Context, actor: Actor, query: PageQuery): Promise<Found<SinkLetter>> {
  if (ctx.config.smtpUrl) throw notFound('Mail goes to a mail server: nothing is kept here.');
  const { workspaceId } = actor;
  const [members, invitations] = await Promise.all([
    ctx.db.Membership.findAll({ where: { workspaceId }, include: ['user'] }),
    ctx.db.Invitation.findAll({ where: { workspaceId }, attributes: ['email'] }),
  ]);
  const recipient = [
    ...members.map((member) => member.user?.email ?? ''),
    ...invitations.map((i) => i.email),
  ];
  const where: WhereOptions<SinkLetter> = query.search
    ? { recipient, subject: { [Op.iLike]: `%${escapeLike(query.search)}%` } }
    : { recipient };
  return newestFirst(ctx.db.SinkLetter, query, where);
}

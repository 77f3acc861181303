/** Who belongs to a workspace, in which role. */
import type { Transaction } from 'sequelize';
import type { Role } from '@/shared/contracts/roles';
import type { Actor, Context } from '../context';
import { conflict, noSuch } from '../errors';
import type { Membership } from '../models/accounts';
import { revokeTokensOf } from './api-tokens';
import { recordBy } from './audit';

export const listMembers = (ctx: Context, actor: Actor): Promise<Membership[]> =>
  ctx.db.Membership.findAll({
    where: { workspaceId: actor.workspaceId },
    include: ['user'],
    order: [['createdAt', 'ASC'], ['userId', 'ASC']], // prettier-ignore
  });

/** Throws 409 when it would leave the workspace without an admin. */
export async function changeRole(
  ctx: Context,
  actor: Actor,
  userId: string,
  role: Role,
): Promise<Membership> {
  return ctx.db.transaction(async (transaction) => {
    const member = await lockMember(ctx, actor, userId, transaction);
    const before = member.role;
    if (before === 'admin' && role !== 'admin') await keepAnAdmin(ctx, actor, userId, transaction);
    await member.update({ role }, { transaction });
    const subject = member.user?.email ?? userId;
    await recordBy(ctx, actor, { action: 'member.role-changed', subject, detail: { before, after: role } }, transaction); // prettier-ignore
    return member;
  });
}

/** Takes a person out of the workspace; what they made stays, but the tokens, which they know. Throws 409 for the last admin. */
export async function removeMember(ctx: Context, actor: Actor, userId: string): Promise<void> {
  await ctx.db.transaction(async (transaction) => {
    const member = await lockMember(ctx, actor, userId, transaction);
    if (member.role === 'admin') await keepAnAdmin(ctx, actor, userId, transaction);
    await member.destroy({ transaction });
    await revokeTokensOf(ctx, actor, userId, transaction);
    const subject = member.user?.email ?? userId;
    await recordBy(
      ctx,
      actor,
      { action: 'member.removed', subject, detail: { role: member.role } },
      transaction,
    );
  });
  ctx.live.leaveWorkspace(userId, actor.workspaceId);
}

/** The actor's own way out; what they made stays, but their tokens. Throws 409 for the last admin. */
export async function leaveWorkspace(ctx: Context, actor: Actor): Promise<void> {
  const { userId } = actor;
  await ctx.db.transaction(async (transaction) => {
    const member = await lockMember(ctx, actor, userId, transaction);
    if (member.role === 'admin') await keepAnAdmin(ctx, actor, userId, transaction);
    await member.destroy({ transaction });
    await revokeTokensOf(ctx, actor, userId, transaction);
    const what = { action: 'member.left', subject: actor.email, subjectId: userId };
    await recordBy(ctx, actor, { ...what, detail: { role: member.role } }, transaction);
  });
  ctx.live.leaveWorkspace(userId, actor.workspaceId);
}

/** All members are locked, so that two admins who demote each other at once cannot both succeed. */
async function lockMember(ctx: Context, actor: Actor, userId: string, transaction: Transaction) {
  const { workspaceId } = actor;
  await ctx.db.Membership.findAll({ where: { workspaceId }, lock: transaction.LOCK.UPDATE, transaction });
  const member = await ctx.db.Membership.findOne({
    where: { workspaceId, userId },
    include: ['user'],
    transaction,
  });
  if (!member) throw noSuch('member');
  return member;
}

async function keepAnAdmin(ctx: Context, actor: Actor, userId: string, transaction: Transaction) {
  const { workspaceId } = actor;
  const admins = await ctx.db.Membership.findAll({ where: { workspaceId, role: 'admin' }, transaction });
  if (admins.some((admin) => admin.userId !== userId)) return;
  throw conflict('This is the only admin of the workspace. Make somebody else an admin first.');
}

/** Invitations by e-mail: single use, seven days, the token stored as a hash alone. */
import { Op, type Transaction } from 'sequelize';
import type { InvitationAccept, InvitationCreate, InvitationPreview } from '@/shared/contracts/accounts';
import type { Actor, Context } from '../context';
import { conflict, invalid, notFound, noSuch, wrongCredentials } from '../errors';
import { invitationLetter } from '../mail/letters';
import type { Invitation, User } from '../models/accounts';
import { record, recordBy } from './audit';
import { checkPassword, hashPassword, hashToken, newToken } from './secrets';

const LIFE_MS = 7 * 24 * 3_600_000;

/** Those that are neither accepted nor run out. */
export const listInvitations = (ctx: Context, actor: Actor): Promise<Invitation[]> =>
  ctx.db.Invitation.findAll({
    where: { workspaceId: actor.workspaceId, acceptedAt: null, expiresAt: { [Op.gt]: ctx.clock() } },
    include: ['invitedBy'],
    order: [['createdAt', 'DESC']],
  });

/** A second invitation to the same address takes the place of the first. Throws 409 for a member. */
export async function invite(
  ctx: Context,
  actor: Actor,
  { email, role }: InvitationCreate,
  baseUrl: string,
): Promise<Invitation> {
  const { workspaceId } = actor;
  const { token, hash } = newToken();
  return ctx.db.transaction(async (transaction) => {
    if (await isMember(ctx, workspaceId, email, transaction)) {
      throw conflict(`${email} is a member already. Change the role in the list of members.`);
    }
    await ctx.db.Invitation.destroy({ where: { workspaceId, email, acceptedAt: null }, transaction });
    const expiresAt = new Date(ctx.clock().getTime() + LIFE_MS);
    const invitation = await ctx.db.Invitation.create(
      { workspaceId, email, role, tokenHash: hash, invitedById: actor.userId, expiresAt },
      { transaction },
    );
    const url = `${baseUrl}/invitation?token=${token}`;
    const letter = invitationLetter(email, actor.name, actor.workspaceName, role, url);
    await ctx.mail.send(letter, transaction, workspaceId);
    await recordBy(ctx, actor, { action: 'invitation.sent', subject: email, detail: { role } }, transaction);
    return invitation;
  });
}

export async function withdrawInvitation(ctx: Context, actor: Actor, id: string): Promise<void> {
  await ctx.db.transaction(async (transaction) => {
    const where = { id, workspaceId: actor.workspaceId, acceptedAt: null };
    const invitation = await ctx.db.Invitation.findOne({ where, transaction });
    if (!invitation) throw noSuch('open invitation');
    await invitation.destroy({ transaction });
    await recordBy(ctx, actor, { action: 'invitation.withdrawn', subject: invitation.email }, transaction);
  });
}

export async function previewInvitation(ctx: Context, token: string): Promise<InvitationPreview> {
  const invitation = await findOpen(ctx, token);
  const { email, role, workspace } = invitation;
  const known = await ctx.db.User.findOne({ where: { email }, attributes: ['id'] });
  return { email, role, workspaceName: workspace?.name ?? '', hasAccount: known !== null };
}

/** Makes the account where there is none (else its password is asked), and the membership. */
export async function acceptInvitation(
  ctx: Context,
  token: string,
  input: InvitationAccept,
  address: string | null,
): Promise<User> {
  const { email } = await findOpen(ctx, token);
  const known = await ctx.db.User.findOne({ where: { email } });
  if (known && !(await checkPassword(known.passwordHash, input.password))) {
    throw wrongCredentials(
      'You have an account with this e-mail address: give its password, or reset it first.',
    );
  }
  if (!known && !input.name) {
    const message = 'Give your name.';
    throw invalid(message, { errors: [{ path: 'name', message }] });
  }
  const passwordHash = known?.passwordHash ?? (await hashPassword(input.password));
  return ctx.db.transaction(async (transaction) => {
    const invitation = await findOpen(ctx, token, transaction);
    const { workspaceId, role } = invitation;
    const name = input.name ?? '';
    const user = known ?? (await ctx.db.User.create({ email, name, passwordHash }, { transaction }));
    await ctx.db.Membership.upsert({ workspaceId, userId: user.id, role }, { transaction });
    await invitation.update({ acceptedAt: ctx.clock() }, { transaction });
    const by = { userId: user.id, name: user.name, address };
    await record(
      ctx,
      { workspaceId, by, action: 'member.joined', subject: email, detail: { role } },
      transaction,
    );
    return user;
  });
}

async function findOpen(ctx: Context, token: string, transaction?: Transaction): Promise<Invitation> {
  const invitation = await ctx.db.Invitation.findOne({
    where: { tokenHash: hashToken(token), acceptedAt: null, expiresAt: { [Op.gt]: ctx.clock() } },
    include: ['workspace'],
    ...(transaction ? { transaction, lock: { level: transaction.LOCK.UPDATE, of: ctx.db.Invitation } } : {}),
  });
  if (!invitation) {
    throw notFound('This invitation has been used or withdrawn, or has run out. Ask for a new one.');
  }
  return invitation;
}

async function isMember(ctx: Context, workspaceId: string, email: string, transaction: Transaction) {
  const user = await ctx.db.User.findOne({ where: { email }, attributes: ['id'], transaction });
  if (!user) return false;
  return (await ctx.db.Membership.findOne({ where: { workspaceId, userId: user.id }, transaction })) !== null;
}

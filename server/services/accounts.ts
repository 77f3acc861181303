/** Signing in, the first admin, and new passwords. */
import { QueryTypes } from 'sequelize';
import type { FirstAdmin, PasswordReset, SignIn } from '@/shared/contracts/accounts';
import type { Context, Person } from '../context';
import { conflict, notFound, wrongCredentials } from '../errors';
import { resetLetter } from '../mail/letters';
import type { Membership, User } from '../models/accounts';
import { record } from './audit';
import { readPreferences } from './preferences';
import { checkPassword, hashPassword, hashToken, newToken } from './secrets';

const RESET_LIFE_MS = 3_600_000;

/** Null when there is no such user any more. */
export async function loadPerson(
  ctx: Context,
  userId: string,
  address: string | null,
): Promise<Person | null> {
  const user = await ctx.db.User.findByPk(userId, {
    include: [{ association: 'memberships', include: ['workspace'] }],
    order: [['memberships', 'createdAt', 'ASC']],
  });
  if (!user) return null;
  const memberships = (user.memberships ?? []).map(inShort);
  const preferences = readPreferences(user.preferences);
  return { userId, name: user.name, email: user.email, address, preferences, memberships };
}

const inShort = ({ workspaceId, workspace, role }: Membership) => ({
  workspaceId,
  workspaceName: workspace?.name ?? '',
  role,
});

/** Throws 401 with the same words, after the same time, for an unknown address and for a wrong password. */
export async function signIn(ctx: Context, { email, password }: SignIn): Promise<User> {
  const user = await ctx.db.User.findOne({ where: { email } });
  const fits = await checkPassword(user?.passwordHash, password);
  if (!user || !fits) {
    throw wrongCredentials(
      'E-mail address and password do not belong together. Check both, or reset the password.',
    );
  }
  return user;
}

export async function needsFirstAdmin(ctx: Context): Promise<boolean> {
  return (await ctx.db.User.findOne({ attributes: ['id'] })) === null;
}

/** Makes the first person and their workspace. Throws 409 once anybody exists, also when two ask at once. */
export async function createFirstAdmin(
  ctx: Context,
  input: FirstAdmin,
  address: string | null,
): Promise<User> {
  const passwordHash = await hashPassword(input.password);
  return ctx.db.transaction(async (transaction) => {
    await ctx.db.sequelize.query('LOCK TABLE users IN EXCLUSIVE MODE', { transaction });
    if (await ctx.db.User.findOne({ attributes: ['id'], transaction })) {
      throw conflict(
        'This installation has its first admin already. Sign in, or ask an admin for an invitation.',
      );
    }
    const { email, name } = input;
    const user = await ctx.db.User.create({ email, name, passwordHash }, { transaction });
    const workspace = await ctx.db.Workspace.create({ name: input.workspaceName }, { transaction });
    const membership = { workspaceId: workspace.id, userId: user.id, role: 'admin' as const };
    await ctx.db.Membership.create(membership, { transaction });
    const by = { userId: user.id, name, address };
    await record(
      ctx,
      { workspaceId: workspace.id, by, action: 'workspace.created', subject: workspace.name },
      transaction,
    );
    return user;
  });
}

/** Sends a letter when the address is known; answers the same when it is not. */
export async function requestReset(ctx: Context, email: string, baseUrl: string): Promise<void> {
  const user = await ctx.db.User.findOne({ where: { email } });
  if (!user) return;
  const { token, hash } = newToken();
  await ctx.db.transaction(async (transaction) => {
    const expiresAt = new Date(ctx.clock().getTime() + RESET_LIFE_MS);
    await ctx.db.PasswordReset.create({ userId: user.id, tokenHash: hash, expiresAt }, { transaction });
    const url = `${baseUrl}/reset-password?token=${token}`;
    await ctx.mail.send(resetLetter(user.email, user.name, url), transaction);
  });
}

/** Sets the new password, voids every other reset link and ends all of the person's sessions. Answers who it was. */
export async function completeReset(ctx: Context, { token, password }: PasswordReset): Promise<string> {
  const passwordHash = await hashPassword(password);
  return ctx.db.transaction(async (transaction) => {
    const now = ctx.clock();
    const reset = await ctx.db.PasswordReset.findOne({
      where: { tokenHash: hashToken(token), usedAt: null },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!reset || reset.expiresAt <= now) {
      throw notFound('This link has been used, or has run out. Ask for a new one on the sign-in page.');
    }
    const { userId } = reset;
    await ctx.db.PasswordReset.update({ usedAt: now }, { where: { userId, usedAt: null }, transaction });
    await ctx.db.User.update({ passwordHash }, { where: { id: userId }, transaction });
    await ctx.db.sequelize.query("DELETE FROM sessions WHERE sess ->> 'userId' = $1", {
      bind: [userId],
      type: QueryTypes.DELETE,
      transaction,
    });
    return userId;
  });
}

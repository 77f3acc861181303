/** API tokens: made and revoked by admins; each acts in one workspace, within its scopes, under its own name. */
import { randomBytes } from 'node:crypto';
import { Op, type Transaction, UniqueConstraintError } from 'sequelize';
import type { TokenCreate } from '@/shared/contracts/tokens';
import type { Actor, Context } from '../context';
import { badToken, conflict, noSuch } from '../errors';
import type { ApiToken } from '../models/api-token';
import { recordBy } from './audit';
import { readPreferences } from './preferences';
import { hashToken } from './secrets';

/** Marks the string as one of ours where it turns up in a place it should not be. */
const MARK = 'dwt_';
const SHOWN_LETTERS = 6;
const DAY_MS = 24 * 3_600_000;
/** The row hears of a use no more often than this. */
const USE_EVERY_MS = 60_000;

/** Newest first, with those that are revoked or have run out. */
export const listTokens = (ctx: Context, { workspaceId }: Actor): Promise<ApiToken[]> =>
  ctx.db.ApiToken.findAll({
    where: { workspaceId },
    include: ['createdBy'],
    order: [['createdAt', 'DESC'], ['id', 'DESC']], // prettier-ignore
  });

/** Answers the token itself too, which nobody can be told again. Throws 409 for a name that an unrevoked one has. */
export async function createToken(
  ctx: Context,
  actor: Actor,
  { name, scopes, expiresInDays }: TokenCreate,
): Promise<{ row: ApiToken; token: string }> {
  const token = MARK + randomBytes(32).toString('base64url');
  const { workspaceId, userId: createdById } = actor;
  const row = await ctx.db
    .transaction(async (transaction) => {
      const made = await ctx.db.ApiToken.create(
        {
          workspaceId,
          createdById,
          name,
          scopes,
          prefix: token.slice(0, MARK.length + SHOWN_LETTERS),
          tokenHash: hashToken(token),
          expiresAt: expiresInDays === null ? null : new Date(ctx.clock().getTime() + expiresInDays * DAY_MS),
        },
        { transaction },
      );
      const what = { subject: name, subjectId: made.id, detail: { scopes, expiresInDays } };
      await recordBy(ctx, actor, { action: 'token.created', ...what }, transaction);
      return made;
    })
    .catch((error: unknown) => {
      if (!(error instanceof UniqueConstraintError)) throw error;
      const message = `There is a token named “${name}” already. Choose another name, or revoke that one first.`;
      throw conflict(message, { errors: [{ path: 'name', message }] });
    });
  return { row: await row.reload({ include: ['createdBy'] }), token };
}

/** From then on it opens nothing; its row stays. */
export async function revokeToken(ctx: Context, actor: Actor, id: string): Promise<void> {
  await ctx.db.transaction(async (transaction) => {
    const where = { id, workspaceId: actor.workspaceId, revokedAt: null };
    const row = await ctx.db.ApiToken.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    if (!row) throw noSuch('token');
    await revoke(ctx, actor, row, transaction);
  });
}

/** When somebody leaves: they know the tokens that they made. */
export async function revokeTokensOf(
  ctx: Context,
  actor: Actor,
  createdById: string,
  transaction: Transaction,
): Promise<void> {
  const where = { workspaceId: actor.workspaceId, createdById, revokedAt: null };
  for (const row of await ctx.db.ApiToken.findAll({ where, transaction })) {
    await revoke(ctx, actor, row, transaction);
  }
}

async function revoke(ctx: Context, actor: Actor, row: ApiToken, transaction: Transaction): Promise<void> {
  await row.update({ revokedAt: ctx.clock() }, { transaction });
  const what = { action: 'token.revoked', subject: row.name, subjectId: row.id };
  await recordBy(ctx, actor, what, transaction);
}

/** Whom a token makes of its caller. Throws 401 for one that is unknown, revoked or has run out. */
export async function actorOfToken(ctx: Context, token: string, address: string | null): Promise<Actor> {
  const now = ctx.clock();
  const row = await ctx.db.ApiToken.findOne({
    where: {
      tokenHash: hashToken(token),
      revokedAt: null,
      expiresAt: { [Op.or]: [null, { [Op.gt]: now }] },
    },
    include: ['createdBy', 'workspace'],
  });
  if (!row) throw badToken('This token is unknown, was revoked or has run out. Ask an admin for a new one.');
  await noteUse(ctx, row, now, address);
  const { id, name, scopes, workspaceId, createdById: userId } = row;
  const workspaceName = row.workspace?.name ?? '';
  return {
    userId,
    name: `Token “${name}”`,
    email: row.createdBy?.email ?? '',
    address,
    preferences: readPreferences({}),
    memberships: [],
    workspaceId,
    workspaceName,
    role: 'viewer',
    token: { id, name, scopes },
  };
}

async function noteUse(ctx: Context, row: ApiToken, now: Date, address: string | null): Promise<void> {
  if (row.lastUsedAt && now.getTime() - row.lastUsedAt.getTime() < USE_EVERY_MS) return;
  await row.update({ lastUsedAt: now, lastUsedFrom: address });
}

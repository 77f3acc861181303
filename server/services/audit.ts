/** The audit trail: written in the transaction of the change itself, read by admins, changed by nobody. */
import { Op, type Transaction, type WhereOptions } from 'sequelize';
import type { PageQuery } from '@/shared/contracts/common';
import type { Actor, Context } from '../context';
import type { AuditEntry } from '../models/messages';
import { type Found, newestFirst } from './paging';

interface Entry {
  workspaceId: string;
  /** Null: the server itself. */
  by: { userId: string | null; name: string; address: string | null } | null;
  action: string;
  subject: string;
  /** Id of what it was done to, so that its history can be read. */
  subjectId?: string;
  detail?: Record<string, unknown>;
}

export async function record(ctx: Context, entry: Entry, transaction: Transaction): Promise<void> {
  await ctx.db.AuditEntry.create(
    {
      workspaceId: entry.workspaceId,
      actorId: entry.by?.userId ?? null,
      actorName: entry.by?.name ?? 'Server',
      action: entry.action,
      subject: entry.subject,
      subjectId: entry.subjectId ?? null,
      detail: entry.detail ?? {},
      address: entry.by?.address ?? null,
    },
    { transaction },
  );
}

/** What `actor` did in their workspace; a token under its own name. */
export const recordBy = (
  ctx: Context,
  actor: Actor,
  what: Pick<Entry, 'action' | 'subject' | 'subjectId' | 'detail'>,
  transaction: Transaction,
): Promise<void> => {
  const { workspaceId, token } = actor;
  if (!token) return record(ctx, { workspaceId, by: actor, ...what }, transaction);
  const by = { userId: null, name: actor.name, address: actor.address };
  const detail = { ...what.detail, tokenId: token.id };
  return record(ctx, { workspaceId, by, ...what, detail }, transaction);
};

export function listAudit(ctx: Context, actor: Actor, query: PageQuery): Promise<Found<AuditEntry>> {
  const pattern = query.search ? `%${escapeLike(query.search)}%` : null;
  const where: WhereOptions<AuditEntry> = pattern
    ? {
        workspaceId: actor.workspaceId,
        [Op.or]: ['action', 'subject', 'actorName'].map((column) => ({ [column]: { [Op.iLike]: pattern } })),
      }
    : { workspaceId: actor.workspaceId };
  return newestFirst(ctx.db.AuditEntry, query, where);
}

/** `text` as it stands inside a LIKE pattern. */
export const escapeLike = (text: string): string => text.replace(/[\\%_]/g, '\\$&');

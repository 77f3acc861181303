/** The audit trail: written in the transaction of the change itself, read by admins, changed by nobody. */
import { Op, type Transaction, type WhereOptions } from 'sequelize';
import type { AuditFilter, AuditQuery } from '@/shared/contracts/accounts';
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

export const listAudit = (ctx: Context, actor: Actor, query: AuditQuery): Promise<Found<AuditEntry>> =>
  newestFirst(ctx.db.AuditEntry, query, narrowed(actor, query));

/** All that the filter lets through, newest first, page by page: the trail may be longer than memory. */
export async function* allAudit(ctx: Context, actor: Actor, filter: AuditFilter): AsyncGenerator<AuditEntry> {
  const where = narrowed(actor, filter);
  let cursor: string | undefined;
  do {
    const page = await newestFirst(ctx.db.AuditEntry, { limit: PAGE, cursor }, where);
    yield* page.items;
    cursor = page.nextCursor ?? undefined;
  } while (cursor);
}

const PAGE = 200;

function narrowed({ workspaceId }: Actor, filter: AuditFilter): WhereOptions<AuditEntry> {
  const { action, actorId, subjectId, from, to, search } = filter;
  const pattern = search ? `%${escapeLike(search)}%` : null;
  const conditions: WhereOptions<AuditEntry>[] = [
    { workspaceId },
    ...(action ? [{ action: action.endsWith('.') ? { [Op.like]: `${escapeLike(action)}%` } : action }] : []),
    ...(actorId ? [{ actorId }] : []),
    ...(subjectId ? [{ subjectId }] : []),
    ...(from ? [{ createdAt: { [Op.gte]: new Date(from) } }] : []),
    ...(to ? [{ createdAt: { [Op.lt]: new Date(to) } }] : []),
    ...(pattern
      ? [
          {
            [Op.or]: ['action', 'subject', 'actorName'].map((column) => ({
              [column]: { [Op.iLike]: pattern },
            })),
          },
        ]
      : []),
  ];
  return { [Op.and]: conditions };
}

/** `text` as it stands inside a LIKE pattern. */
export const escapeLike = (text: string): string => text.replace(/[\\%_]/g, '\\$&');

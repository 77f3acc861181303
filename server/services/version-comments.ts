/** Comments on a version and on single parameters of it: by anybody who reads, kept for good. */
import type { CommentCreate } from '@/shared/contracts/version-reviews';
import type { Actor, Context } from '../context';
import type { VersionComment } from '../models/version-comment';
import { recordBy } from './audit';
import { getVersion, lockVersion } from './versions';

/** Oldest first. */
export async function listComments(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
): Promise<VersionComment[]> {
  const { id: versionId } = await getVersion(ctx, actor, setId, number);
  return ctx.db.VersionComment.findAll({
    where: { versionId },
    include: ['createdBy'],
    order: [['createdAt', 'ASC'], ['id', 'ASC']],
  }); // prettier-ignore
}

export async function addComment(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  input: CommentCreate,
): Promise<VersionComment> {
  const { text, path = null } = input;
  const id = await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockVersion(ctx, actor, setId, number, transaction);
    const row = { versionId: version.id, createdById: actor.userId, path, text };
    const made = await ctx.db.VersionComment.create(row, { transaction });
    const what = { subject: set.name, subjectId: version.id, detail: { number, path, text } };
    await recordBy(ctx, actor, { action: 'version.commented', ...what }, transaction);
    return made.id;
  });
  return ctx.db.VersionComment.findByPk(id, { include: ['createdBy'], rejectOnEmpty: true });
}

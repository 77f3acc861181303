/**
 * The way of a version from its author to the vehicle: submitted, returned, released. The rules stand here to be told in
 * words, and in the database (migration review-versions) to be kept.
 */
import type { Transaction } from 'sequelize';
import type { ReviewRelease, ReviewReturn } from '@/shared/contracts/parameter-sets';
import type { Actor, Context } from '../context';
import { conflict, ownWork } from '../errors';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import { recordBy } from './audit';
import { passGate } from './release-gate';
import { tellReleased, tellReturned, tellReviewAsked } from './version-letters';
import { getVersion, lockVersion, inWords } from './versions';

/** From now on it is never changed. Throws 409 for what is no draft, or whose set has no vehicle. */
export async function submitVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  baseUrl: string,
): Promise<SetVersion> {
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockVersion(ctx, actor, setId, number, transaction);
    if (version.state !== 'draft') {
      throw conflict(`Version ${number} is ${inWords(version.state)}: only a draft is submitted.`);
    }
    // Locked, so that nobody gives the set another vehicle meanwhile.
    await set.reload({ lock: transaction.LOCK.SHARE, transaction });
    vehicleOf(set);
    const submitted = { state: 'in-review', submittedById: actor.userId, submittedAt: ctx.clock() } as const;
    await version.update(submitted, { transaction });
    await tellReviewAsked(ctx, { actor, set, version, baseUrl }, transaction);
    await note(ctx, actor, 'version.submitted', set, version, {}, transaction);
  });
  return getVersion(ctx, actor, setId, number);
}

/** Sends it back to its author with a reason. Throws 409 for what is not in review, 403 for its author. */
export async function returnVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  { comment }: ReviewReturn,
  baseUrl: string,
): Promise<SetVersion> {
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockForReview(ctx, actor, setId, number, transaction);
    await version.update({ state: 'returned', ...reviewedBy(ctx, actor, comment) }, { transaction });
    await tellReturned(ctx, { actor, set, version, baseUrl }, comment, transaction);
    await note(ctx, actor, 'version.returned', set, version, { comment }, transaction);
  });
  return getVersion(ctx, actor, setId, number);
}

/** Makes it the one released version of its vehicle; the one before is superseded. Throws as `returnVersion` and `passGate`. */
export async function releaseVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  body: ReviewRelease,
  baseUrl: string,
): Promise<SetVersion> {
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockForReview(ctx, actor, setId, number, transaction);
    const vehicleId = vehicleOf(set);
    // Releases for one vehicle follow one another, whatever their sets.
    const lock = transaction.LOCK.UPDATE;
    const vehicle = await ctx.db.Vehicle.findByPk(vehicleId, { lock, transaction, rejectOnEmpty: true });
    const { comment, withoutRequirements = null } = body;
    const evidence = await passGate(ctx, set, version, vehicle, withoutRequirements, transaction);
    const superseded = await supersede(ctx, actor, vehicleId, transaction);
    const released = { state: 'released', vehicleId, evidence, ...reviewedBy(ctx, actor, comment) } as const;
    await version.update(released, { transaction });
    const done = { actor, set, version, baseUrl };
    await tellReleased(ctx, done, { comment, superseded }, transaction);
    await note(
      ctx,
      actor,
      'version.released',
      set,
      version,
      { comment, withoutRequirements, superseded },
      transaction,
    );
  });
  return getVersion(ctx, actor, setId, number);
}

/** The version, locked, that `actor` may judge. The second of two who judge at once finds it judged. */
async function lockForReview(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  transaction: Transaction,
): Promise<{ set: ParameterSet; version: SetVersion }> {
  const found = await lockVersion(ctx, actor, setId, number, transaction);
  const { state, createdById, submittedById } = found.version;
  if (state !== 'in-review') {
    throw conflict(`Version ${number} is ${inWords(state)}: only what is in review is returned or released.`);
  }
  refuseOwn(actor, createdById, submittedById ?? null);
  return found;
}

/** Throws 403 for who wrote or submitted it. */
export function refuseOwn({ userId }: Actor, createdById: string, submittedById: string | null): void {
  if (userId !== createdById && userId !== submittedById) return;
  const did = userId === createdById ? 'wrote' : 'submitted';
  throw ownWork(`You ${did} this version: another approver must judge it.`);
}

function vehicleOf({ name, vehicleId }: ParameterSet): string {
  if (vehicleId) return vehicleId;
  throw conflict(`“${name}” belongs to no vehicle yet. Say for which vehicle the set is, then go on.`);
}

/** Answers what was released for the vehicle until now, in words; null: nothing. */
async function supersede(
  ctx: Context,
  actor: Actor,
  vehicleId: string,
  transaction: Transaction,
): Promise<string | null> {
  const where = { vehicleId, state: 'released' as const };
  const earlier = await ctx.db.SetVersion.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
  if (!earlier) return null;
  await earlier.update({ state: 'superseded' }, { transaction });
  const set = await ctx.db.ParameterSet.findByPk(earlier.setId, { transaction, rejectOnEmpty: true });
  await note(ctx, actor, 'version.superseded', set, earlier, {}, transaction);
  return `${set.name}, version ${earlier.number}`;
}

const reviewedBy = (ctx: Context, { userId }: Actor, comment: string) => ({
  reviewComment: comment,
  reviewedById: userId,
  reviewedAt: ctx.clock(),
});

const note = (
  ctx: Context,
  actor: Actor,
  action: string,
  { name: subject }: ParameterSet,
  { id: subjectId, number }: SetVersion,
  detail: object,
  transaction: Transaction,
) => recordBy(ctx, actor, { action, subject, subjectId, detail: { number, ...detail } }, transaction);

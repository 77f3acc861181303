/** Versions of a set. Its author may change a draft; what has been submitted stays as it is, and is mended by a new draft. */
import type { Transaction } from 'sequelize';
import type {
  VersionCreate,
  VersionPatch,
  VersionRevise,
  VersionState,
} from '@/shared/contracts/parameter-sets';
import { parameterDifferences, type ParameterDifference } from '@/shared/parameters/parameter-differences';
import type { Actor, Context } from '../context';
import { conflict, forbidden, invalid, noSuch } from '../errors';
import type { AuditEntry } from '../models/messages';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import { recordBy } from './audit';

/** Associations that a presented version names. */
export const PEOPLE = ['createdBy', 'submittedBy', 'reviewedBy'];

/** How a state reads within a sentence. */
const STATE_WORDS: Record<VersionState, string> = {
  draft: 'a draft',
  'in-review': 'in review',
  returned: 'returned',
  released: 'released',
  superseded: 'superseded',
};
export const inWords = (state: VersionState): string => STATE_WORDS[state];

/** Throws 404 for a set or a version that is not in the workspace. */
export async function getVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
): Promise<SetVersion> {
  await findSet(ctx, actor, setId);
  const version = await ctx.db.SetVersion.findOne({ where: { setId, number }, include: PEOPLE });
  if (!version) throw noSuch('version of this parameter set');
  return version;
}

/** The version with its set, its row locked until `transaction` ends. Throws 404. */
export async function lockVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  transaction: Transaction,
): Promise<{ set: ParameterSet; version: SetVersion }> {
  const set = await findSet(ctx, actor, setId, transaction);
  const lock = transaction.LOCK.UPDATE;
  const version = await ctx.db.SetVersion.findOne({ where: { setId, number }, lock, transaction });
  if (!version) throw noSuch('version of this parameter set');
  return { set, version };
}

export async function createVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  input: VersionCreate,
): Promise<SetVersion> {
  const set = await findSet(ctx, actor, setId);
  await checkEvidence(ctx, actor, input);
  const number = await ctx.db.transaction((transaction) => addVersion(ctx, actor, set, input, transaction));
  return getVersion(ctx, actor, setId, number);
}

/** A new draft with what version `number` holds: the way to mend what was returned. */
export async function reviseVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  { note }: VersionRevise,
): Promise<SetVersion> {
  const { parameters, outages, runId, recordingId, state } = await getVersion(ctx, actor, setId, number);
  return createVersion(ctx, actor, setId, {
    note: note ?? `From version ${number}, ${inWords(state)}.`,
    parameters,
    outages,
    ...(runId ? { runId } : {}),
    ...(recordingId ? { recordingId } : {}),
    parentNumber: number,
  });
}

/** Throws 409 for what is no draft, 403 for anybody but its author: whoever writes it must not review it. */
export async function changeVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  patch: VersionPatch,
): Promise<SetVersion> {
  await checkEvidence(ctx, actor, patch);
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockVersion(ctx, actor, setId, number, transaction);
    refuseUnlessDraft(version, 'changed');
    if (version.createdById !== actor.userId) {
      throw forbidden('Only its author changes a draft. Save a version of your own that begins with it.');
    }
    const { note, parameters, outages, runId, recordingId } = version;
    await version.update(patch, { transaction });
    const named = { note, outages, runId, recordingId };
    const changed = patch.parameters ? parameterDifferences(parameters, patch.parameters) : [];
    const detail = { number, before: pick(named, patch), after: pick(patch, named), parameters: changed };
    const what = { action: 'version.changed', subject: set.name, subjectId: version.id, detail };
    await recordBy(ctx, actor, what, transaction);
  });
  return getVersion(ctx, actor, setId, number);
}

/** Throws away a draft; its number is not given again. The last version takes its set with it. */
export async function discardVersion(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
): Promise<void> {
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockVersion(ctx, actor, setId, number, transaction);
    refuseUnlessDraft(version, 'discarded');
    if (version.createdById !== actor.userId && actor.role !== 'admin') {
      throw forbidden('Only its author or an admin discards a draft.');
    }
    await version.destroy({ transaction });
    const detail = { number, note: version.note };
    const what = { action: 'version.discarded', subject: set.name, subjectId: version.id, detail };
    await recordBy(ctx, actor, what, transaction);
    await set.reload({ lock: transaction.LOCK.UPDATE, transaction });
    if ((await ctx.db.SetVersion.count({ where: { setId }, transaction })) > 0) return;
    await set.destroy({ transaction });
    await recordBy(ctx, actor, { action: 'set.deleted', subject: set.name, subjectId: setId }, transaction);
  });
}

/** What changed from version `against` to version `number`. */
export async function versionDifferences(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  against: number,
): Promise<ParameterDifference[]> {
  const [to, from] = await Promise.all([
    getVersion(ctx, actor, setId, number),
    getVersion(ctx, actor, setId, against),
  ]);
  return parameterDifferences(from.parameters, to.parameters);
}

/** What the audit trail says of a version, oldest first. */
export async function versionHistory(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
): Promise<AuditEntry[]> {
  const { id: subjectId } = await getVersion(ctx, actor, setId, number);
  const where = { workspaceId: actor.workspaceId, subjectId };
  return ctx.db.AuditEntry.findAll({ where, order: [['createdAt', 'ASC'], ['id', 'ASC']] }); // prettier-ignore
}

/**
 * Adds a draft with the next number and answers it. Numbers follow one another, also when two people save at once: the
 * set's row is locked meanwhile.
 */
export async function addVersion(
  ctx: Context,
  actor: Actor,
  { id: setId }: ParameterSet,
  input: VersionCreate,
  transaction: Transaction,
): Promise<number> {
  const lock = transaction.LOCK.UPDATE;
  const set = await ctx.db.ParameterSet.findByPk(setId, { lock, transaction, rejectOnEmpty: true });
  const newest: number | null = await ctx.db.SetVersion.max('number', { where: { setId }, transaction });
  const number = Math.max(set.lastNumber, newest ?? 0) + 1;
  const { note, parameters, outages, runId = null, recordingId = null, parentNumber = null } = input;
  if (
    parentNumber &&
    !(await ctx.db.SetVersion.count({ where: { setId, number: parentNumber }, transaction }))
  ) {
    const message = `There is no version ${parentNumber} of this set.`;
    throw invalid(message, { errors: [{ path: 'parentNumber', message }] });
  }
  await set.update({ lastNumber: number }, { transaction });
  const version = await ctx.db.SetVersion.create(
    { setId, number, note, parameters, outages, runId, recordingId, parentNumber, createdById: actor.userId, reviewedById: null },
    { transaction },
  ); // prettier-ignore
  const detail = { number, note, runId, parentNumber };
  const what = { action: 'set.version-created', subject: set.name, subjectId: version.id, detail };
  await recordBy(ctx, actor, what, transaction);
  return number;
}

/** The run and the recording that a version names must be of the workspace. */
export async function checkEvidence(
  ctx: Context,
  actor: Actor,
  { runId, recordingId }: { runId?: string | null | undefined; recordingId?: string | null | undefined },
): Promise<void> {
  const { workspaceId } = actor;
  const [run, recording] = await Promise.all([
    runId ? ctx.db.Run.count({ where: { id: runId, workspaceId } }) : 1,
    recordingId ? ctx.db.Recording.count({ where: { id: recordingId, workspaceId, deletedAt: null } }) : 1,
  ]);
  const errors = [
    ...(run ? [] : [{ path: 'runId', message: 'There is no such run in this workspace.' }]),
    ...(recording ? [] : [{ path: 'recordingId', message: 'There is no such recording in this workspace.' }]),
  ];
  if (errors.length > 0) throw invalid(errors.map((error) => error.message).join(' '), { errors });
}

/** Throws 404 for one that is not in the workspace. */
export async function findSet(
  ctx: Context,
  { workspaceId }: Actor,
  id: string,
  transaction: Transaction | null = null,
): Promise<ParameterSet> {
  const set = await ctx.db.ParameterSet.findOne({ where: { id, workspaceId }, transaction });
  if (!set) throw noSuch('parameter set');
  return set;
}

function refuseUnlessDraft({ number, state }: SetVersion, done: string): void {
  if (state === 'draft') return;
  throw conflict(
    `Version ${number} is ${inWords(state)} and cannot be ${done}. Make a new draft from it instead.`,
  );
}

const pick = (from: object, keys: object) =>
  Object.fromEntries(Object.entries(from).filter(([key]) => key in keys));

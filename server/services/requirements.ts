/** Requirements: what a version must show before it is released. */
import { Op, type Transaction, UniqueConstraintError, type WhereOptions } from 'sequelize';
import type {
  RequirementInput,
  RequirementListQuery,
  RequirementPatch,
} from '@/shared/contracts/requirements';
import { requirementFaults } from '@/shared/requirements/requirement-faults';
import type { Actor, Context, JobContext } from '../context';
import { conflict, invalid, noSuch } from '../errors';
import type { Requirement } from '../models/requirement';
import { recordBy } from './audit';
import { type Found, newestFirst } from './paging';

const WITH_NAMES = [
  'vehicle',
  'createdBy',
  {
    association: 'recordings',
    separate: true,
    order: [['recordingId', 'ASC']] as [string, string][],
    include: [{ association: 'recording', attributes: ['id', 'name'] }],
  },
];

export function listRequirements(
  ctx: Context,
  actor: Actor,
  query: RequirementListQuery,
): Promise<Found<Requirement>> {
  const { workspaceId } = actor;
  const where: WhereOptions<Requirement> = query.vehicleId
    ? { workspaceId, vehicleId: { [Op.or]: [null, query.vehicleId] } }
    : { workspaceId };
  const sort = { by: 'name', descending: false };
  return newestFirst(ctx.db.Requirement, query, where, { include: WITH_NAMES, sort });
}

/** Those that a version for this vehicle must meet: its own and those of the workspace, by name. */
export const requirementsFor = (
  ctx: JobContext,
  workspaceId: string,
  vehicleId: string | null,
  transaction: Transaction | null = null,
): Promise<Requirement[]> =>
  ctx.db.Requirement.findAll({
    where: { workspaceId, vehicleId: vehicleId ? { [Op.or]: [null, vehicleId] } : null },
    include: WITH_NAMES,
    order: [['name', 'ASC']],
    transaction,
  });

/** Throws 404 for one that is not in the workspace. */
export async function getRequirement(
  ctx: Context,
  { workspaceId }: Actor,
  id: string,
  transaction: Transaction | null = null,
): Promise<Requirement> {
  const where = { id, workspaceId };
  const requirement = await ctx.db.Requirement.findOne({ where, include: WITH_NAMES, transaction });
  if (!requirement) throw noSuch('requirement');
  return requirement;
}

/** Throws 422 for what cannot be judged or names what is not of the workspace, 409 for a name that is taken. */
export async function createRequirement(
  ctx: Context,
  actor: Actor,
  input: RequirementInput,
): Promise<Requirement> {
  await check(ctx, actor, input);
  const { workspaceId, userId: createdById } = actor;
  const id = await ctx.db
    .transaction(async (transaction) => {
      const row = { ...columnsOf(input), workspaceId, createdById, changedAt: ctx.clock() };
      const made = await ctx.db.Requirement.create(row, { transaction });
      await writeRecordings(ctx, made.id, input.recordingIds, transaction);
      const what = { action: 'requirement.created', subject: made.name, subjectId: made.id };
      await recordBy(ctx, actor, { ...what, detail: { after: input } }, transaction);
      return made.id;
    })
    .catch(nameTaken(input.name));
  return getRequirement(ctx, actor, id);
}

/** Throws as `createRequirement`. */
export async function changeRequirement(
  ctx: Context,
  actor: Actor,
  id: string,
  patch: RequirementPatch,
): Promise<Requirement> {
  await ctx.db
    .transaction(async (transaction) => {
      await ctx.db.Requirement.findOne({ where: { id }, lock: transaction.LOCK.UPDATE, transaction });
      const requirement = await getRequirement(ctx, actor, id, transaction);
      const before = inputOf(requirement);
      const after = { ...before, ...patch };
      await check(ctx, actor, after);
      await requirement.update({ ...columnsOf(after), changedAt: ctx.clock() }, { transaction });
      if (patch.recordingIds) await writeRecordings(ctx, id, patch.recordingIds, transaction);
      const what = { action: 'requirement.changed', subject: after.name, subjectId: id };
      await recordBy(ctx, actor, { ...what, detail: { before, after } }, transaction);
    })
    .catch(nameTaken(patch.name ?? ''));
  return getRequirement(ctx, actor, id);
}

export async function deleteRequirement(ctx: Context, actor: Actor, id: string): Promise<void> {
  await ctx.db.transaction(async (transaction) => {
    const requirement = await getRequirement(ctx, actor, id, transaction);
    await requirement.destroy({ transaction });
    const what = { action: 'requirement.deleted', subject: requirement.name, subjectId: id };
    await recordBy(ctx, actor, { ...what, detail: { before: inputOf(requirement) } }, transaction);
  });
}

/** As a request would give it. */
export function inputOf(row: Requirement): RequirementInput {
  return {
    name: row.name,
    metric: row.metric,
    comparison: row.comparison,
    limit: row.limitValue,
    vehicleId: row.vehicleId,
    recordingIds: (row.recordings ?? []).map(({ recordingId }) => recordingId),
    schedule: row.schedule,
  };
}

const columnsOf = ({ name, metric, comparison, limit, vehicleId, schedule }: RequirementInput) => ({
  name,
  metric,
  comparison,
  limitValue: limit,
  vehicleId,
  schedule,
});

async function writeRecordings(ctx: Context, requirementId: string, ids: string[], transaction: Transaction) {
  await ctx.db.RequirementRecording.destroy({ where: { requirementId }, transaction });
  const rows = ids.map((recordingId) => ({ requirementId, recordingId }));
  await ctx.db.RequirementRecording.bulkCreate(rows, { transaction });
}

async function check(ctx: Context, { workspaceId }: Actor, input: RequirementInput): Promise<void> {
  const errors = requirementFaults(input);
  const { vehicleId, recordingIds } = input;
  if (vehicleId && !(await ctx.db.Vehicle.count({ where: { id: vehicleId, workspaceId } }))) {
    errors.push({ path: 'vehicleId', message: 'There is no such vehicle in this workspace.' });
  }
  const found = await ctx.db.Recording.findAll({
    where: { id: recordingIds, workspaceId, deletedAt: null, confirmedAt: { [Op.ne]: null } },
    attributes: ['id'],
  });
  for (const [i, id] of recordingIds.entries()) {
    if (found.some((recording) => recording.id === id)) continue;
    errors.push({ path: `recordingIds.${i}`, message: 'There is no such recording in this workspace.' });
  }
  if (errors.length > 0) throw invalid(errors.map(({ message }) => message).join(' '), { errors });
}

const nameTaken = (name: string) => (error: unknown) => {
  if (!(error instanceof UniqueConstraintError)) throw error;
  const message = `There is a requirement named “${name}” already. Choose another name.`;
  throw conflict(message, { errors: [{ path: 'name', message }] });
};

/** Puts the demonstration (fixtures/demo-scenario.ts) into an empty database. */
import type { Transaction } from 'sequelize';
import {
  DEMO_PASSWORD,
  DEMO_PEOPLE,
  DEMO_RECORDINGS,
  DEMO_REQUIREMENTS,
  DEMO_SETS,
  DEMO_VEHICLES,
  DEMO_WORKSPACE,
} from '@/fixtures/demo-scenario';
import { parametersSchema } from '@/shared/contracts/parameters';
import { requirementInputSchema } from '@/shared/contracts/requirements';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import type { Context } from '../context';
import { sendDecode } from '../services/decoding';
import { hashPassword } from '../services/secrets';

const MINUTE_MS = 60_000;

/**
 * All or nothing, and only where nobody exists yet. The recordings are queued: they are simulated and decoded in the
 * background, so that the start does not wait for them. Answers whether it seeded.
 */
export async function seedDemo(ctx: Context): Promise<boolean> {
  if (await ctx.db.User.findOne({ attributes: ['id'] })) return false;
  const hashes = await Promise.all(DEMO_PEOPLE.map(() => hashPassword(DEMO_PASSWORD)));
  return ctx.db.transaction(async (transaction) => {
    await ctx.db.sequelize.query('LOCK TABLE users IN EXCLUSIVE MODE', { transaction });
    if (await ctx.db.User.findOne({ attributes: ['id'], transaction })) return false;
    const workspace = await ctx.db.Workspace.create({ name: DEMO_WORKSPACE, demo: true }, { transaction });
    const author = await seedPeople(ctx, workspace.id, hashes, transaction);
    const owner = { workspaceId: workspace.id, createdById: author };
    const vehicles = await seedVehicles(ctx, workspace.id, transaction);
    const recordings = await seedRecordings(ctx, owner, vehicles, transaction);
    await seedSets(ctx, owner, vehicles, recordings, transaction);
    await seedRequirements(ctx, owner, vehicles, recordings, transaction);
    ctx.log.info({ workspace: DEMO_WORKSPACE }, 'the demonstration was put into the empty database');
    return true;
  });
}

type Ids = Map<string, string>;
interface Owner {
  workspaceId: string;
  createdById: string;
}

/** Answers the id of the engineer, in whose name the rest is made. */
async function seedPeople(ctx: Context, workspaceId: string, hashes: string[], transaction: Transaction) {
  let engineer = '';
  for (const [i, { email, name, role }] of DEMO_PEOPLE.entries()) {
    const user = await ctx.db.User.create({ email, name, passwordHash: hashes[i] ?? '' }, { transaction });
    await ctx.db.Membership.create({ workspaceId, userId: user.id, role }, { transaction });
    if (role === 'engineer') engineer = user.id;
  }
  return engineer;
}

async function seedVehicles(ctx: Context, workspaceId: string, transaction: Transaction): Promise<Ids> {
  const rows = DEMO_VEHICLES.map((vehicle) => ({ ...vehicle, axes: IDENTITY_AXES, workspaceId }));
  const made = await ctx.db.Vehicle.bulkCreate(rows, { transaction });
  return new Map(made.map(({ name, id }) => [name, id]));
}

/** The first of the list is the newest, so that it stands on top. */
async function seedRecordings(
  ctx: Context,
  owner: Owner,
  vehicles: Ids,
  transaction: Transaction,
): Promise<Ids> {
  const now = ctx.clock().getTime();
  const made: Ids = new Map();
  for (const [i, { name, vehicle, notes, scenario }] of DEMO_RECORDINGS.entries()) {
    const at = new Date(now - i * MINUTE_MS);
    const recording = await ctx.db.Recording.create(
      {
        ...owner,
        name,
        notes,
        vehicleId: vehicles.get(vehicle) ?? null,
        scenario: scenarioSchema.parse(scenario),
        confirmedAt: at,
        createdAt: at,
      },
      { transaction },
    );
    await sendDecode(ctx, recording, transaction, -i); // a person's own upload goes first
    made.set(name, recording.id);
  }
  return made;
}

async function seedSets(
  ctx: Context,
  owner: Owner,
  vehicles: Ids,
  recordings: Ids,
  transaction: Transaction,
): Promise<void> {
  for (const { name, vehicle, note, recording, parameters } of DEMO_SETS) {
    const vehicleId = vehicles.get(vehicle) ?? null;
    const set = await ctx.db.ParameterSet.create({ ...owner, name, vehicleId }, { transaction });
    await ctx.db.SetVersion.create(
      {
        setId: set.id,
        number: 1,
        note,
        parameters: parametersSchema.parse(parameters),
        outages: [],
        runId: null,
        recordingId: recordings.get(recording) ?? null,
        parentNumber: null,
        createdById: owner.createdById,
        reviewedById: null,
      },
      { transaction },
    );
  }
}

async function seedRequirements(
  ctx: Context,
  owner: Owner,
  vehicles: Ids,
  recordings: Ids,
  transaction: Transaction,
): Promise<void> {
  for (const { vehicle, recordings: names, requirement } of DEMO_REQUIREMENTS) {
    const { name, metric, comparison, limit, schedule, recordingIds } = requirementInputSchema.parse({
      ...requirement,
      recordingIds: names.map((one) => recordings.get(one)),
    });
    const vehicleId = vehicles.get(vehicle) ?? null;
    const row = {
      ...owner,
      vehicleId,
      name,
      metric,
      comparison,
      limitValue: limit,
      schedule,
      changedAt: ctx.clock(),
    };
    const { id } = await ctx.db.Requirement.create(row, { transaction });
    const judgedOn = recordingIds.map((recordingId) => ({ requirementId: id, recordingId }));
    await ctx.db.RequirementRecording.bulkCreate(judgedOn, { transaction });
  }
}

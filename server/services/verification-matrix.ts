/** Requirements × recordings for one version, as they stand: what was judged, what of it still holds, what was waived. */
import type { Transaction } from 'sequelize';
import type { JobContext } from '../context';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import type { Recording } from '../models/recording';
import type { Requirement } from '../models/requirement';
import type { Definition, VerificationCell, VerificationInputs, Waiver } from '../models/verification';
import { requirementsFor } from './requirements';
import { definitionOf, hashOf, inputsOf, whatChanged } from './verification-inputs';

export interface MatrixCell {
  requirement: Requirement;
  recording: Recording;
  /** What a run for it would be made from just now. */
  inputs: VerificationInputs;
  inputHash: string;
  definition: Definition;
  requirementHash: string;
  /** Null: it was never verified. */
  judged: VerificationCell | null;
  outOfDate: string[];
  /** Of the cell as it stands now. */
  waiver: Waiver | null;
  /** A current pass, or waived. */
  settled: boolean;
}

export interface Matrix {
  requirements: Requirement[];
  recordings: Recording[];
  cells: MatrixCell[];
}

export async function loadMatrix(
  ctx: JobContext,
  { workspaceId, vehicleId }: ParameterSet,
  version: SetVersion,
  transaction: Transaction | null = null,
): Promise<Matrix> {
  const requirements = await requirementsFor(ctx, workspaceId, vehicleId, transaction);
  const ids = requirements.flatMap(({ recordings = [] }) => recordings.map(({ recordingId }) => recordingId));
  const where = { versionId: version.id };
  const recordings = await ctx.db.Recording.findAll({
    where: { id: [...new Set(ids)], deletedAt: null },
    attributes: ['id', 'name', 'status', 'sha256', 'vehicleId'],
    include: ['vehicle'],
    order: [['name', 'ASC'], ['id', 'ASC']],
    transaction,
  }); // prettier-ignore
  const run = { association: 'run', attributes: { exclude: ['parameters', 'biasSigma'] } };
  const judged = await ctx.db.VerificationCell.findAll({ where, include: [run], transaction });
  const waivers = await ctx.db.Waiver.findAll({ where, include: ['createdBy'], transaction });
  const cells = requirements.flatMap((requirement) =>
    recordings
      .filter(({ id }) => (requirement.recordings ?? []).some(({ recordingId }) => recordingId === id))
      .map((recording) => cellOf(version, requirement, recording, judged, waivers)),
  );
  return { requirements, recordings, cells };
}

function cellOf(
  version: SetVersion,
  requirement: Requirement,
  recording: Recording,
  allJudged: VerificationCell[],
  waivers: Waiver[],
): MatrixCell {
  const inputs = inputsOf(version, recording, requirement);
  const definition = definitionOf(requirement);
  const [inputHash, requirementHash] = [hashOf(inputs), hashOf(definition)];
  const isHere = (row: { requirementId: string; recordingId: string }) =>
    row.requirementId === requirement.id && row.recordingId === recording.id;
  const judged = allJudged.find(isHere) ?? null;
  const outOfDate = judged?.run
    ? whatChanged({ inputs, definition }, { inputs: judged.run.inputs, definition: judged.definition })
    : [];
  const waiver =
    waivers.find(
      (one) => isHere(one) && one.inputHash === inputHash && one.requirementHash === requirementHash,
    ) ?? null;
  const passes = judged?.verdict === 'pass' && outOfDate.length === 0;
  const settled = passes || waiver !== null;
  return {
    requirement,
    recording,
    inputs,
    inputHash,
    definition,
    requirementHash,
    judged,
    outOfDate,
    waiver,
    settled,
  };
}

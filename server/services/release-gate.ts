/** What a version must show before it is released: a full, green and current matrix, or a waiver for each other cell. */
import type { Transaction } from 'sequelize';
import type { Evidence, Verdict } from '@/shared/contracts/verification';
import { ENGINE_VERSION } from '@/workers';
import type { Context } from '../context';
import { conflict, invalid } from '../errors';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import type { Vehicle } from '../models/vehicle';
import { presentMatrix } from '../presenters/verification';
import { loadMatrix, type MatrixCell } from './verification-matrix';

/**
 * The matrix as it stands, to be kept with the release. Throws 409 for cells that stand in the way, 422 where a reason to
 * release without requirements is missing or has no place. Nobody changes a requirement until `transaction` ends.
 */
export async function passGate(
  ctx: Context,
  set: ParameterSet,
  version: SetVersion,
  vehicle: Vehicle,
  reason: string | null,
  transaction: Transaction,
): Promise<Evidence> {
  await ctx.db.sequelize.query('LOCK TABLE requirements, requirement_recordings IN SHARE MODE', {
    transaction,
  });
  const matrix = await loadMatrix(ctx, set, version, transaction);
  const { cells } = matrix;
  if (cells.length === 0 && reason === null)
    throw refused(`No requirement applies to ${vehicle.name}: ${NO_REASON}`);
  if (cells.length > 0 && reason !== null)
    throw refused(`${HAS_SOME} ${vehicle.name}: leave the reason out.`);
  const open = cells.filter((cell) => !cell.settled);
  if (open.length > 0) throw conflict(inTheWay(open, cells.length));
  const { id, name, leverArmM } = vehicle;
  return {
    ...presentMatrix(matrix),
    engineVersion: ENGINE_VERSION,
    withoutRequirements: reason,
    vehicle: { id, name, leverArmM: [...leverArmM] },
  };
}

const NO_REASON = 'add one and verify the version, or say why it may be released without.';
const HAS_SOME = 'Requirements apply to';

const refused = (message: string) => invalid(message, { errors: [{ path: 'withoutRequirements', message }] });

function inTheWay(open: MatrixCell[], all: number): string {
  const named = open.slice(0, 3).map(({ requirement, recording, judged, outOfDate }) => {
    const why = !judged?.verdict
      ? 'not verified'
      : outOfDate.length > 0
        ? `out of date because ${outOfDate.join(' and ')}`
        : verdictWords(judged.verdict);
    return `“${requirement.name}” on “${recording.name}” (${why})`;
  });
  const more = open.length > named.length ? ` and ${open.length - named.length} more` : '';
  return `${open.length} of ${all} cells of the verification stand in the way: ${named.join(', ')}${more}. Verify the version, or waive them in writing.`;
}

const WORDS: Record<Verdict, string> = {
  pass: 'passes',
  fail: 'fails',
  'not-applicable': 'the recording cannot show it',
  failed: 'the run could not be made',
};
const verdictWords = (verdict: Verdict) => WORDS[verdict];

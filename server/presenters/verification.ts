/** The verification matrix as the API shows it. */
import type {
  Evidence,
  Verification,
  VerificationCell,
  Waiver as WaiverContract,
} from '@/shared/contracts/verification';
import { metricUnit, requirementSentence } from '@/shared/requirements/metric-words';
import { ENGINE_VERSION } from '@/workers';
import type { Requirement } from '../models/requirement';
import type { VerificationRun, Waiver } from '../models/verification';
import type { Verification as Loaded } from '../services/verification';
import type { Matrix, MatrixCell } from '../services/verification-matrix';

export function presentVerification({ version, matrix }: Loaded): Verification {
  const shown = presentMatrix(matrix);
  const runs = runsBehind(matrix);
  const going = runs.some(({ state }) => state === 'waiting' || state === 'running');
  return {
    ...shown,
    engineVersion: ENGINE_VERSION,
    state: going ? 'going' : runs.length > 0 ? 'done' : 'none',
    progress: runs.length === 0 ? 0 : runs.reduce((sum, run) => sum + run.progress, 0) / runs.length,
    counts: countsOf(shown.cells),
    evidence: version.evidence ?? null,
  };
}

export const presentMatrix = ({
  requirements,
  recordings,
  cells,
}: Matrix): Pick<Evidence, 'requirements' | 'recordings' | 'cells'> => ({
  requirements: requirements.map(presentRow),
  recordings: recordings.map(({ id, name, sha256 }) => ({ id, name, sha256: sha256 ?? null })),
  cells: cells.map(presentCell),
});

const presentRow = ({ id, name, metric, comparison, limitValue: limit, schedule }: Requirement) => ({
  id,
  name,
  sentence: requirementSentence(metric, comparison, limit),
  metric,
  comparison,
  limit,
  unit: metricUnit(metric),
  schedule,
});

const STATES = { waiting: 'waiting', running: 'running', done: 'done', failed: 'done' } as const;

function presentCell({
  requirement,
  recording,
  judged,
  outOfDate,
  waiver,
  settled,
}: MatrixCell): VerificationCell {
  const run = judged?.run;
  return {
    requirementId: requirement.id,
    recordingId: recording.id,
    state: run ? STATES[run.state as keyof typeof STATES] : 'not-verified',
    progress: run?.progress ?? 0,
    verdict: judged?.verdict ?? null,
    value: judged?.value ?? null,
    bounds: judged?.bounds ?? null,
    reason: judged?.reason ?? null,
    outOfDate,
    runId: run?.runId ?? null,
    judgedAt: judged?.judgedAt?.toISOString() ?? null,
    waiver: waiver ? presentWaiver(waiver) : null,
    settled,
  };
}

const presentWaiver = ({ id, text, createdAt, createdBy }: Waiver): WaiverContract => ({
  id,
  text,
  createdAt: createdAt.toISOString(),
  createdBy: createdBy?.name ?? '',
});

function runsBehind({ cells }: Matrix): VerificationRun[] {
  const runs = cells.flatMap(({ judged }) => (judged?.run ? [judged.run] : []));
  return [...new Map(runs.map((run) => [run.id, run])).values()];
}

function countsOf(cells: VerificationCell[]): Verification['counts'] {
  const count = (is: (cell: VerificationCell) => boolean) => cells.filter(is).length;
  const current = (verdict: VerificationCell['verdict']) =>
    count((cell) => cell.verdict === verdict && cell.outOfDate.length === 0);
  return {
    cells: cells.length,
    pass: current('pass'),
    fail: current('fail'),
    notApplicable: current('not-applicable'),
    failed: current('failed'),
    going: count(({ state }) => state === 'waiting' || state === 'running'),
    notVerified: count(({ state }) => state === 'not-verified'),
    outOfDate: count(({ verdict, outOfDate }) => verdict !== null && outOfDate.length > 0),
    waived: count(({ waiver }) => waiver !== null),
    unsettled: count(({ settled }) => !settled),
  };
}

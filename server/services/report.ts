/** The evidence for one version, gathered from what is kept: nothing is computed that the API does not give as well. */
import { CAUTIONS } from '@/shared/cautions';
import type { Report, ReportParameter, ReportRun } from '@/shared/contracts/report';
import type { Evidence } from '@/shared/contracts/verification';
import { FIELD_GROUPS } from '@/shared/parameters/parameter-field';
import { PARAMETER_LIST } from '@/shared/parameters/parameter-list';
import { readPath } from '@/shared/parameters/parameter-path';
import { shownValue, unitSymbol } from '@/shared/parameters/parameter-words';
import { scheduleWords } from '@/shared/requirements/metric-words';
import { ENGINE_VERSION, sha256OfJson } from '@/workers';
import type { Actor, Context } from '../context';
import { noticeOf } from '../exports/document';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import type { Run } from '../models/run';
import { presentMatrix } from '../presenters/verification';
import { driftOf, rejectedPercent, windowsOf } from '../report/figures';
import { METHOD, REFERENCES, summaryOf } from '../report/words';
import { loadMatrix } from './verification-matrix';
import { findSet, getVersion } from './versions';

/** Throws 404 for a version that is not in the workspace. */
export async function makeReport(ctx: Context, actor: Actor, setId: string, number: number): Promise<Report> {
  const set = await (await findSet(ctx, actor, setId)).reload({ include: ['vehicle'] });
  const version = await getVersion(ctx, actor, setId, number);
  const matrix = version.evidence
    ? {
        ...pickMatrix(version.evidence),
        asReleased: true,
        withoutRequirements: version.evidence.withoutRequirements,
      }
    : { ...presentMatrix(await loadMatrix(ctx, set, version)), asReleased: false, withoutRequirements: null };
  const parent = await parentOf(ctx, version);
  const runs = await runsBehind(ctx, version, matrix);
  const told = {
    notice: noticeOf({ set, version, run: null, recording: null }),
    set: { id: set.id, name: set.name },
    version: {
      number,
      state: version.state,
      note: version.note,
      checksum: sha256OfJson(version.parameters),
    },
    vehicle: vehicleOf(set, version),
    matrix,
    runs,
  };
  return {
    madeAt: ctx.clock().toISOString(),
    ...told,
    summary: summaryOf(told),
    people: peopleOf(version),
    reviewComment: version.reviewComment ?? null,
    recordings: await recordingsOf(ctx, [...new Set(runs.map(({ recordingId }) => recordingId))]),
    against: parent?.number ?? null,
    parameters: parametersOf(version, parent),
    engineVersion: version.evidence?.engineVersion ?? ENGINE_VERSION,
    method: [...METHOD],
    references: [...REFERENCES],
    cautions: [...CAUTIONS],
  };
}

const pickMatrix = ({ requirements, recordings, cells }: Evidence) => ({ requirements, recordings, cells });

const parentOf = (ctx: Context, { setId, parentNumber }: SetVersion): Promise<SetVersion | null> =>
  parentNumber === null
    ? Promise.resolve(null)
    : ctx.db.SetVersion.findOne({ where: { setId, number: parentNumber } });

function vehicleOf(set: ParameterSet, { evidence }: SetVersion): Report['vehicle'] {
  const vehicle = set.vehicle ?? null;
  if (!vehicle && !evidence) return null;
  return {
    name: evidence?.vehicle.name ?? vehicle!.name,
    leverArmM: [...(evidence?.vehicle.leverArmM ?? vehicle!.leverArmM)],
    sensor: vehicle?.sensor?.name || null,
  };
}

function peopleOf(version: SetVersion): Report['people'] {
  const { createdBy, createdAt, submittedBy, submittedAt, reviewedBy, reviewedAt, state } = version;
  const reviewed = state === 'returned' ? 'Returned' : 'Released';
  return [
    { did: 'Drafted', name: createdBy?.name ?? '', at: createdAt.toISOString() },
    ...(submittedAt
      ? [{ did: 'Submitted', name: submittedBy?.name ?? '', at: submittedAt.toISOString() }]
      : []),
    ...(reviewedAt ? [{ did: reviewed, name: reviewedBy?.name ?? '', at: reviewedAt.toISOString() }] : []),
  ];
}

/** Every run that a cell was judged by; where there is none, the run that the version was saved with. */
async function runsBehind(ctx: Context, version: SetVersion, matrix: Report['matrix']): Promise<ReportRun[]> {
  const scheduleOf = new Map<string, string>();
  for (const { runId, requirementId } of matrix.cells) {
    const requirement = matrix.requirements.find(({ id }) => id === requirementId);
    if (runId && requirement) scheduleOf.set(runId, scheduleWords(requirement.schedule));
  }
  if (scheduleOf.size === 0 && version.runId) scheduleOf.set(version.runId, 'as saved from the bench');
  const rows = await ctx.db.Run.findAll({
    where: { id: [...scheduleOf.keys()], state: 'done' },
    include: [{ association: 'recording', attributes: ['name'] }],
  });
  return rows
    .flatMap((run) => reportRun(run, scheduleOf.get(run.id) ?? ''))
    .sort((a, b) => a.recordingName.localeCompare(b.recordingName) || a.schedule.localeCompare(b.schedule));
}

function reportRun(run: Run, schedule: string): ReportRun[] {
  const { summary, provenance } = run;
  if (!summary) return [];
  return [
    {
      runId: run.id,
      recordingId: run.recordingId,
      recordingName: run.recording?.name ?? '',
      schedule,
      engineVersion: summary.engineVersion,
      resultSha256: provenance?.resultSha256 ?? null,
      groups: summary.groups,
      rejectedPercent: rejectedPercent(summary),
      drift: driftOf(summary),
      windows: windowsOf(summary),
    },
  ];
}

async function recordingsOf(ctx: Context, ids: string[]): Promise<Report['recordings']> {
  const rows = await ctx.db.Recording.findAll({
    where: { id: ids },
    include: ['files'],
    order: [['name', 'ASC']],
  });
  return rows.map(({ id, name, startS, endS, health, sha256, files = [] }) => ({
    id,
    name,
    durationS: startS === null || endS === null ? null : endS - startS,
    verdict: health?.sentence ?? 'not decoded',
    sha256: sha256 ?? null,
    files: files.map((file) => ({ role: file.role, name: file.name, sha256: file.sha256 })),
  }));
}

function parametersOf({ parameters }: SetVersion, parent: SetVersion | null): ReportParameter[] {
  return PARAMETER_LIST.flatMap((field) => {
    const value = readPath(parameters, field.path);
    const before = parent ? readPath(parent.parameters, field.path) : null;
    if (value === null && before === null) return [];
    const percent =
      typeof value === 'number' && typeof before === 'number' && before !== 0 && value !== before
        ? ((value - before) / Math.abs(before)) * 100
        : null;
    return [
      {
        path: field.path,
        group: FIELD_GROUPS[field.group],
        label: field.label,
        unit: unitSymbol(field),
        value: shownValue(field, value),
        before: shownValue(field, before),
        changed: parent !== null && JSON.stringify(value) !== JSON.stringify(before),
        percent,
      },
    ];
  });
}

import type {
  ParameterSet,
  ParameterSetDetail,
  ParameterSetVersion,
} from '@/shared/contracts/parameter-sets';
import type { SetVersion } from '../models/parameter-set';
import type { WholeSet } from '../services/parameter-sets';

export function presentSet({ set, versions }: WholeSet): ParameterSet {
  const latest = versions[0];
  if (!latest) throw new Error(`Parameter set ${set.id} has no version.`);
  return {
    id: set.id,
    name: set.name,
    vehicleId: set.vehicleId,
    vehicleName: set.vehicle?.name ?? null,
    createdAt: set.createdAt.toISOString(),
    createdBy: set.createdBy?.name ?? '',
    latest: {
      number: latest.number,
      state: latest.state,
      note: latest.note,
      createdAt: latest.createdAt.toISOString(),
      createdBy: latest.createdBy?.name ?? '',
    },
    versionCount: versions.length,
    releasedNumber: versions.find((version) => version.state === 'released')?.number ?? null,
    inReviewNumbers: versions.filter(({ state }) => state === 'in-review').map(({ number }) => number),
  };
}

export const presentSetDetail = (whole: WholeSet): ParameterSetDetail => ({
  ...presentSet(whole),
  versions: whole.versions.map(presentVersion),
});

export const presentVersion = (row: SetVersion): ParameterSetVersion => ({
  id: row.id,
  number: row.number,
  state: row.state,
  note: row.note,
  parameters: row.parameters,
  outages: row.outages,
  runId: row.runId,
  recordingId: row.recordingId,
  parentNumber: row.parentNumber,
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
  createdById: row.createdById,
  submittedAt: row.submittedAt?.toISOString() ?? null,
  submittedBy: row.submittedBy?.name ?? null,
  reviewComment: row.reviewComment ?? null,
  reviewedBy: row.reviewedBy?.name ?? null,
  reviewedAt: row.reviewedAt?.toISOString() ?? null,
});

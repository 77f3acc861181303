import type { Requirement } from '@/shared/contracts/requirements';
import { metricUnit, requirementSentence } from '@/shared/requirements/metric-words';
import type { Requirement as RequirementRow } from '../models/requirement';
import { inputOf } from '../services/requirements';

export const presentRequirement = (row: RequirementRow): Requirement => ({
  id: row.id,
  ...inputOf(row),
  unit: metricUnit(row.metric),
  sentence: requirementSentence(row.metric, row.comparison, row.limitValue),
  vehicleName: row.vehicle?.name ?? null,
  recordings: (row.recordings ?? []).map(({ recordingId, recording }) => ({
    id: recordingId,
    name: recording?.name ?? '',
  })),
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
  changedAt: row.changedAt.toISOString(),
});

import type { Run, RunListItem } from '@/shared/contracts/runs';
import type { Run as RunRow } from '../models/run';

export const presentRunListItem = (row: RunRow): RunListItem => ({
  id: row.id,
  recordingId: row.recordingId,
  recordingName: row.recording?.name ?? '',
  state: row.state,
  progress: row.progress,
  failure: row.failure ?? null,
  outputRateHz: row.outputRateHz,
  smooth: row.smooth,
  errorBudget: row.errorBudget,
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
  finishedAt: row.finishedAt?.toISOString() ?? null,
  hasSeries: row.hasSeries,
});

export const presentRun = (row: RunRow): Run => ({
  ...presentRunListItem(row),
  parameters: row.parameters,
  outages: row.outages,
  summary: row.summary ?? null,
  provenance: row.provenance ?? null,
});

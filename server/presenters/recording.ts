/** Recordings as the API shows them. In a list the previews are left out: they are bulky and of no use there. */
import { fileRoleSchema, type Recording, type RecordingFile } from '@/shared/contracts/recordings';
import type { Recording as RecordingRow } from '../models/recording';

export const presentRecording = (row: RecordingRow): Recording => ({
  id: row.id,
  name: row.name,
  notes: row.notes,
  status: row.status,
  progress: row.progress,
  problems: row.problems,
  vehicleId: row.vehicleId,
  vehicleName: row.vehicle?.name ?? null,
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
  startS: row.startS,
  endS: row.endS,
  durationS: row.startS === null || row.endS === null ? null : row.endS - row.startS,
  hasReference: row.hasReference,
  timeOrigin: row.timeOrigin,
  health: row.health,
  strip: row.strip,
  files: presentFiles(row),
  channelMap: row.channelMap ?? row.givenMap,
  remedies: (row.remedies ?? []).map(({ code, label, at, by }) => ({ code, label, at, by })),
  previews: row.previews ?? [],
});

const ORDER = fileRoleSchema.options;

function presentFiles(row: RecordingRow): RecordingFile[] {
  const files = (row.files ?? []).map(({ role, name, bytes, sha256 }) => ({ role, name, bytes, sha256 }));
  return files.sort((a, b) => ORDER.indexOf(a.role) - ORDER.indexOf(b.role));
}

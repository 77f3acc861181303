/** The audit trail as CSV, line by line. */
import type { AuditEntry } from '../models/messages';
import { csvLine } from './csv-cell';

const COLUMNS = [
  'at',
  'actor',
  'actor_id',
  'address',
  'action',
  'subject',
  'subject_id',
  'detail_json',
] as const;

export async function* auditCsv(entries: AsyncIterable<AuditEntry>): AsyncGenerator<string> {
  yield csvLine(COLUMNS);
  for await (const entry of entries) {
    const { createdAt, actorName, actorId, address, action, subject, subjectId, detail } = entry;
    yield csvLine([
      createdAt.toISOString(),
      actorName,
      actorId ?? '',
      address ?? '',
      action,
      subject,
      subjectId ?? '',
      JSON.stringify(detail),
    ]);
  }
}

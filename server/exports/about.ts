/** What stands at the head of the formats that are lines of text. */
import type { ExportDocument } from '@/shared/contracts/exports';

/** Name and value of each line; what is unknown is left out. */
export function aboutLines(document: ExportDocument): [string, string][] {
  const { set, version, vehicle, checksum, provenance } = document;
  const { verification } = provenance;
  const lines: [string, string | null][] = [
    ['notice', document.notice],
    ['set', set.name],
    ['version', String(version.number)],
    ['state', version.state],
    ['note', version.note],
    ['vehicle', vehicle?.name ?? null],
    ['vehicle lever arm, forward right down, m', vehicle ? vehicle.leverArmM.join(' ') : null],
    ['checksum', checksum.value],
    ['checksum is', `${checksum.algorithm} over ${checksum.over}`],
    ['author', provenance.author],
    ['created', provenance.createdAt],
    ['submitted by', provenance.submittedBy],
    ['submitted', provenance.submittedAt],
    ['reviewer', provenance.reviewer],
    ['reviewed', provenance.reviewedAt],
    ['review comment', provenance.reviewComment],
    ['engine version', provenance.engineVersion],
    ...provenance.recordings.map(({ name, sha256 }): [string, string] => [
      'recording',
      `${name}, SHA-256 ${sha256 ?? 'unknown'}`,
    ]),
    [
      'verification',
      verification &&
        `${verification.passed} of ${verification.cells} cells passed, ${verification.waived} waived`,
    ],
    ['released without requirements because', verification?.withoutRequirements ?? null],
  ];
  return lines.flatMap(([name, value]): [string, string][] => (value ? [[name, value]] : []));
}

/** A version as a document: what every format of the export says. */
import { CAUTIONS } from '@/shared/cautions';
import type { ExportDocument, ExportedValue } from '@/shared/contracts/exports';
import type { Parameters } from '@/shared/contracts/parameters';
import { FIELD_GROUPS, type ParameterField } from '@/shared/parameters/parameter-field';
import { PARAMETER_LIST } from '@/shared/parameters/parameter-list';
import { readPath, type ParameterValue } from '@/shared/parameters/parameter-path';
import { shownValue, unitSymbol } from '@/shared/parameters/parameter-words';
import { type DisplayUnit, QUANTITIES } from '@/shared/units';
import { sha256OfJson } from '@/workers';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import type { Run } from '../models/run';

export interface Exported {
  set: ParameterSet;
  /** With its people. */
  version: SetVersion;
  /** It was saved with; null: none, or gone. */
  run: Run | null;
  /** It was tuned on. */
  recording: { id: string; name: string; sha256: string | null } | null;
}

export function exportDocument(exported: Exported): ExportDocument {
  const { set, version } = exported;
  const { number, state, note, parameters } = version;
  return {
    format: 'driftwright-parameter-set',
    formatVersion: 1,
    notice: noticeOf(exported),
    released: version.state === 'released',
    set: { id: set.id, name: set.name },
    vehicle: vehicleOf(exported),
    version: { number, state, note },
    checksum: {
      algorithm: 'SHA-256',
      over: 'parameters, as canonical JSON (RFC 8785)',
      value: sha256OfJson(parameters),
    },
    parameters,
    values: exportedValues(parameters),
    provenance: provenanceOf(exported),
    cautions: [...CAUTIONS],
  };
}

/** Every parameter that is set, in the order of the bench. */
export const exportedValues = (parameters: Parameters): ExportedValue[] =>
  PARAMETER_LIST.flatMap((field) => {
    const value = readPath(parameters, field.path);
    return value === null ? [] : [exportedValue(field, value)];
  });

function exportedValue(field: ParameterField, value: Exclude<ParameterValue, null>): ExportedValue {
  const isNumeric = typeof value !== 'boolean' && typeof value !== 'string';
  return {
    path: field.path,
    name: `${FIELD_GROUPS[field.group]}: ${field.label}`,
    value: typeof value === 'object' ? [...value] : value,
    unit: isNumeric ? siSymbol(field) : '',
    shown: { value: shownValue(field, value) ?? '', unit: isNumeric ? unitSymbol(field) : '' },
  };
}

/** Symbol of the unit that the contract holds the value in; 1 for a pure number. */
function siSymbol({ quantity, unit }: ParameterField): string {
  if (!quantity) return unit ?? '1';
  if (quantity === 'factor' || quantity === 'percent') return '1';
  const units: readonly DisplayUnit[] = QUANTITIES[quantity];
  return units.find(({ toSi }) => toSi === 1)?.symbol ?? '1';
}

/** Whether the version may be used, in words. */
export function noticeOf({ set, version }: Exported): string {
  const vehicle = version.evidence?.vehicle.name ?? set.vehicle?.name ?? '';
  const day = version.reviewedAt?.toISOString().slice(0, 10);
  switch (version.state) {
    case 'released':
      return `RELEASED for ${vehicle} on ${day} by ${version.reviewedBy?.name ?? ''}.`;
    case 'superseded':
      return `SUPERSEDED: no longer the released version for ${vehicle}. Fetch the released one.`;
    default:
      return `NOT RELEASED: this version is ${UNRELEASED[version.state as keyof typeof UNRELEASED]}. Not for use on a vehicle.`;
  }
}

const UNRELEASED = {
  draft: 'a draft',
  'in-review': 'in review',
  returned: 'returned by its reviewer',
} as const;

function vehicleOf({ set, version }: Exported): ExportDocument['vehicle'] {
  if (version.evidence) return version.evidence.vehicle;
  if (!set.vehicle) return null;
  const { id, name, leverArmM } = set.vehicle;
  return { id, name, leverArmM: [...leverArmM] };
}

function provenanceOf({ version, run, recording }: Exported): ExportDocument['provenance'] {
  const { evidence } = version;
  const verifiedOn = evidence?.recordings ?? [];
  return {
    author: version.createdBy?.name ?? '',
    createdAt: version.createdAt.toISOString(),
    submittedBy: version.submittedBy?.name ?? null,
    submittedAt: version.submittedAt?.toISOString() ?? null,
    reviewer: version.reviewedBy?.name ?? null,
    reviewedAt: version.reviewedAt?.toISOString() ?? null,
    reviewComment: version.reviewComment ?? null,
    engineVersion: evidence?.engineVersion ?? run?.provenance?.engineVersion ?? null,
    recordings: verifiedOn.length > 0 ? verifiedOn : recording ? [recording] : [],
    run: run ? { id: run.id, resultSha256: run.provenance?.resultSha256 ?? null } : null,
    verification: evidence
      ? {
          cells: evidence.cells.length,
          passed: evidence.cells.filter(
            ({ verdict, outOfDate }) => verdict === 'pass' && outOfDate.length === 0,
          ).length,
          waived: evidence.cells.filter(({ waiver }) => waiver !== null).length,
          withoutRequirements: evidence.withoutRequirements,
        }
      : null,
  };
}

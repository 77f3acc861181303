/** An export's document without a server, for tests of the formats. */
import type { ExportDocument } from '@/shared/contracts/exports';
import { type ParametersInput, parametersSchema } from '@/shared/contracts/parameters';
import { exportedValues } from '@/server/exports/document';
import { sha256OfJson } from '@/workers';

const ID = '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e40';

export function buildDocument(
  input: ParametersInput = {},
  overrides: Partial<ExportDocument> = {},
): ExportDocument {
  const parameters = parametersSchema.parse(input);
  return {
    format: 'driftwright-parameter-set',
    formatVersion: 1,
    notice: 'NOT RELEASED: this version is a draft. Not for use on a vehicle.',
    released: false,
    set: { id: ID, name: 'Harbour set' },
    vehicle: { id: ID, name: 'Crawler 1', leverArmM: [1.2, 0, -0.6] },
    version: { number: 3, state: 'draft', note: 'Trusts GNSS less.' },
    checksum: {
      algorithm: 'SHA-256',
      over: 'parameters, as canonical JSON (RFC 8785)',
      value: sha256OfJson(parameters),
    },
    parameters,
    values: exportedValues(parameters),
    provenance: {
      author: 'Maren Holt',
      createdAt: '2026-01-02T03:04:05.000Z',
      submittedBy: null,
      submittedAt: null,
      reviewer: null,
      reviewedAt: null,
      reviewComment: null,
      engineVersion: '1.0.0',
      recordings: [{ id: ID, name: 'Breakwater loop', sha256: 'ab'.repeat(32) }],
      run: null,
      verification: null,
    },
    cautions: ['Keep an independent means of navigation.'],
    ...overrides,
  };
}

/** The formats of an export: how each is written, and what it is called. */
import type { ExportDocument, ExportFormat } from '@/shared/contracts/exports';
import { asCsv } from './as-csv';
import { asCHeader } from './c-header';
import { asYaml } from './as-yaml';

interface Format {
  type: string;
  extension: string;
  write: (document: ExportDocument) => string;
}

export const FORMATS: Record<ExportFormat, Format> = {
  json: {
    type: 'application/json; charset=utf-8',
    extension: 'json',
    write: (document) => `${JSON.stringify(document, null, 2)}\n`,
  },
  yaml: { type: 'application/yaml; charset=utf-8', extension: 'yaml', write: asYaml },
  c: { type: 'text/x-c; charset=utf-8', extension: 'h', write: asCHeader },
  csv: { type: 'text/csv; charset=utf-8', extension: 'csv', write: asCsv },
};

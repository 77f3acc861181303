/** Any upload as a table: CSV, NMEA 0183 or GPX, told apart by how it begins. */
import type { FileRole } from '@/shared/contracts/recordings';
import type { Store } from '../store/types';
import { csvHead, headText, readRows, type CsvBatch, type CsvHead } from './csv';
import { gpxHead, gpxRows, looksLikeXml } from './gpx';
import { holdsNmea, looksLikeNmea, nmeaHead, nmeaRows } from './nmea';
import type { TableNotes } from './table-notes';
import { empty, openText, type RawFile } from './text-source';

export interface OpenTable {
  batches: AsyncGenerator<CsvBatch>;
  /** Share of the stored bytes that has been read, 0…1. */
  readShare(): number;
}

/** Reads the head of an upload. Throws IntakeRejected, StoreKeyMissing. */
export async function readTableHead(store: Store, file: RawFile): Promise<CsvHead> {
  const { text, complete } = await headText((await openText(store, file)).chunks);
  return { ...headOf(text, complete, file.role), fileName: file.name };
}

function headOf(text: string, complete: boolean, role: FileRole): CsvHead {
  if (!text.trim()) throw empty({ role });
  if (looksLikeNmea(text) || (role === 'gnss' && holdsNmea(text))) return nmeaHead(text, complete, role);
  return looksLikeXml(text) ? gpxHead(text, complete, role) : csvHead(text, complete, role);
}

/** Its rows from the start. Throws (while they are read) IntakeRejected. */
export async function openTable(
  store: Store,
  file: RawFile,
  head: CsvHead,
  notes: TableNotes,
): Promise<OpenTable> {
  const source = await openText(store, file);
  const batches =
    head.format === 'nmea' && head.nmea
      ? nmeaRows(source.chunks, head.nmea, notes)
      : head.format === 'gpx'
        ? gpxRows(source.chunks, head.geoid === true, file.role)
        : readRows(source.chunks, head, file.role);
  return { batches, readShare: source.readShare };
}

/** Finds the columns of a file that a set of words means. */
import type { CsvLayout } from './csv';
import { readHeader, unitOf, type HeaderReading } from './header-words';
import type { ChannelWords } from './vocabulary';

export interface FoundColumn {
  index: number;
  header: string;
  /** As a channel map calls it; null where the header names none. */
  unit: string | null;
}

export class ColumnFinder {
  private readonly readings: HeaderReading[][];

  constructor(private readonly layout: Pick<CsvLayout, 'headers' | 'units'>) {
    this.readings = layout.headers.map((header, i) => readHeader(header, layout.units?.[i] ?? null));
  }

  /** The column for the earliest of the words; units that cannot be the channel's are passed over. */
  find(words: ChannelWords, allowed: (header: string) => boolean = () => true): FoundColumn | null {
    for (const name of words.names) {
      for (const [index, readings] of this.readings.entries()) {
        const header = this.layout.headers[index]!;
        if (!allowed(header)) continue;
        const unit = unitIn(readings, name, words);
        if (unit !== undefined) return { index, header, unit };
      }
    }
    return null;
  }
}

/** Undefined where no reading of the header is the name. */
function unitIn(
  readings: readonly HeaderReading[],
  name: string,
  { quantity }: ChannelWords,
): string | null | undefined {
  let bare = false;
  for (const reading of readings) {
    if (reading.name !== name) continue;
    if (reading.unit === null) bare = true;
    else if (quantity !== null && unitOf(quantity, reading.unit)) return unitOf(quantity, reading.unit);
    else if (quantity === null) bare = true;
  }
  return bare ? null : undefined;
}

/** NMEA 0183 as rows of a table, one an epoch: sentences of one time of day together, dated by RMC or ZDA. */
import type { FileRole } from '@/shared/contracts/recordings';
import type { CsvBatch, CsvHead } from './csv';
import { hasChecksum, parseSentence, type NmeaFacts } from './nmea-sentence';
import { FILE_NAMES, rejection } from './problems';
import type { TableNotes } from './table-notes';
import { unixToIso } from './utc';

const START = /\$[A-Z]{2}[A-Z]{3},/;
const DAY_S = 86_400;

/** Whether some lines are sentences: a log may hold them among rows of a table. */
export const holdsNmea = (text: string) =>
  text.split('\n').filter((line) => /^\s*\$[A-Z]{2}[A-Z]{3},/.test(line)).length > 1;

export function looksLikeNmea(text: string): boolean {
  const lines = text
    .slice(0, 8192)
    .split('\n')
    .filter((line) => line.trim() !== '');
  return lines.length > 0 && lines.filter((line) => START.test(line)).length > lines.length / 3;
}

/** Throws IntakeRejected where no sentence is whole. */
export function nmeaHead(text: string, complete: boolean, role: FileRole): CsvHead {
  const whole = complete ? text : text.slice(0, text.lastIndexOf('\n') + 1);
  const probe = new EpochReader({ dated: true, separated: true, dayS: NaN, checked: false }, {});
  const facts = whole.split('\n').flatMap((line) => probe.factsOf(line));
  if (facts.length === 0)
    throw rejection(
      'nmea-damaged', { file: role, line: 1 },
      `The ${FILE_NAMES[role]} looks like NMEA 0183, but none of its sentences is whole and has the right checksum.`,
      'Check the speed of the serial line it was logged from, and log it again.',
    ); // prettier-ignore
  const days = facts.map((one) => one.dayS).filter((dayS) => !Number.isNaN(dayS));
  const settings: NmeaSettings = {
    dated: days.length > 0,
    dayS: days[0] ?? NaN,
    separated: facts.some((one) => !Number.isNaN(one.separationM)),
    checked: whole.split('\n').some((line) => START.test(line) && hasChecksum(line)),
  };
  const reader = new EpochReader(settings, {});
  const batch = reader.take(whole.split('\n'), 1);
  const rows = [...batch.rows, ...(complete ? reader.finish().rows : [])];
  return { ...layoutOf(settings), rows, complete, format: 'nmea', nmea: settings };
}

/** Throws nothing: sentences that are not whole are counted in `notes`. */
export async function* nmeaRows(
  chunks: AsyncGenerator<string>,
  settings: NmeaSettings,
  notes: TableNotes,
): AsyncGenerator<CsvBatch> {
  const reader = new EpochReader(settings, notes);
  let held = '';
  let line = 1;
  for await (const chunk of chunks) {
    const lines = (held + chunk).split('\n');
    held = lines.pop()!;
    const batch = reader.take(lines, line);
    line += lines.length;
    if (batch.rows.length > 0) yield batch;
  }
  const last = reader.take([held], line);
  const rest = reader.finish();
  yield { rows: [...last.rows, ...rest.rows], lines: [...last.lines, ...rest.lines] };
}

export interface NmeaSettings {
  /** Some sentence tells the date. */
  dated: boolean;
  /** The first date that is told, UNIX seconds of its midnight. */
  dayS: number;
  /** The receiver tells how high the sea level lies above the ellipsoid. */
  separated: boolean;
  /** Sentences have checksums: one without is not whole. */
  checked: boolean;
}

const layoutOf = ({ dated, separated }: NmeaSettings) => ({
  delimiter: ',',
  headers: [
    dated ? 'utc' : 'time_of_day', 'latitude_deg', 'longitude_deg', separated ? 'height_ellipsoid_m' : 'height_msl_m',
    'speed_m_s', 'course_deg', 'sigma_n_m', 'sigma_e_m', 'sigma_d_m', 'fix_quality',
  ],
  units: null,
  headerLine: null,
  firstLine: 1,
  decimalComma: false,
}); // prettier-ignore

class EpochReader {
  private epoch: NmeaFacts | null = null;
  private epochLine = 1;
  private dayS: number;
  private lastTimeS = NaN;

  constructor(
    private readonly settings: NmeaSettings,
    private readonly notes: TableNotes,
  ) {
    this.dayS = settings.dayS;
  }

  take(lines: readonly string[], firstLine: number): CsvBatch & { lines: number[] } {
    const batch = { rows: [] as string[][], lines: [] as number[] };
    lines.forEach((text, i) => {
      for (const facts of this.factsOf(text, firstLine + i)) this.add(facts, firstLine + i, batch);
    });
    return batch;
  }

  finish(): { rows: string[][]; lines: number[] } {
    const batch = { rows: [] as string[][], lines: [] as number[] };
    this.close(batch);
    return batch;
  }

  /** Loggers put stamps of their own in front, and a lost line end runs two sentences together. */
  factsOf(text: string, line = 1): NmeaFacts[] {
    if (!text.includes('$')) return [];
    const sentences = text.slice(text.indexOf('$')).split(/(?=\$)/);
    return sentences.flatMap((sentence) => {
      const facts = this.settings.checked && !hasChecksum(sentence) ? 'damaged' : parseSentence(sentence);
      if (facts === 'damaged') {
        this.notes.damagedSentences = (this.notes.damagedSentences ?? 0) + 1;
        this.notes.firstDamagedLine ??= line;
      }
      return typeof facts === 'string' ? [] : [facts];
    });
  }

  private add(facts: NmeaFacts, line: number, batch: { rows: string[][]; lines: number[] }): void {
    const { epoch } = this;
    const tells = !Number.isNaN(facts.timeOfDayS);
    if (epoch && tells && !Number.isNaN(epoch.timeOfDayS) && facts.timeOfDayS !== epoch.timeOfDayS)
      this.close(batch);
    if (!this.epoch) {
      this.epoch = { ...facts };
      this.epochLine = line;
    } else this.epoch = merged(this.epoch, facts);
  }

  private close(batch: { rows: string[][]; lines: number[] }): void {
    const { epoch } = this;
    this.epoch = null;
    if (!epoch || Number.isNaN(epoch.timeOfDayS)) return;
    if (!Number.isNaN(epoch.dayS)) this.dayS = epoch.dayS;
    else if (epoch.timeOfDayS < this.lastTimeS - DAY_S / 2) this.dayS += DAY_S;
    this.lastTimeS = epoch.timeOfDayS;
    batch.rows.push(this.rowOf(epoch));
    batch.lines.push(this.epochLine);
  }

  private rowOf(epoch: NmeaFacts): string[] {
    const { dated, separated } = this.settings;
    const inPlane = epoch.fixMode === 2;
    const heightM = inPlane ? NaN : separated ? epoch.heightM + epoch.separationM : epoch.heightM;
    const quality =
      epoch.quality === 0 || epoch.fixMode === 1 ? 0 : Number.isNaN(epoch.quality) ? 1 : epoch.quality;
    return [
      dated ? unixToIso(this.dayS + Math.round(epoch.timeOfDayS * 1000) / 1000) : clockText(epoch.timeOfDayS),
      ...[
        epoch.latDeg,
        epoch.lonDeg,
        heightM,
        epoch.speedMPerS,
        epoch.courseDeg,
        ...epoch.sigmaM,
        quality,
      ].map(cell),
    ];
  }
}

const cell = (value: number) => (Number.isNaN(value) ? '' : String(value));

function clockText(timeOfDayS: number): string {
  const ms = Math.round(timeOfDayS * 1000);
  return new Date(ms).toISOString().slice(11, 23);
}

/** The first to say something stands, but that there is no fix is heard from anyone. */
function merged(one: NmeaFacts, other: NmeaFacts): NmeaFacts {
  const first = (a: number, b: number) => (Number.isNaN(a) ? b : a);
  return {
    kind: one.kind,
    timeOfDayS: first(one.timeOfDayS, other.timeOfDayS),
    dayS: first(one.dayS, other.dayS),
    latDeg: first(one.latDeg, other.latDeg),
    lonDeg: first(one.lonDeg, other.lonDeg),
    heightM: first(one.heightM, other.heightM),
    separationM: first(one.separationM, other.separationM),
    speedMPerS: first(one.speedMPerS, other.speedMPerS),
    courseDeg: first(one.courseDeg, other.courseDeg),
    sigmaM: Number.isNaN(one.sigmaM[0]) ? other.sigmaM : one.sigmaM,
    quality: one.quality === 0 || other.quality === 0 ? 0 : first(one.quality, other.quality),
    fixMode: Number.isNaN(one.fixMode) ? other.fixMode : Math.max(one.fixMode, first(other.fixMode, 0)),
  };
}

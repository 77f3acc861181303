/** Settles the channel map of every file: what the uploader said, the rest guessed from the headers. */
import type { ChannelMap, FilePreview, FileRole, IntakeProblem } from '@/shared/contracts/recordings';
import { columnIndex } from './cells';
import type { CsvHead } from './csv';
import { guessGnssMap, guessReferenceMap } from './guess-gnss';
import { guessImuMap, type Guess } from './guess-imu';
import { FILE_NAMES, problem, quoted } from './problems';

export interface SettledMaps {
  /** Holds a part for every file that could be mapped. */
  map: ChannelMap;
  /** Empty where every file is mapped. */
  problems: IntakeProblem[];
  previews: FilePreview[];
  /** What was taken for granted, in whole sentences. */
  assumed: string[];
}

const PREVIEW_ROWS = 8;
const GUESSES: { [R in FileRole]: (head: CsvHead) => Guess<NonNullable<ChannelMap[R]>> } = {
  imu: guessImuMap,
  gnss: guessGnssMap,
  reference: guessReferenceMap,
};

export function settleMaps(heads: ReadonlyMap<FileRole, CsvHead>, given: ChannelMap | null): SettledMaps {
  const settled: SettledMaps = { map: {}, problems: [], previews: [], assumed: [] };
  for (const [role, head] of heads) {
    const part = given?.[role];
    if (part) {
      settled.problems.push(...unknownColumns(role, head, part));
      settled.previews.push(previewOf(role, head, []));
      Object.assign(settled.map, { [role]: part });
      continue;
    }
    const guess = GUESSES[role](head);
    settled.previews.push(previewOf(role, head, guess.missing));
    settled.assumed.push(...guess.assumed);
    if (guess.map) Object.assign(settled.map, { [role]: guess.map });
    else settled.problems.push(unmapped(role, head, guess.missing));
  }
  return settled;
}

/** What the mapping screen shows of a file. */
export const previewOf = (role: FileRole, head: CsvHead, missing: string[]): FilePreview => ({
  role,
  headers: head.headers,
  rows: head.rows.slice(0, PREVIEW_ROWS).map((row) => row.slice(0, head.headers.length)),
  missing,
});

/** All names of columns in a part of a channel map. */
export function columnsOf(part: NonNullable<ChannelMap[FileRole]>): string[] {
  const { time } = part;
  if ('gyro' in part) return [...time.columns, ...part.gyro.columns, ...part.accel.columns];
  const { position, velocity } = part;
  const names = [...time.columns, position.lat, position.lon, position.height ?? []].flat();
  if (velocity) names.push(...('columns' in velocity ? velocity.columns : [velocity.speed, velocity.course]));
  if ('attitude' in part && part.attitude) names.push(...part.attitude.columns);
  if ('positionSigma' in part && part.positionSigma) names.push(...part.positionSigma.columns);
  if ('velocitySigma' in part && part.velocitySigma) names.push(...part.velocitySigma.columns);
  if ('quality' in part && part.quality) names.push(part.quality);
  return names;
}

function unknownColumns(
  role: FileRole,
  head: CsvHead,
  part: NonNullable<ChannelMap[FileRole]>,
): IntakeProblem[] {
  const names = [...new Set(columnsOf(part))].filter((name) => columnIndex(head.headers, name) < 0);
  return names.map((name) =>
    problem(
      'column-unknown', { file: role, line: head.headerLine, column: name },
      `The channel map names the column ${quoted(name)}, which the ${FILE_NAMES[role]} does not have.`,
      `Choose one of its columns: ${head.headers.slice(0, 12).map(quoted).join(', ')}${head.headers.length > 12 ? ' …' : ''}.`,
    ),
  ); // prettier-ignore
}

function unmapped(role: FileRole, head: CsvHead, missing: readonly string[]): IntakeProblem {
  const onlyTime = missing.length === 1 && missing[0] === 'time';
  return problem(
    onlyTime ? 'no-time' : 'columns-missing', { file: role, line: head.headerLine },
    `No column of the ${FILE_NAMES[role]} could be recognised as ${listed(missing)}.`,
    'Say on the mapping screen which column it is and in which unit.',
  ); // prettier-ignore
}

/** "a, b and c". */
export const listed = (items: readonly string[]) =>
  items.length < 2 ? (items[0] ?? '') : `${items.slice(0, -1).join(', ')} and ${items.at(-1)!}`;

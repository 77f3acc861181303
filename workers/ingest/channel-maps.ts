/** Settles the channel map of every file: what the uploader said, the rest guessed from headers and values. */
import type {
  ChannelGuess,
  ChannelMap,
  FilePreview,
  FileRole,
  IntakeProblem,
} from '@/shared/contracts/recordings';
import { AID_KINDS } from '../recordings/aids';
import { aidPlace } from './aid-place';
import { columnIndex } from './cells';
import type { CsvHead } from './csv';
import { ColumnFinder } from './find-columns';
import type { Guess } from './guess';
import { guessAids } from './guess-aids';
import { guessGnssMap, guessReferenceMap } from './guess-gnss';
import { guessImuMap } from './guess-imu';
import { guessTime } from './guess-time';
import { columnsOf, columnsOfImu, sensorRoles } from './map-columns';
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

export type Heads = ReadonlyMap<FileRole, CsvHead>;
type MappedRole = 'imu' | 'gnss' | 'reference';

const PREVIEW_ROWS = 8;

export function settleMaps(heads: Heads, given: ChannelMap | null): SettledMaps {
  const settled: SettledMaps = { map: {}, problems: [], previews: [], assumed: [] };
  for (const [role, head] of heads) {
    if (role === 'imu2' || role === 'aids') {
      settled.previews.push(previewOf(role, head, []));
      continue;
    }
    const part = given?.[role];
    if (part) {
      settled.problems.push(...unknownColumns(role, heads, part));
      settled.previews.push(previewOf(role, head, []));
      Object.assign(settled.map, { [role]: part });
      continue;
    }
    const guess = guessOf(role, heads, head);
    settled.previews.push(previewOf(role, head, guess.missing, guess.guesses));
    settled.assumed.push(...guess.assumed);
    if (guess.map) Object.assign(settled.map, { [role]: guess.map });
    else settled.problems.push(unmapped(role, head, guess.missing, isMerged(heads)));
  }
  if (settled.map.imu) settled.problems.push(...completeAccelTime(heads, settled.map));
  if (isMerged(heads)) shareTime(settled, given);
  settleAids(heads, given, settled);
  return settled;
}

/** Sensors beside are a gain where they are, and no fault where they are not; only what a given map names must be there. */
function settleAids(heads: Heads, given: ChannelMap | null, settled: SettledMaps): void {
  if (given?.aids) {
    settled.map.aids = given.aids;
    settled.problems.push(...unknownAids(heads, given));
    return;
  }
  const { map, guesses } = guessAids(heads, settled.map);
  if (Object.keys(map).length > 0) settled.map.aids = map;
  for (const { role, guess } of guesses) {
    const preview = settled.previews.find((one) => one.role === role);
    if (preview) preview.guesses = [...(preview.guesses ?? []), guess];
  }
}

function unknownAids(heads: Heads, given: ChannelMap): IntakeProblem[] {
  return AID_KINDS.flatMap((kind) => {
    const aid = given.aids?.[kind];
    if (!aid) return [];
    const role = aid.file ?? (heads.has('aids') ? 'aids' : 'imu');
    const head = heads.get(role);
    if (!head) return [fileMissing(role)];
    const problems = unknownAmong(role, head, [aid.column, aid.sigma ?? [], aid.time?.columns ?? []].flat());
    return problems.length > 0 || aidPlace(kind, given, heads)
      ? problems
      : [unmapped(role, head, ['time'], false)];
  });
}

function guessOf(role: MappedRole, heads: Heads, head: CsvHead): Guess<NonNullable<ChannelMap[MappedRole]>> {
  if (role === 'imu') return guessImuMap(head, heads.get('imu2'));
  return role === 'gnss' ? guessGnssMap(head, isMerged(heads)) : guessReferenceMap(head);
}

/** One log holds the IMU and the GNSS: the very same table stands for both. */
export function isMerged(heads: Heads): boolean {
  const [imu, gnss] = [heads.get('imu'), heads.get('gnss')];
  if (!imu || !gnss) return false;
  return (
    imu === gnss ||
    (imu.headers.join() === gnss.headers.join() && imu.rows[0]?.join() === gnss.rows[0]?.join())
  );
}

/** One column of one log counts the same for both sensors; the IMU's rate tells its unit better than the fixes do. */
function shareTime({ map }: SettledMaps, given: ChannelMap | null): void {
  if (!map.imu || !map.gnss || given?.gnss) return;
  if (map.imu.time.columns.join() !== map.gnss.time.columns.join()) return;
  const { offsetS, stamp } = map.gnss.time;
  map.gnss = { ...map.gnss, time: { ...map.imu.time, offsetS, stamp } };
}

/** A given map may leave out how the accelerometer's own file tells time: that is guessed then. */
function completeAccelTime(heads: Heads, map: ChannelMap): IntakeProblem[] {
  const imu = map.imu!;
  const roles = sensorRoles(imu, heads);
  const head = heads.get(roles.accel);
  if (roles.gyro === roles.accel || imu.accelTime || !head) return [];
  const time = guessTime(head, new ColumnFinder(head), 'imu');
  if (!time) return [unmapped(roles.accel, head, ['time'], false)];
  map.imu = { ...imu, accelTime: time.map };
  return [];
}

/** What the mapping screen shows of a file. */
export const previewOf = (
  role: FileRole,
  head: CsvHead,
  missing: string[],
  guesses?: ChannelGuess[],
): FilePreview => ({
  role,
  headers: head.headers,
  rows: head.rows.slice(0, PREVIEW_ROWS).map((row) => row.slice(0, head.headers.length)),
  missing,
  ...(guesses ? { guesses } : null),
});

/** The columns of a sensor may lie in either file of the IMU. */
function unknownColumns(
  role: FileRole,
  heads: Heads,
  part: NonNullable<ChannelMap[MappedRole]>,
): IntakeProblem[] {
  if (!('gyro' in part)) return unknownAmong(role, heads.get(role)!, columnsOf(part));
  const roles = sensorRoles(part, heads);
  return (['gyro', 'accel'] as const).flatMap((sensor) =>
    unknownAmong(roles[sensor], heads.get(roles[sensor])!, columnsOfImu(part, sensor)),
  );
}

function unknownAmong(role: FileRole, head: CsvHead, columns: readonly string[]): IntakeProblem[] {
  const names = [...new Set(columns)].filter((name) => columnIndex(head.headers, name) < 0);
  return names.map((name) =>
    problem(
      'column-unknown', { file: role, line: head.headerLine, column: name },
      `The channel map names the column ${quoted(name)}, which the ${FILE_NAMES[role]} does not have.`,
      `Choose one of its columns: ${head.headers.slice(0, 12).map(quoted).join(', ')}${head.headers.length > 12 ? ' …' : ''}.`,
    ),
  ); // prettier-ignore
}

function unmapped(role: FileRole, head: CsvHead, missing: readonly string[], merged: boolean): IntakeProblem {
  const onlyTime = missing.length === 1 && missing[0] === 'time';
  const without =
    role === 'gnss' && merged
      ? ' There is no GNSS file of its own, so fixes were looked for in the IMU file.'
      : '';
  return problem(
    onlyTime ? 'no-time' : 'columns-missing', { file: role, line: head.headerLine },
    `No column of the ${FILE_NAMES[role]} could be recognised as ${listed(missing)}.${without}`,
    without
      ? 'Upload the GNSS file as well, or say on the mapping screen which columns are the position.'
      : 'Say on the mapping screen which column it is and in which unit.',
  ); // prettier-ignore
}

const fileMissing = (role: FileRole) =>
  problem(
    'file-missing', { file: role },
    `The channel map names a column of the ${FILE_NAMES[role]}, which was not uploaded.`,
    'Upload that file too, or choose a column of another one on the mapping screen.',
  ); // prettier-ignore

/** "a, b and c". */
export const listed = (items: readonly string[]) =>
  items.length < 2 ? (items[0] ?? '') : `${items.slice(0, -1).join(', ')} and ${items.at(-1)!}`;

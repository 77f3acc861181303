/**
 * The bench's state in its address, so that a link opens the same view:
 * /bench/<recording>?set=&version=&p=<changed parameters>&w=<windows>&base=<run of the pinned baseline>&x=<worked out besides>&view=<charts>.
 */
import { parametersSchema, type Parameters } from '@/shared/contracts/parameters';
import { outagesSchema, type Outage } from '@/shared/contracts/runs';
import { differences, writePath, type ParameterValue } from '@/shared/parameters/parameter-path';

export interface BenchLink {
  recordingId: string;
  /** The parameter set and version that the bench was opened with. */
  setId?: string;
  version?: number;
  /** What differs from them (or from the defaults). */
  changes?: { path: string; value: ParameterValue }[];
  /** Left out: the version's own windows. */
  windows?: readonly Outage[];
  baselineRunId?: string;
  /** What each run works out besides; left out: nothing. */
  options?: { smooth: boolean; errorBudget: boolean };
  /** Which charts are shown. */
  view?: string;
}

/** Address of a bench. A part that is left out is not written. */
export function benchHref(link: BenchLink): `/bench/${string}` {
  const query = benchQuery(link);
  const text = Object.entries(query)
    .filter((entry): entry is [string, string] => entry[1] !== undefined)
    .map(([key, value]) => `${key}=${encodeURIComponent(value).replace(/%2C/g, ',').replace(/%3A/g, ':')}`)
    .join('&');
  return `/bench/${link.recordingId}${text ? `?${text}` : ''}`;
}

export type BenchQuery = Record<'set' | 'version' | 'p' | 'w' | 'base' | 'x' | 'view', string | undefined>;

export function benchQuery(link: BenchLink): BenchQuery {
  return {
    set: link.setId,
    version: link.version === undefined ? undefined : String(link.version),
    p: link.changes && link.changes.length > 0 ? writeChanges(link.changes) : undefined,
    w: link.windows === undefined ? undefined : writeWindows(link.windows),
    base: link.baselineRunId,
    x: writeOptions(link.options),
    view: link.view,
  };
}

/** Reads the query back; what cannot be read is left out and named in `problems`, in words. */
export function readBenchQuery(
  recordingId: string,
  query: Partial<Record<keyof BenchQuery, string>>,
): { link: BenchLink; problems: string[] } {
  const problems: string[] = [];
  const link: BenchLink = { recordingId };
  if (query.set) link.setId = query.set;
  const version = Number(query.version);
  if (query.version && Number.isInteger(version) && version > 0) link.version = version;
  if (query.base) link.baselineRunId = query.base;
  if (query.x) link.options = readOptions(query.x);
  if (query.view) link.view = query.view;
  if (query.p) link.changes = readChanges(query.p);
  if (query.w !== undefined) {
    const windows = readWindows(query.w);
    if (windows) link.windows = windows;
    else problems.push('The outage windows of the link could not be read and are left out.');
  }
  return { link, problems };
}

/** `from` with the link's changes; changes that the contract refuses are left out and counted. */
export function applyChanges(
  from: Parameters,
  changes: BenchLink['changes'] = [],
): { parameters: Parameters; refused: number } {
  let parameters = from;
  let refused = 0;
  for (const { path, value } of changes)
    try {
      const next = writePath(parameters, path, value);
      // The contract drops what it does not know.
      if (differences(parameters, next).length === 0) refused++;
      parameters = next;
    } catch {
      refused++;
    }
  return { parameters: parametersSchema.parse(parameters), refused };
}

const writeChanges = (changes: NonNullable<BenchLink['changes']>) =>
  changes
    .map(({ path, value }) => `${path}:${Array.isArray(value) ? value.join('/') : String(value)}`)
    .join(',');

function readChanges(text: string): NonNullable<BenchLink['changes']> {
  return text.split(',').flatMap((part) => {
    const at = part.indexOf(':');
    return at > 0 ? [{ path: part.slice(0, at), value: readValue(part.slice(at + 1)) }] : [];
  });
}

function readValue(text: string): ParameterValue {
  if (text === 'null') return null;
  if (text === 'true' || text === 'false') return text === 'true';
  if (text !== '' && Number.isFinite(Number(text))) return Number(text);
  const parts = text.split('/');
  return parts.length > 1 && parts.every((part) => part !== '' && Number.isFinite(Number(part)))
    ? parts.map(Number)
    : text;
}

function writeOptions(options: BenchLink['options']): string | undefined {
  const on = [options?.smooth ? 'smooth' : '', options?.errorBudget ? 'budget' : ''].filter(Boolean);
  return on.length > 0 ? on.join(',') : undefined;
}

function readOptions(text: string): NonNullable<BenchLink['options']> {
  const on = text.split(',');
  return { smooth: on.includes('smooth'), errorBudget: on.includes('budget') };
}

const SUFFIX: Record<Outage['withhold'], string> = {
  gnss: '',
  position: 'p',
  velocity: 'v',
  'zero-velocity': 'zv',
  'zero-rotation': 'zr',
  'non-holonomic': 'nh',
  barometer: 'b',
  heading: 'h',
  odometer: 'o',
  attitude: 'a',
};
const WITHHELD_BY = new Map(Object.entries(SUFFIX).map(([withhold, suffix]) => [suffix, withhold]));

/** "600~660,700~730v": start and end in s, and what is withheld where it is not all GNSS. */
export const writeWindows = (windows: readonly Outage[]) =>
  windows.map(({ startS, endS, withhold }) => `${startS}~${endS}${SUFFIX[withhold]}`).join(',');

/** Null where it cannot be read. */
export function readWindows(text: string): Outage[] | null {
  if (text === '') return [];
  const windows = text.split(',').map((part) => {
    const match = /^(-?[\d.]+)~(-?[\d.]+)([a-z]*)$/.exec(part);
    const withhold = match && WITHHELD_BY.get(match[3]!);
    if (!match || withhold === undefined) return null;
    return { startS: Number(match[1]), endS: Number(match[2]), withhold };
  });
  const parsed = outagesSchema.safeParse(windows);
  return parsed.success ? parsed.data : null;
}

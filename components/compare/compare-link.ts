/**
 * A comparison in its address: /bench/compare?on=<recording>&of=<what, the first is compared with>&w=<windows>.
 * What is compared is a run (`run~<id>`), a version of a set (`set~<id>~<n>`) or the usual values (`start`).
 */
import { readWindows, writeWindows } from '@/components/bench/bench-link';
import type { Outage } from '@/shared/contracts/runs';

export type EntryRef = { run: string } | { set: string; version: number } | 'start';

export interface CompareLink {
  recordingId: string;
  entries: readonly EntryRef[];
  /** Left out: those of the first entry. */
  windows?: readonly Outage[];
}

export type CompareQuery = Record<'on' | 'of' | 'w', string | undefined>;

/** Columns that a person can still tell apart. */
export const MOST_ENTRIES = 4;

export const entryKey = (entry: EntryRef): string =>
  entry === 'start' ? 'start' : 'run' in entry ? `run~${entry.run}` : `set~${entry.set}~${entry.version}`;

export const compareQuery = ({ recordingId, entries, windows }: CompareLink): CompareQuery => ({
  on: recordingId,
  of: entries.map(entryKey).join(','),
  w: windows && writeWindows(windows),
});

export function compareHref(link: CompareLink): `/bench/compare?${string}` {
  const { on, of, w } = compareQuery(link);
  return `/bench/compare?on=${on}&of=${of}${w === undefined ? '' : `&w=${w}`}`;
}

/** What cannot be read is left out; null without a recording. */
export function readCompareQuery({ on, of, w }: Partial<CompareQuery>): CompareLink | null {
  if (!on) return null;
  const keys = [...new Set((of ?? '').split(','))];
  const entries = keys.flatMap((key) => readEntry(key) ?? []).slice(0, MOST_ENTRIES);
  const windows = w === undefined ? undefined : (readWindows(w) ?? undefined);
  return { recordingId: on, entries, windows };
}

function readEntry(key: string): EntryRef | null {
  const [kind, id, number] = key.split('~');
  if (kind === 'start') return 'start';
  if (!id) return null;
  if (kind === 'run') return { run: id };
  const version = Number(number);
  return kind === 'set' && Number.isInteger(version) && version > 0 ? { set: id, version } : null;
}

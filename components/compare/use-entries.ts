/** What is compared, resolved from its address: name, parameters, and where it comes from. */
import { useQueries } from '@tanstack/react-query';
import { pinnedName } from '@/components/bench/bench-start';
import { formatMoment } from '@/components/ui/format-day';
import { oneSet } from '@/hooks/parameter-sets';
import { oneRun } from '@/hooks/runs';
import { defaultParameters, type Parameters } from '@/shared/contracts/parameters';
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import type { Outage, Run } from '@/shared/contracts/runs';
import { entryKey, type EntryRef } from './compare-link';

export interface Entry {
  ref: EntryRef;
  key: string;
  name: string;
  /** Who and when. */
  note: string;
  /** Null: not loaded, or it cannot be. */
  parameters: Parameters | null;
  /** Windows that it came with. */
  outages: readonly Outage[];
  /** A finished run of it: shown where the windows are the same, or where the person may start none. */
  run: Run | null;
  /** Why it cannot be compared. */
  problem: string | null;
}

/** One entry a reference, in order. `recordingId`: only runs on it can be compared. */
export function useEntries(refs: readonly EntryRef[], recordingId: string): Entry[] {
  const setIds = distinct(refs.map(setIdOf));
  const sets = useQueries({ queries: setIds.map(oneSet) });
  const setOf = (ref: EntryRef) => sets[setIds.indexOf(setIdOf(ref) ?? '')];
  const runIdOf = (ref: EntryRef) =>
    ref !== 'start' && 'run' in ref ? ref.run : (versionOf(ref, setOf(ref)?.data)?.runId ?? null);
  const runIds = distinct(refs.map(runIdOf));
  const runs = useQueries({ queries: runIds.map(oneRun) });
  const runOf = (ref: EntryRef) => runs[runIds.indexOf(runIdOf(ref) ?? '')];
  return refs.map((ref) => {
    const key = entryKey(ref);
    const blank = { ref, key, note: '', outages: [], run: null, problem: null };
    if (ref === 'start') return { ...blank, name: 'Start values', note: 'the usual ones', parameters: START };
    const failed = 'run' in ref ? runOf(ref)?.error : setOf(ref)?.error;
    if (failed) return { ...blank, name: 'Not found', parameters: null, problem: failed.message };
    if ('run' in ref) return { ...blank, ...ofRun(runOf(ref)?.data, recordingId) };
    return { ...blank, ...ofVersion(ref, setOf(ref)?.data, runOf(ref)?.data, recordingId) };
  });
}

const START = defaultParameters();
const LOADING = { name: 'Loading …', parameters: null };

const distinct = (ids: readonly (string | null)[]) => [...new Set(ids.filter((id) => id !== null))];
const setIdOf = (ref: EntryRef) => (ref !== 'start' && 'set' in ref ? ref.set : null);
const versionOf = (ref: EntryRef, set: ParameterSetDetail | undefined) =>
  ref !== 'start' && 'set' in ref ? set?.versions.find(({ number }) => number === ref.version) : undefined;

function ofRun(run: Run | undefined, recordingId: string) {
  if (!run) return LOADING;
  const elsewhere = run.recordingId !== recordingId;
  return {
    name: capital(pinnedName(run.finishedAt ?? run.createdAt)),
    note: `${run.createdBy}, ${formatMoment(run.createdAt)}`,
    parameters: run.parameters,
    outages: elsewhere ? [] : run.outages,
    run: elsewhere || run.state !== 'done' ? null : run,
  };
}

function ofVersion(
  ref: { set: string; version: number },
  set: ParameterSetDetail | undefined,
  run: Run | undefined,
  recordingId: string,
) {
  if (!set) return LOADING;
  const version = versionOf(ref, set);
  const name = `${set.name} v${ref.version}`;
  if (!version) return { name, parameters: null, problem: `${set.name} has no version ${ref.version}.` };
  const here = version.recordingId === recordingId;
  return {
    name,
    note: `${version.createdBy}, ${formatMoment(version.createdAt)}`,
    parameters: version.parameters,
    outages: here ? version.outages : [],
    run: here && run?.state === 'done' ? run : null,
  };
}

const capital = (text: string) => text[0]!.toUpperCase() + text.slice(1);

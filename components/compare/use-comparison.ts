/** The state of an open comparison: what is compared, over which windows, and the runs behind it. Its address follows. */
import { useRouter } from 'expo-router';
import { useEffect, useMemo, useState, useSyncExternalStore } from 'react';
import { ChartGroup } from '@/components/charts/chart-group';
import type { LiveState } from '@/hooks/live/live-controller';
import { useCan } from '@/hooks/session';
import type { Recording } from '@/shared/contracts/recordings';
import type { Outage } from '@/shared/contracts/runs';
import { compareQuery, type CompareLink, entryKey, type EntryRef } from './compare-link';
import type { ComparedRun } from './compare-charts';
import { EntryRuns } from './entry-runs';
import { type Entry, useEntries } from './use-entries';

export interface Comparison {
  entries: Entry[];
  windows: readonly Outage[];
  setWindows: (windows: Outage[], settled: boolean) => void;
  add: (ref: EntryRef) => void;
  remove: (key: string) => void;
  /** Makes it the one that the others are compared with. */
  first: (key: string) => void;
  group: ChartGroup;
  runs: ComparedRun[];
  stateOf: (entry: Entry) => LiveState | null;
  /** False: the person may look at finished runs only, and the windows stay. */
  mayRun: boolean;
}

type Ready = Recording & { strip: NonNullable<Recording['strip']> };

export function useComparison(recording: Ready, link: CompareLink): Comparison {
  const router = useRouter();
  const mayRun = useCan('run:create');
  const [refs, setRefs] = useState(link.entries);
  const [own, setOwn] = useState<{ windows: readonly Outage[]; settled: boolean } | null>(
    link.windows ? { windows: link.windows, settled: true } : null,
  );
  const entries = useEntries(refs, recording.id);
  const inherited = entries.find(({ outages }) => outages.length > 0)?.outages ?? NONE;
  const windows = own?.windows ?? inherited;
  const settled = own?.settled ?? true;
  const { strip } = recording;
  const [group] = useState(() => new ChartGroup([strip.startS, strip.endS]));
  const [store] = useState(() => new EntryRuns());
  useSyncExternalStore(store.subscribe, store.getSnapshot);
  useEffect(() => () => store.close(), [store]);
  useEffect(() => store.subscribeData(() => group.invalidate()), [store, group]);

  // Asked with each drawing of the page: what is going already is not asked for again.
  useEffect(() => store.sync(entries, { recordingId: recording.id, windows, settled, mayRun }));
  useEffect(() => group.invalidate(), [group, windows, refs]);

  useEffect(() => {
    if (!settled) return;
    router.setParams(compareQuery({ recordingId: recording.id, entries: refs, windows: own?.windows }));
  }, [router, recording.id, refs, own, settled]);

  const names = entries.map(({ name }) => name).join('\n');
  const runs = useMemo<ComparedRun[]>(
    () =>
      refs.map((ref, i) => ({
        key: entryKey(ref),
        name: names.split('\n')[i] ?? '',
        data: () => store.get(entryKey(ref))?.data.current ?? null,
      })),
    [refs, names, store],
  );
  return {
    entries,
    windows,
    setWindows: (next, isSettled) => setOwn({ windows: next, settled: isSettled }),
    add: (ref) => setRefs((old) => [...old, ref]),
    remove: (key) => setRefs((old) => old.filter((ref) => entryKey(ref) !== key)),
    first: (key) =>
      setRefs((old) => {
        const chosen = old.filter((ref) => entryKey(ref) === key);
        return [...chosen, ...old.filter((ref) => entryKey(ref) !== key)];
      }),
    group,
    runs,
    stateOf: (entry) => store.get(entry.key)?.state ?? null,
    mayRun,
  };
}

const NONE: readonly Outage[] = [];

import { router } from 'expo-router';
import { useEffect, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { useToast } from '@/components/ui/ToastProvider';
import { useLive } from '@/hooks/use-live-run';
import { useCan } from '@/hooks/session';
import { compareHref, type EntryRef } from '@/components/compare/compare-link';
import { useShortcuts } from '@/components/keyboard/use-shortcuts';
import { hrefOf } from '@/components/layout/paths';
import { SaveDialog } from './SaveDialog';
import type { Bench } from './use-bench';

/** Undo, redo, pin. `compact`: icons alone, for the phone's sheet. */
export function HistoryActions({ bench, compact }: { bench: Bench; compact?: boolean }) {
  const toast = useToast();
  const done = useLive(bench.live, (state) => state.phase === 'done');
  const pin = () => {
    bench.pinCurrent();
    toast({ message: 'This run is the baseline now: later changes are seen against it.' });
  };
  const compare = () => router.push(hrefOf(compareWith(bench)));
  useShortcuts(done && bench.locked === null ? { p: pin, c: compare } : NO_KEYS);
  if (bench.locked !== null) return null;
  const look = compact ? ({ iconOnly: true, kind: 'plain' } as const) : {};
  return (
    <>
      <Button
        {...look}
        label="Undo"
        icon="undo"
        disabled={!bench.canUndo}
        reason="Nothing was changed yet."
        onPress={bench.undo}
      />
      <Button
        {...look}
        label="Redo"
        icon="redo"
        disabled={!bench.canRedo}
        reason="Nothing was undone."
        onPress={bench.redo}
      />
      <Button
        {...look}
        label="Pin as baseline"
        icon="pin"
        disabled={!done}
        reason="Wait until the run is done."
        onPress={pin}
      />
      <Button
        {...look}
        label="Compare"
        icon="compare"
        disabled={!done}
        reason="Wait until the run is done."
        onPress={compare}
      />
    </>
  );
}

const NO_KEYS = {};

/** The run on screen beside the baseline, over the windows of the moment. */
function compareWith({ start, live, baseline, config }: Bench): string {
  const { summaryRunId } = live.state;
  const { set, recording } = start;
  const pinned: EntryRef = baseline.runId
    ? { run: baseline.runId }
    : set
      ? { set: set.id, version: set.version.number }
      : 'start';
  const current: EntryRef[] = summaryRunId && summaryRunId !== baseline.runId ? [{ run: summaryRunId }] : [];
  return compareHref({ recordingId: recording.id, entries: [pinned, ...current], windows: config.outages });
}

/** Save, and the keys of undo and redo. */
export function SaveAction({ bench, label }: { bench: Bench; label: string }) {
  const [saving, setSaving] = useState(false);
  const maySave = useCan('set:draft');
  useUndoKeys(bench);
  useShortcuts(maySave ? { s: () => setSaving(true) } : NO_KEYS);
  return (
    <>
      <Button
        label={label}
        kind="primary"
        disabled={!maySave}
        reason="Your role reads: an engineer saves versions."
        onPress={() => setSaving(true)}
      />
      {saving ? <SaveDialog bench={bench} onClose={() => setSaving(false)} /> : null}
    </>
  );
}

function useUndoKeys({ undo, redo, locked }: Bench): void {
  useEffect(() => {
    if (typeof window === 'undefined' || !window.addEventListener || locked !== null) return;
    const onKey = (event: KeyboardEvent) => {
      if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
      const key = event.key.toLowerCase();
      if (key !== 'z' && key !== 'y') return;
      // A field that is being typed in undoes its own text.
      const target = event.target as HTMLElement | null;
      if (target && /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName)) return;
      event.preventDefault();
      if (key === 'y' || event.shiftKey) redo();
      else undo();
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, [undo, redo, locked]);
}

/** What a bench is opened with, resolved from its address: recording, set and version, pinned baseline. */
import { defaultParameters, type Parameters } from '@/shared/contracts/parameters';
import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import type { Recording } from '@/shared/contracts/recordings';
import type { Outage, Run } from '@/shared/contracts/runs';
import { freeAround } from '@/components/strip/window-model';
import { applyChanges, type BenchLink } from './bench-link';

/** What a person sets on the bench. */
export interface BenchConfig {
  parameters: Parameters;
  outages: readonly Outage[];
  options: RunOptions;
}

/** What a run works out besides the filter. */
export interface RunOptions {
  smooth: boolean;
  errorBudget: boolean;
}
export const NO_OPTIONS: RunOptions = { smooth: false, errorBudget: false };

export interface Baseline {
  name: string;
  parameters: Parameters;
  /** The run that was pinned; null for a version or the start values. */
  runId: string | null;
}

export interface BenchStart {
  recording: Recording & { strip: NonNullable<Recording['strip']> };
  /** The set that a saved version goes into first. */
  set: { id: string; name: string; version: ParameterSetVersion } | null;
  /** Parameters that the link's changes count from. */
  from: Parameters;
  config: BenchConfig;
  baseline: Baseline;
  view: string | null;
  /** What of the link could not be used, in words. */
  notes: string[];
}

/** Puts the parts together. `set` and `pinned` are null where the link names none. */
export function resolveStart(
  recording: BenchStart['recording'],
  link: BenchLink,
  set: ParameterSetDetail | null,
  pinned: Run | null,
): BenchStart {
  const notes: string[] = [];
  const version = set ? versionOf(set, link.version, notes) : null;
  const from = version?.parameters ?? defaultParameters();
  const { parameters, refused } = applyChanges(from, link.changes);
  if (refused > 0) notes.push(`${refused} changed values of the link could not be used; the others are set.`);
  const ownWindows = version?.recordingId === recording.id ? version.outages : [];
  const outages = inRecording(link.windows ?? ownWindows, recording, notes);
  const startName = version ? `${set!.name} v${version.number}` : 'start values';
  return {
    recording,
    set: version && set ? { id: set.id, name: set.name, version } : null,
    from,
    config: { parameters, outages, options: { ...NO_OPTIONS, ...link.options } },
    baseline: pinned
      ? { name: pinnedName(pinned.finishedAt), parameters: pinned.parameters, runId: pinned.id }
      : { name: startName, parameters: from, runId: null },
    view: link.view ?? null,
    notes,
  };
}

/** What a pinned run is called. */
export function pinnedName(finishedAt: string | null): string {
  const when = finishedAt ? new Date(finishedAt) : new Date();
  const two = (value: number) => String(value).padStart(2, '0');
  return `run of ${two(when.getHours())}:${two(when.getMinutes())}`;
}

function versionOf(
  set: ParameterSetDetail,
  wanted: number | undefined,
  notes: string[],
): ParameterSetVersion | null {
  const number = wanted ?? set.latest.number;
  const found = set.versions.find((version) => version.number === number) ?? null;
  if (!found) notes.push(`${set.name} has no version ${number}: the bench starts with the usual values.`);
  return found;
}

/** Windows that lie in the recording; others are cut or left out, and that is said. */
function inRecording(
  windows: readonly Outage[],
  recording: BenchStart['recording'],
  notes: string[],
): Outage[] {
  const { startS, endS } = recording.strip;
  const kept = windows
    .map((window) => ({
      ...window,
      startS: Math.max(startS, window.startS),
      endS: Math.min(endS, window.endS),
    }))
    .filter(
      (window) => window.endS > window.startS && freeAround([], { startS, endS }, window.startS) !== null,
    );
  if (kept.length < windows.length)
    notes.push(`${windows.length - kept.length} outage windows lie outside this recording and are left out.`);
  return kept;
}

/** Windows on the strip as they are drawn, moved, resized and typed: they never overlap and never leave the recording. Pure. */
import type { Outage } from '@/shared/contracts/runs';

/** Where windows may lie, s. */
export interface WindowLimits {
  startS: number;
  endS: number;
}
export type WindowEdge = 'start' | 'end';
export type WindowPart = WindowEdge | 'body';

export const SNAP_S = 1;
export const FINE_S = 0.1;
/** Shorter windows say nothing of drift. */
export const LEAST_WINDOW_S = 1;

/** To what a time is snapped: steps of so many seconds (0: none), or a rule of its own. */
export type Snap = number | ((timeS: number) => number);

export const sortWindows = <W extends WindowLimits>(windows: readonly W[]): W[] =>
  [...windows].sort((a, b) => a.startS - b.startS);

/** The free stretch around window `index` (or around the time `atS` when drawing): up to the neighbours or the ends. */
export function freeAround(
  windows: readonly WindowLimits[],
  limits: WindowLimits,
  atS: number,
  index = -1,
): WindowLimits | null {
  let { startS, endS } = limits;
  for (let i = 0; i < windows.length; i++) {
    if (i === index) continue;
    const other = windows[i]!;
    if (other.endS <= atS) startS = Math.max(startS, other.endS);
    else if (other.startS >= atS) endS = Math.min(endS, other.startS);
    else return null;
  }
  return endS - startS >= LEAST_WINDOW_S ? { startS, endS } : null;
}

/** The window drawn from `fromS` to `toS`, snapped and cut; null where there is no room. */
export function drawWindow(
  windows: readonly WindowLimits[],
  limits: WindowLimits,
  fromS: number,
  toS: number,
  by: Snap = SNAP_S,
): WindowLimits | null {
  const free = freeAround(windows, limits, fromS);
  if (!free) return null;
  const low = clamp(snap(Math.min(fromS, toS), by), free.startS, free.endS);
  const high = clamp(snap(Math.max(fromS, toS), by), free.startS, free.endS);
  if (high - low >= LEAST_WINDOW_S) return { startS: low, endS: high };
  const startS = clamp(low, free.startS, latestStart(free));
  return { startS, endS: startS + LEAST_WINDOW_S };
}

/** The outage windows with one more, drawn from `fromS` to `toS`; null where there is no room. */
export function drawOutage(
  windows: readonly Outage[],
  limits: WindowLimits,
  fromS: number,
  toS: number,
  by: Snap = SNAP_S,
): Outage[] | null {
  const drawn = drawWindow(windows, limits, fromS, toS, by);
  return drawn && sortWindows([...windows, { ...drawn, withhold: 'gnss' }]);
}

/** Window `index` moved so that it starts near `startS`; its length stays. It stops at its neighbours. */
export function moveWindow<W extends WindowLimits>(
  windows: readonly W[],
  limits: WindowLimits,
  index: number,
  startS: number,
  by: Snap = SNAP_S,
): W[] {
  const window = windows[index];
  if (!window) return [...windows];
  const length = window.endS - window.startS;
  const free = freeAround(windows, limits, (window.startS + window.endS) / 2, index) ?? limits;
  const held = clamp(snap(startS, by), free.startS, Math.max(free.startS, free.endS - length));
  return replaced(windows, index, { ...window, startS: round(held), endS: round(held + length) });
}

/** One edge of window `index` put near `atS`; it stops at the neighbour and at the least length. */
export function resizeWindow<W extends WindowLimits>(
  windows: readonly W[],
  limits: WindowLimits,
  index: number,
  edge: WindowEdge,
  atS: number,
  by: Snap = SNAP_S,
): W[] {
  const window = windows[index];
  if (!window) return [...windows];
  const free = freeAround(windows, limits, (window.startS + window.endS) / 2, index) ?? limits;
  const snapped = snap(atS, by);
  const next =
    edge === 'start'
      ? { ...window, startS: clamp(snapped, free.startS, latestStart({ ...free, endS: window.endS })) }
      : { ...window, endS: clamp(snapped, window.startS + LEAST_WINDOW_S, free.endS) };
  return replaced(windows, index, next);
}

/** Checks typed times of window `index` (−1: a new one). Answers a message for people, or null when they can be taken. */
export function windowProblem(
  windows: readonly Outage[],
  limits: WindowLimits,
  index: number,
  startS: number,
  lengthS: number,
): { field: 'start' | 'length'; message: string } | null {
  const endS = startS + lengthS;
  if (!Number.isFinite(startS)) return { field: 'start', message: 'Type the start as seconds or as min:s.' };
  if (!Number.isFinite(lengthS) || lengthS < LEAST_WINDOW_S)
    return { field: 'length', message: `A window lasts at least ${LEAST_WINDOW_S} s.` };
  if (startS < limits.startS || startS > limits.endS - LEAST_WINDOW_S)
    return {
      field: 'start',
      message: `Start between ${round(limits.startS)} s and ${round(limits.endS - LEAST_WINDOW_S)} s: the recording lies there.`,
    };
  const others = windows.filter((_, i) => i !== index);
  const around = others.find((window) => startS >= window.startS && startS < window.endS);
  if (around)
    return {
      field: 'start',
      message: `There is a window from ${round(around.startS)} s to ${round(around.endS)} s already.`,
    };
  const next = others.filter((window) => window.startS >= startS).sort((a, b) => a.startS - b.startS)[0];
  if (next && next.startS < endS)
    return {
      field: 'length',
      message: `At most ${round(next.startS - startS)} s: the next window starts then.`,
    };
  if (endS > limits.endS + 1e-9)
    return {
      field: 'length',
      message: `At most ${round(limits.endS - startS)} s: the recording ends then.`,
    };
  return null;
}

/** Room for a new window of `lengthS`: at `atS` if free, else in the first gap that holds it; null when nothing does. */
export function placeWindow(
  windows: readonly Outage[],
  limits: WindowLimits,
  atS: number,
  lengthS: number,
): Outage | null {
  const sorted = sortWindows(windows);
  const edges = [limits.startS, ...sorted.flatMap((window) => [window.startS, window.endS]), limits.endS];
  const gaps: WindowLimits[] = [];
  for (let i = 0; i + 1 < edges.length; i += 2) gaps.push({ startS: edges[i]!, endS: edges[i + 1]! });
  const fits = gaps.filter((gap) => gap.endS - gap.startS >= lengthS);
  const best = fits.find((gap) => atS >= gap.startS && atS < gap.endS) ?? fits[0];
  if (!best) return null;
  const startS = clamp(snap(atS, SNAP_S), best.startS, best.endS - lengthS);
  return { startS: round(startS), endS: round(startS + lengthS), withhold: 'gnss' };
}

/** Seconds out of "412", "412.5", "6:52" or "1:06:52"; NaN for anything else. */
export function parseClock(text: string): number {
  const trimmed = text.trim().replace(',', '.').replace('−', '-').replace(/\s*s$/, '');
  if (!/^-?\d+(:\d{1,2}){0,2}(\.\d+)?$/.test(trimmed)) return NaN;
  const sign = trimmed.startsWith('-') ? -1 : 1;
  return (
    sign *
    trimmed
      .replace('-', '')
      .split(':')
      .reduce((total, part) => total * 60 + Number(part), 0)
  );
}

/** Where a window of least length may still start; the rounding of the difference must not put it before the stretch. */
const latestStart = ({ startS, endS }: WindowLimits) => Math.max(startS, endS - LEAST_WINDOW_S);
const clamp = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));
function snap(value: number, by: Snap): number {
  if (typeof by === 'function') return by(value);
  return round(by > 0 ? Math.round(value / by) * by : value);
}
/** Times keep a millisecond: finer is noise of the arithmetic. */
const round = (value: number) => Math.round(value * 1000) / 1000;
const replaced = <W extends WindowLimits>(windows: readonly W[], index: number, window: W) =>
  windows.map((old, i) => (i === index ? window : old));

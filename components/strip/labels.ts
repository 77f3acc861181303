/** Labels under the strip that never touch each other: lengths of windows first, then the clock where room is left. */
import { timeTicks } from '@/shared/charts/model/ticks';
import type { Scale } from '@/shared/charts/model/scale';

export interface PlacedLabel {
  text: string;
  /** Middle of the text, px. */
  x: number;
  kind: 'time' | 'window';
  /** Index of the window that it belongs to. */
  window?: number;
}

export interface LabelInput {
  x: Scale;
  windows: readonly { startS: number; endS: number }[];
  /** The window whose length is shown whatever happens. */
  selected?: number | null;
  /** Mean width of a character, px. */
  characterPx: number;
}

/** Places the labels; a window's label that has no room beside a more important one is left out. */
export function placeLabels({ x, windows, selected, characterPx }: LabelInput): PlacedLabel[] {
  const [left, right] = x.range;
  const width = (text: string) => text.length * characterPx;
  const placed: PlacedLabel[] = [];
  const fits = (at: number, text: string) =>
    placed.every((other) => Math.abs(other.x - at) >= (width(other.text) + width(text)) / 2 + GAP_PX);
  const inside = (at: number, text: string) =>
    Math.min(right - width(text) / 2 + EDGE_PX, Math.max(left + width(text) / 2 - EDGE_PX, at));

  const order = windows
    .map((window, index) => ({ window, index }))
    .sort((a, b) => rank(b, selected) - rank(a, selected));
  for (const { window, index } of order) {
    const text = lengthLabel(window.endS - window.startS);
    const at = inside(x((window.startS + window.endS) / 2), text);
    if (fits(at, text)) placed.push({ text, x: at, kind: 'window', window: index });
  }
  const most = Math.max(2, Math.floor((right - left) / (8 * characterPx + 24)));
  for (const tick of timeTicks(x.domain[0], x.domain[1], most)) {
    const at = inside(x(tick.value), tick.label);
    if (fits(at, tick.label)) placed.push({ text: tick.label, x: at, kind: 'time' });
  }
  return placed;
}

/** A window's length: whole seconds where it is whole. */
export const lengthLabel = (seconds: number) => `${Number(seconds.toFixed(1))} s`;

const rank = (
  entry: { window: { startS: number; endS: number }; index: number },
  selected?: number | null,
) => (entry.index === selected ? Infinity : entry.window.endS - entry.window.startS);

const GAP_PX = 8;
/** A label may stand this far out of the recording, in the margin. */
const EDGE_PX = 6;

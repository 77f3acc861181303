/**
 * What a quiet chart consists of: two axes, linear or logarithmic, and marks in the axes' units. The page draws it with
 * Victory (quiet/QuietPlot.tsx), a saved picture through figure/plot-figure.ts. Pure.
 */
import { formatNumber } from '@/shared/format';
import type { Tone } from '../figure/shapes';
import type { Extent } from './scale';
import { valueTicks } from './ticks';

export interface PlotAxis {
  title: string;
  domain: Extent;
  ticks: readonly number[];
  log?: boolean;
  /** How a tick is written. */
  written: (value: number) => string;
}
interface MarkLook {
  id: string;
  tone: Tone;
  /** Name in a picture's legend; left out: in none. */
  label?: string;
}
export interface PlotPoint {
  x: number;
  y: number;
}
export type PlotMark = MarkLook &
  (
    | { kind: 'line'; width: number; dash?: string; points: readonly PlotPoint[] }
    /** Ground down to zero. */
    | { kind: 'area'; points: readonly PlotPoint[] }
    | { kind: 'bars'; bars: readonly { from: number; to: number; value: number }[] }
    | { kind: 'whiskers'; points: readonly { x: number; y: number; low: number; high: number }[] }
    /** Words that end at a point. */
    | { kind: 'words'; at: PlotPoint; text: string }
  );
export interface PlotModel {
  x: PlotAxis;
  y: PlotAxis;
  /** Drawn in this order. */
  marks: readonly PlotMark[];
}

/** An axis with about `count` round ticks. */
export function linearAxis(title: string, domain: Extent, count: number): PlotAxis {
  const ticks = valueTicks(domain[0], domain[1], count);
  return {
    title,
    domain,
    ticks: ticks.map(({ value }) => value),
    written: (value) => ticks.find((tick) => tick.value === value)?.label ?? formatNumber(value, 3),
  };
}

/** What a chart over time consists of: said by its owner, turned into pixels by time-chart.ts. */
import type { Palette } from '@/shared/tokens';
import type { Extent } from './scale';
import type { TimeSeries } from './series';

export type ChartTone = keyof Palette;

interface LayerLook {
  id: string;
  tone: ChartTone;
  opacity?: number;
  /** Name in a saved table, without its unit; left out: the id. */
  column?: string;
  /** Drawn from this time on only: the part that a newer run has not reached yet. */
  fromS?: () => number;
}

/** A line over time. */
export interface LineLayer extends LayerLook {
  kind: 'line';
  series: () => TimeSeries | null;
  width?: number;
  dash?: string;
  /** The line does not cross the edges of outage windows. */
  breaks?: boolean;
  /** Name in the legend and the cursor's reading; left out: in neither (ghosts, remainders). */
  label?: string;
}
/** Ground between −value and +value (a σ band) about zero or about a centre, with a hairline edge. */
export interface BandLayer extends LayerLook {
  kind: 'band';
  series: () => TimeSeries | null;
  centre?: () => TimeSeries | null;
  dash?: string;
  breaks?: boolean;
  label?: string;
}
/** Ground between zero and the value, with a hairline edge. */
export interface AreaLayer extends LayerLook {
  kind: 'area';
  series: () => TimeSeries | null;
  breaks?: boolean;
  label?: string;
}
/** A mark at each value; what lies beyond the scale stands at its edge. */
export interface MarksLayer extends LayerLook {
  kind: 'dots' | 'diamonds';
  series: () => TimeSeries | null;
  label?: string;
}
/** A horizontal rule at each value (bounds). */
export interface RulesLayer extends LayerLook {
  kind: 'rules';
  values: () => readonly number[];
  width?: number;
  dash?: string;
  label?: string;
}
export type Layer = LineLayer | BandLayer | AreaLayer | MarksLayer | RulesLayer;

export interface TimeWindow {
  startS: number;
  endS: number;
}

/** Words at a point of the plot. */
export interface Annotation {
  timeS: number;
  value: number;
  text: string;
  /** Digits are set in the mono face. */
  number?: boolean;
  tone: ChartTone;
}

export interface ChartContent {
  id: string;
  title: string;
  /** Unit of the value axis. */
  unit: string;
  /** A remark beside the unit: what is compared with what. */
  remark?: () => string;
  /** Drawn in this order, the last on top. */
  layers: readonly Layer[];
  windows: () => readonly TimeWindow[];
  /** Extent of values to show for a stretch of time; it is widened to round values. */
  domain: (fromS: number, toS: number) => Extent;
  annotations?: () => readonly Annotation[];
  /** Why there is nothing to draw; shown in place of an empty plot. Left out: nothing has come yet. */
  empty?: () => string;
  /** The chart in a sentence, for the screen reader. */
  sentence: () => string;
}

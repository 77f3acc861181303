/**
 * A drawing as data: paths, rectangles and words, inked by the names of the palette. The page draws them through React
 * (drawing/Shapes.tsx), a saved picture as SVG text (svg.ts): both show the same.
 */
import type { Palette } from '@/shared/tokens';

export type Tone = keyof Palette;

export interface Inked {
  stroke?: Tone;
  strokeWidth?: number;
  strokeOpacity?: number;
  dash?: string;
  /** Round ends; dots are strokes of no length with round ends. */
  round?: boolean;
  fill?: Tone;
  fillOpacity?: number;
}
export interface PathShape extends Inked {
  kind: 'path';
  d: string;
  /** Shifted so far, px. */
  at?: readonly [number, number];
  /** Cut to the plot. */
  clipped?: boolean;
}
export interface RectShape extends Inked {
  kind: 'rect';
  x: number;
  y: number;
  width: number;
  height: number;
}
/** Words; `face` number is for digits. */
export interface TextShape {
  kind: 'text';
  x: number;
  y: number;
  text: string;
  tone: Tone;
  face: 'label' | 'strong' | 'number';
  size: number;
  anchor?: 'start' | 'middle' | 'end';
  /** Turned by a quarter, upwards. */
  upright?: boolean;
  /** A rim of the ground, so that it can be read over curves. */
  halo?: boolean;
}
export type Shape = PathShape | RectShape | TextShape;

/** Where a plot lies, px. */
export interface Box {
  left: number;
  top: number;
  right: number;
  bottom: number;
}
/** Title size of an axis, px. */
export const AXIS_TITLE_PX = 13;

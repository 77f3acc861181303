/**
 * The curves of a chart on a canvas. As elements of the page their paths would go through its style engine at each of ten
 * updates a second, which costs more than drawing them.
 */
import type { Ink } from '@/shared/charts/model/layer-style';
import type { LayerPaths, PlotBox } from '@/shared/charts/model/time-chart';

export interface Curve {
  paths: LayerPaths;
  ink: Ink;
}

export class CurveCanvas {
  private element: HTMLCanvasElement | null = null;
  private last: (() => void) | null = null;

  /** The ref callback of the canvas, the same at every call; what was drawn before it came is drawn then. */
  ref(): (element: HTMLCanvasElement | null) => void {
    return this.attach;
  }

  /** Draws `curves` inside `box`, the first lowest, in a surface of `width` × `height` px. */
  paint(curves: readonly Curve[], box: PlotBox, width: number, height: number): void {
    this.last = () => this.draw(curves, box, width, height);
    this.last();
  }

  private readonly attach = (element: HTMLCanvasElement | null): void => {
    this.element = element;
    this.last?.();
  };

  private draw(curves: readonly Curve[], box: PlotBox, width: number, height: number): void {
    const { element } = this;
    const context = typeof Path2D === 'undefined' ? null : element?.getContext('2d');
    if (!element || !context) return;
    const scale = globalThis.devicePixelRatio || 1;
    const [pixelsX, pixelsY] = [Math.round(width * scale), Math.round(height * scale)];
    if (element.width !== pixelsX) element.width = pixelsX;
    if (element.height !== pixelsY) element.height = pixelsY;
    context.setTransform(scale, 0, 0, scale, 0, 0);
    context.clearRect(0, 0, width, height);
    context.save();
    context.beginPath();
    context.rect(box.left, box.top, box.right - box.left, Math.max(1, box.bottom - box.top));
    context.clip();
    for (const curve of curves) inked(context, curve);
    context.restore();
  }
}

function inked(context: CanvasRenderingContext2D, { paths, ink }: Curve): void {
  if (paths.fill && ink.fill !== 'none') {
    context.globalAlpha = ink.fillOpacity;
    context.fillStyle = ink.fill;
    context.fill(new Path2D(paths.fill));
  }
  if (!paths.stroke) return;
  const thin = paths.dense === true;
  context.globalAlpha = ink.strokeOpacity * (thin ? DENSE_OPACITY : 1);
  context.strokeStyle = ink.stroke;
  context.lineWidth = ink.strokeWidth;
  context.lineCap = ink.strokeLinecap;
  // At this width nobody sees a join, and round ones cost a third more.
  context.lineJoin = 'bevel';
  context.setLineDash(thin || !ink.strokeDasharray ? [] : ink.strokeDasharray.split(/[ ,]+/).map(Number));
  context.stroke(new Path2D(dotted(paths.stroke)));
}

/** More points than pixels: full ink would only make mud of it. */
const DENSE_OPACITY = 0.75;

/** A canvas leaves out strokes of no length, by which dots are drawn. */
const dotted = (d: string) => (d.includes('h0') ? d.replaceAll('h0', 'h.01') : d);

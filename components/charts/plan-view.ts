/** The plan view's own zoom over its fit, and its gestures: wheel and pinch zoom, drag pans, double tap fits again. */
import type { TrackFrame } from '@/shared/charts/model/track';

export class PlanView {
  private zoom = 1;
  /** Shift of the fitted picture, px before zoom. */
  private dx = 0;
  private dy = 0;

  get fitted(): boolean {
    return this.zoom === 1 && this.dx === 0 && this.dy === 0;
  }

  /** `frame` seen through this view, in a box of the given size. */
  apply(frame: TrackFrame, width: number, height: number): TrackFrame {
    if (this.fitted) return frame;
    const { zoom, dx, dy } = this;
    const [cx, cy] = [width / 2, height / 2];
    return {
      scale: frame.scale * zoom,
      x: (east) => cx + (frame.x(east) - cx) * zoom + dx,
      y: (north) => cy + (frame.y(north) - cy) * zoom + dy,
      eastAt: (x) => frame.eastAt(cx + (x - dx - cx) / zoom),
      northAt: (y) => frame.northAt(cy + (y - dy - cy) / zoom),
    };
  }

  /** Zooms by `factor` (> 1: closer) with the pixel (x, y) of a box of the given size staying where it is. */
  zoomAt(factor: number, x: number, y: number, width: number, height: number): void {
    const next = Math.min(MOST, Math.max(1, this.zoom * factor));
    const applied = next / this.zoom;
    const [cx, cy] = [width / 2, height / 2];
    this.dx = x - cx - (x - cx - this.dx) * applied;
    this.dy = y - cy - (y - cy - this.dy) * applied;
    this.zoom = next;
    if (next === 1) this.reset();
  }

  pan(dx: number, dy: number): void {
    if (this.zoom === 1) return;
    this.dx += dx;
    this.dy += dy;
  }

  reset(): void {
    this.zoom = 1;
    this.dx = 0;
    this.dy = 0;
  }
}

const MOST = 400;
const DOUBLE_TAP_MS = 300;
const SLOP_PX = 5;

export interface PlanGestureHost {
  view: PlanView;
  size: () => { width: number; height: number };
  changed: () => void;
  /** The pointer rests or taps here. */
  point: (x: number, y: number) => void;
  leave: () => void;
}

/** Listens on `element`; answers a function that stops. */
export function bindPlanGestures(element: HTMLElement, host: PlanGestureHost): () => void {
  const pointers = new Map<number, { x: number; y: number }>();
  let moved = false;
  let lastTap = -Infinity;
  const local = (event: { clientX: number; clientY: number }) => {
    const box = element.getBoundingClientRect();
    return { x: event.clientX - box.left, y: event.clientY - box.top };
  };
  const zoom = (factor: number, at: { x: number; y: number }) => {
    const { width, height } = host.size();
    host.view.zoomAt(factor, at.x, at.y, width, height);
    host.changed();
  };

  function onDown(event: PointerEvent) {
    if (event.pointerType === 'mouse' && event.button !== 0) return;
    if (pointers.size === 0) moved = false;
    pointers.set(event.pointerId, local(event));
    element.setPointerCapture?.(event.pointerId);
  }

  function onMove(event: PointerEvent) {
    const at = local(event);
    const before = pointers.get(event.pointerId);
    if (!before) {
      if (event.pointerType === 'mouse') host.point(at.x, at.y);
      return;
    }
    const other = [...pointers].find(([id]) => id !== event.pointerId)?.[1];
    if (other) {
      const spread = (p: { x: number; y: number }) => Math.max(10, Math.hypot(p.x - other.x, p.y - other.y));
      zoom(spread(at) / spread(before), { x: (at.x + other.x) / 2, y: (at.y + other.y) / 2 });
      moved = true;
    } else {
      if (!moved && Math.hypot(at.x - before.x, at.y - before.y) < SLOP_PX) return;
      moved = true;
      host.view.pan(at.x - before.x, at.y - before.y);
      host.changed();
    }
    pointers.set(event.pointerId, at);
  }

  function onUp(event: PointerEvent) {
    if (!pointers.delete(event.pointerId) || moved || event.type !== 'pointerup') return;
    const at = local(event);
    if (event.timeStamp - lastTap < DOUBLE_TAP_MS) {
      host.view.reset();
      host.changed();
    } else host.point(at.x, at.y);
    lastTap = event.timeStamp;
  }

  function onWheel(event: WheelEvent) {
    const factor = Math.exp(-Math.max(-0.5, Math.min(0.5, event.deltaY * 0.0025)));
    if (factor < 1 && host.view.fitted) return;
    event.preventDefault();
    zoom(factor, local(event));
  }

  const onLeave = (event: PointerEvent) => {
    if (event.pointerType === 'mouse' && pointers.size === 0) host.leave();
  };
  element.style.touchAction = 'pan-y';
  element.addEventListener('pointerdown', onDown);
  element.addEventListener('pointermove', onMove);
  element.addEventListener('pointerup', onUp);
  element.addEventListener('pointercancel', onUp);
  element.addEventListener('pointerleave', onLeave);
  element.addEventListener('wheel', onWheel, { passive: false });
  return () => {
    element.removeEventListener('pointerdown', onDown);
    element.removeEventListener('pointermove', onMove);
    element.removeEventListener('pointerup', onUp);
    element.removeEventListener('pointercancel', onUp);
    element.removeEventListener('pointerleave', onLeave);
    element.removeEventListener('wheel', onWheel);
  };
}

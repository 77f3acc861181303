/** Pointer, wheel and touch on a chart turned into moves of the shared view and cursor. Web events, bound once an element. */
import type { ChartGroup } from './chart-group';
import { linearScale } from '@/shared/charts/model/scale';

export interface PlotEdges {
  left: number;
  right: number;
}

const ordered = (a: number, b: number) => [Math.min(a, b), Math.max(a, b)] as const;

const DOUBLE_TAP_MS = 300;
const SLOP_PX = 5;

/** Listens on `element`; `edges` says where the plot lies inside it. Answers a function that stops. */
export function bindChartGestures(
  element: HTMLElement,
  group: ChartGroup,
  edges: () => PlotEdges,
): () => void {
  const pointers = new Map<number, number>();
  let start: { x: number; view: readonly [number, number]; moved: boolean; zoomBox: boolean } | null = null;
  let pinch: { spread: number; view: readonly [number, number]; aboutS: number } | null = null;
  let lastTap = { at: -Infinity, x: 0 };

  const local = (event: { clientX: number }) => event.clientX - element.getBoundingClientRect().left;
  const timeAt = (x: number, view = group.viewport.current) => {
    const { left, right } = edges();
    return linearScale(view, [left, right]).invert(Math.min(right, Math.max(left, x)));
  };

  const twoFingers = (): [number, number] => {
    const xs = [...pointers.values()];
    return [xs[0] ?? 0, xs[1] ?? 0];
  };

  function onDown(event: PointerEvent) {
    if (event.pointerType === 'mouse' && event.button !== 0) return;
    pointers.set(event.pointerId, local(event));
    element.setPointerCapture?.(event.pointerId);
    if (pointers.size === 2) beginPinch();
    else start = { x: local(event), view: group.viewport.current, moved: false, zoomBox: event.shiftKey };
  }

  function beginPinch() {
    const [a, b] = twoFingers();
    start = null;
    pinch = {
      spread: Math.max(10, Math.abs(a - b)),
      view: group.viewport.current,
      aboutS: timeAt((a + b) / 2),
    };
  }

  function onMove(event: PointerEvent) {
    const x = local(event);
    if (pointers.has(event.pointerId)) pointers.set(event.pointerId, x);
    if (pinch && pointers.size >= 2) return movePinch();
    if (!start) {
      if (event.pointerType === 'mouse') group.cursor.set(timeAt(x));
      return;
    }
    if (Math.abs(x - start.x) > SLOP_PX) start.moved = true;
    if (!start.moved) return;
    if (start.zoomBox) return group.brush.set(ordered(timeAt(start.x), timeAt(x)));
    // Nothing to pan in the whole view: there the finger moves the cursor instead.
    if (!group.viewport.zoomed) return group.cursor.set(timeAt(x));
    const { left, right } = edges();
    const perPx = (start.view[1] - start.view[0]) / Math.max(1, right - left);
    const by = (start.x - x) * perPx;
    group.viewport.show([start.view[0] + by, start.view[1] + by]);
  }

  function movePinch() {
    const [a, b] = twoFingers();
    const factor = pinch!.spread / Math.max(10, Math.abs(a - b));
    const { left, right } = edges();
    const span = (pinch!.view[1] - pinch!.view[0]) * factor;
    const share = ((a + b) / 2 - left) / Math.max(1, right - left);
    group.viewport.show([pinch!.aboutS - share * span, pinch!.aboutS + (1 - share) * span]);
  }

  function onUp(event: PointerEvent) {
    const x = local(event);
    pointers.delete(event.pointerId);
    if (pointers.size < 2) pinch = null;
    if (start?.zoomBox) group.brush.set(null);
    if (start?.moved && start.zoomBox) {
      if (event.type === 'pointerup') group.viewport.show(ordered(timeAt(start.x), timeAt(x)));
    } else if (start && !start.moved && event.type === 'pointerup') onTap(x, event.timeStamp);
    if (pointers.size === 0) start = null;
  }

  function onTap(x: number, at: number) {
    if (at - lastTap.at < DOUBLE_TAP_MS && Math.abs(x - lastTap.x) < 24) {
      group.viewport.reset();
      lastTap = { at: -Infinity, x: 0 };
      return;
    }
    lastTap = { at, x };
    group.cursor.set(timeAt(x));
  }

  function onWheel(event: WheelEvent) {
    const { left, right } = edges();
    if (Math.abs(event.deltaX) > Math.abs(event.deltaY)) {
      if (!group.viewport.zoomed) return;
      const [from, to] = group.viewport.current;
      group.viewport.pan((event.deltaX * (to - from)) / Math.max(1, right - left));
      event.preventDefault();
      return;
    }
    const factor = Math.exp(Math.max(-0.5, Math.min(0.5, event.deltaY * 0.0022)));
    // Out of the whole view there is nothing to zoom: then the page may scroll.
    if (group.viewport.zoom(factor, timeAt(local(event)))) event.preventDefault();
  }

  const onLeave = (event: PointerEvent) => {
    if (event.pointerType === 'mouse' && !start) group.cursor.set(null);
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

/** Keys on a focused chart. Answers whether the key was one of its own. */
export function chartKey(group: ChartGroup, key: string, shift: boolean): boolean {
  const [from, to] = group.viewport.current;
  const step = (to - from) / (shift ? 400 : 40);
  const at = group.cursor.current ?? (from + to) / 2;
  const keepInView = (timeS: number) => {
    const [low, high] = group.viewport.whole;
    const held = Math.min(high, Math.max(low, timeS));
    group.cursor.set(held);
    if (held < from || held > to) group.viewport.pan(held < from ? held - from : held - to);
  };
  switch (key) {
    case 'ArrowLeft':
      keepInView(at - step);
      return true;
    case 'ArrowRight':
      keepInView(at + step);
      return true;
    case 'PageUp':
      group.viewport.pan(-(to - from) / 2);
      return true;
    case 'PageDown':
      group.viewport.pan((to - from) / 2);
      return true;
    case '+':
    case '=':
      group.viewport.zoom(0.7, at);
      return true;
    case '-':
      group.viewport.zoom(1 / 0.7, at);
      return true;
    case '0':
    case 'Home':
      group.viewport.reset();
      return true;
    case 'Escape':
      group.cursor.set(null);
      return true;
    default:
      return false;
  }
}

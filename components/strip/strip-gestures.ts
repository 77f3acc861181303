/** Pointer on the full-width strip: draws on empty ground, moves by the body, resizes by the edges, moves the cursor. */
import type { Scale } from '@/shared/charts/model/scale';
import {
  FINE_S,
  SNAP_S,
  moveWindow,
  resizeWindow,
  type Snap,
  type WindowLimits,
  type WindowPart,
} from './window-model';

export interface StripGestureHost<W extends WindowLimits> {
  x: () => Scale;
  limits: () => WindowLimits;
  windows: () => readonly W[];
  /** False: only the cursor moves. */
  editable: () => boolean;
  /** A drag within a window draws anew instead of moving it. */
  drawsInside?: boolean;
  /** The windows after a drag from `fromS` to `toS`; null where there is no room. */
  draw: (before: readonly W[], fromS: number, toS: number, by: Snap) => W[] | null;
  change: (windows: W[], settled: boolean) => void;
  select: (index: number | null) => void;
  cursor: (timeS: number | null) => void;
  /** Where a time comes to rest beside `others`, whose edges attract within `reachS`; left out: at whole seconds. */
  snap?: (timeS: number, others: readonly W[], reachS: number) => number;
  /** False: drags are not snapped. */
  snaps?: () => boolean;
  /** Below this, px from the top, lies the clock: a drag along it picks a stretch, as it goes and when it is done. */
  clockTop?: () => number;
  brush?: (stretch: readonly [number, number], done: boolean) => void;
  /** A press without a move, on the clock. */
  clockTap?: () => void;
  /** A press without a move, wherever it was; `reachS` is how far beside it still counts. */
  tap?: (timeS: number, reachS: number) => void;
}

/** What lies under `x` px: a window's edge before its body; `reachPx` is how far beside an edge still counts. */
export function hitWindow(
  windows: readonly WindowLimits[],
  scale: Scale,
  x: number,
  reachPx: number,
): { index: number; part: WindowPart } | null {
  let best: { index: number; part: WindowPart; distance: number } | null = null;
  windows.forEach((window, index) => {
    const [left, right] = [scale(window.startS), scale(window.endS)];
    // Inside, an edge takes at most a third of the window, so that a narrow one can still be moved.
    const inner = Math.min(reachPx, (right - left) / 3);
    const consider = (part: WindowPart, edge: number, outside: number) => {
      const distance = Math.abs(x - edge);
      const reach = outside > 0 ? reachPx : inner;
      if (distance <= reach && (!best || distance < best.distance)) best = { index, part, distance };
    };
    consider('start', left, left - x);
    consider('end', right, x - right);
    if (x > left && x < right && !best) best = { index, part: 'body', distance: reachPx };
  });
  const found = best as { index: number; part: WindowPart; distance: number } | null;
  return found && { index: found.index, part: found.part };
}

const SLOP_PX = 4;
const MOUSE_REACH_PX = 9;
/** Half of a touch target. */
const TOUCH_REACH_PX = 22;

/** How near another window's edge attracts, px. */
const ATTRACTION_PX = 6;

interface Drag<W> {
  pointer: number;
  startX: number;
  moved: boolean;
  hit: { index: number; part: WindowPart } | null;
  before: readonly W[];
  onClock: boolean;
}

/** Listens on `element`; answers a function that stops. */
export function bindStripGestures<W extends WindowLimits>(
  element: HTMLElement,
  host: StripGestureHost<W>,
): () => void {
  let drag: Drag<W> | null = null;
  const local = (event: PointerEvent) => event.clientX - element.getBoundingClientRect().left;
  const reach = (event: PointerEvent) => (event.pointerType === 'mouse' ? MOUSE_REACH_PX : TOUCH_REACH_PX);
  const timeAt = (x: number) => {
    const { startS, endS } = host.limits();
    return Math.min(endS, Math.max(startS, host.x().invert(x)));
  };
  const isClock = (event: PointerEvent) =>
    host.brush !== undefined &&
    host.clockTop !== undefined &&
    event.clientY - element.getBoundingClientRect().top >= host.clockTop();
  /** Alt does without, shift is fine. */
  const snapOf = (event: PointerEvent, others: readonly W[]): Snap => {
    if (event.altKey || host.snaps?.() === false) return 0;
    const { snap } = host;
    if (event.shiftKey || !snap) return event.shiftKey ? FINE_S : SNAP_S;
    const reachS = Math.abs(timeAt(ATTRACTION_PX) - timeAt(0));
    return (timeS) => snap(timeS, others, reachS);
  };
  const hitAt = (x: number, event: PointerEvent) => {
    const hit = host.editable() ? hitWindow(host.windows(), host.x(), x, reach(event)) : null;
    return host.drawsInside && hit?.part === 'body' ? null : hit;
  };

  function onDown(event: PointerEvent) {
    if (drag || (event.pointerType === 'mouse' && event.button !== 0)) return;
    // A handle that has the focus keeps it; the ground must not steal the pointer from buttons on it.
    const x = local(event);
    const onClock = isClock(event);
    const hit = onClock ? null : hitAt(x, event);
    drag = { pointer: event.pointerId, startX: x, moved: false, hit, before: host.windows(), onClock };
    element.setPointerCapture?.(event.pointerId);
    if (hit) host.select(hit.index);
  }

  function onMove(event: PointerEvent) {
    const x = local(event);
    if (!drag) {
      if (event.pointerType === 'mouse') hover(x, event);
      return;
    }
    if (event.pointerId !== drag.pointer) return;
    if (Math.abs(x - drag.startX) > SLOP_PX) drag.moved = true;
    if (!drag.moved) return;
    if (drag.onClock) return host.brush?.(span(drag, x), false);
    if (!host.editable()) return host.cursor(timeAt(x));
    const next = dragged(drag, x, event);
    if (next) host.change(next, false);
  }

  const span = ({ startX }: Drag<W>, x: number) => {
    const [a, b] = [timeAt(startX), timeAt(x)];
    return [Math.min(a, b), Math.max(a, b)] as const;
  };

  function hover(x: number, event: PointerEvent) {
    host.cursor(timeAt(x));
    if (isClock(event)) {
      element.style.cursor = 'col-resize';
      return;
    }
    const hit = hitAt(x, event);
    element.style.cursor = !host.editable()
      ? 'default'
      : !hit
        ? 'crosshair'
        : hit.part === 'body'
          ? 'grab'
          : 'ew-resize';
  }

  function dragged({ hit, before, startX }: Drag<W>, x: number, event: PointerEvent): W[] | null {
    const [scale, limits] = [host.x(), host.limits()];
    const by = snapOf(
      event,
      before.filter((_, index) => index !== hit?.index),
    );
    if (!hit) return host.draw(before, timeAt(startX), timeAt(x), by);
    const window = before[hit.index];
    if (!window) return null;
    const byS = scale.invert(x) - scale.invert(startX);
    if (hit.part === 'body') return moveWindow(before, limits, hit.index, window.startS + byS, by);
    const edge = hit.part === 'start' ? window.startS : window.endS;
    return resizeWindow(before, limits, hit.index, hit.part, edge + byS, by);
  }

  function onUp(event: PointerEvent) {
    if (!drag || event.pointerId !== drag.pointer) return;
    const ended = drag;
    drag = null;
    const x = local(event);
    if (ended.onClock) {
      if (event.type === 'pointercancel') return;
      if (ended.moved) host.brush?.(span(ended, x), true);
      else host.clockTap?.();
      return;
    }
    if (event.type === 'pointercancel') {
      // The page scrolls instead: nothing was meant.
      if (ended.moved && host.editable()) host.change([...ended.before], true);
      return;
    }
    if (!ended.moved) {
      if (!ended.hit) {
        host.select(null);
        host.cursor(timeAt(x));
      }
      host.tap?.(timeAt(x), timeAt(x + reach(event) / 2) - timeAt(x));
      return;
    }
    if (!host.editable()) return;
    const next = dragged(ended, x, event);
    if (!next) return;
    host.change(next, true);
    if (!ended.hit) {
      const from = Math.min(timeAt(ended.startX), timeAt(x));
      const at = next.findIndex((window) => !ended.before.includes(window) && window.endS > from);
      host.select(at >= 0 ? at : null);
    }
  }

  const onLeave = (event: PointerEvent) => {
    if (event.pointerType === 'mouse' && !drag) host.cursor(null);
  };

  element.style.touchAction = 'pan-y';
  element.addEventListener('pointerdown', onDown);
  element.addEventListener('pointermove', onMove);
  element.addEventListener('pointerup', onUp);
  element.addEventListener('pointercancel', onUp);
  element.addEventListener('pointerleave', onLeave);
  return () => {
    element.removeEventListener('pointerdown', onDown);
    element.removeEventListener('pointermove', onMove);
    element.removeEventListener('pointerup', onUp);
    element.removeEventListener('pointercancel', onUp);
    element.removeEventListener('pointerleave', onLeave);
  };
}

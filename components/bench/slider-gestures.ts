/** Pointer on a slider. A mouse jumps to where it presses; a finger moves the thumb relatively, so that scrolling changes nothing. */

export interface SliderGestureHost {
  locked: () => boolean;
  /** Place of the thumb, 0…1. */
  fraction: () => number;
  /** Ends of the rule inside the element, px. */
  span: () => { left: number; right: number };
  change: (fraction: number, settled: boolean) => void;
  /** Double tap. */
  reset: () => void;
}

const DOUBLE_TAP_MS = 320;
const SLOP_PX = 5;
const THUMB_PX = 14;
/** With shift held the thumb moves this much slower. */
const FINE = 0.1;

/** Listens on `element`; answers a function that stops. */
export function bindSliderGestures(element: HTMLElement, host: SliderGestureHost): () => void {
  let drag: { pointer: number; startX: number; lastX: number; fraction: number; moving: boolean } | null =
    null;
  let lastTap = -Infinity;
  const local = (event: PointerEvent) => event.clientX - element.getBoundingClientRect().left;
  const width = () => Math.max(1, host.span().right - host.span().left);

  function onDown(event: PointerEvent) {
    if (drag || host.locked() || (event.pointerType === 'mouse' && event.button !== 0)) return;
    const x = local(event);
    const thumb = host.span().left + host.fraction() * width();
    const jumps = event.pointerType === 'mouse' && Math.abs(x - thumb) > THUMB_PX;
    const fraction = jumps ? (x - host.span().left) / width() : host.fraction();
    drag = { pointer: event.pointerId, startX: x, lastX: x, fraction, moving: jumps };
    element.setPointerCapture?.(event.pointerId);
    if (event.timeStamp - lastTap < DOUBLE_TAP_MS) {
      drag = null;
      lastTap = -Infinity;
      host.reset();
    } else if (jumps) host.change(fraction, false);
  }

  function onMove(event: PointerEvent) {
    if (!drag || event.pointerId !== drag.pointer) return;
    const x = local(event);
    if (!drag.moving && Math.abs(x - drag.startX) < SLOP_PX) return;
    drag.moving = true;
    drag.fraction += ((x - drag.lastX) / width()) * (event.shiftKey ? FINE : 1);
    drag.lastX = x;
    host.change(Math.min(1, Math.max(0, drag.fraction)), false);
  }

  function onUp(event: PointerEvent) {
    if (!drag || event.pointerId !== drag.pointer) return;
    const { moving, startX, fraction } = drag;
    drag = null;
    if (Math.abs(local(event) - startX) < SLOP_PX && event.type === 'pointerup') lastTap = event.timeStamp;
    if (moving) host.change(Math.min(1, Math.max(0, fraction)), true);
  }

  element.style.touchAction = 'pan-y';
  element.style.cursor = 'ew-resize';
  element.addEventListener('pointerdown', onDown);
  element.addEventListener('pointermove', onMove);
  element.addEventListener('pointerup', onUp);
  element.addEventListener('pointercancel', onUp);
  return () => {
    element.removeEventListener('pointerdown', onDown);
    element.removeEventListener('pointermove', onMove);
    element.removeEventListener('pointerup', onUp);
    element.removeEventListener('pointercancel', onUp);
  };
}

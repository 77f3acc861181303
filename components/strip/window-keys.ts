/** Keys on a focused window or one of its edges. Pure: answers the windows to have, or nothing. */
import { FINE_S, SNAP_S, moveWindow, resizeWindow, type WindowLimits, type WindowPart } from './window-model';

const PAGE_S = 10;

/** The windows after `key` on `part` of window `index`; null when the key is not one of its own. Shift is fine. */
export function windowKey<W extends WindowLimits>(
  windows: readonly W[],
  limits: WindowLimits,
  index: number,
  part: WindowPart,
  key: string,
  shift: boolean,
): W[] | null {
  const window = windows[index];
  if (!window) return null;
  if (key === 'Delete' || key === 'Backspace') return windows.filter((_, i) => i !== index);
  const step = steps(shift)[key];
  if (step === undefined) return null;
  const snapS = shift ? FINE_S : SNAP_S;
  if (part === 'body') return moveWindow(windows, limits, index, window.startS + step, snapS);
  const edge = part === 'start' ? window.startS : window.endS;
  return resizeWindow(windows, limits, index, part, edge + step, snapS);
}

function steps(shift: boolean): Record<string, number> {
  const step = shift ? FINE_S : SNAP_S;
  return {
    ArrowLeft: -step,
    ArrowDown: -step,
    ArrowRight: step,
    ArrowUp: step,
    PageDown: -PAGE_S,
    PageUp: PAGE_S,
  };
}

/** A sideways flick on an element: next or previous. The element may scroll sideways itself until it reaches its end. */
import { useEffect, useRef } from 'react';
import type { View } from 'react-native';

const LEAST_PX = 48;

/** `onSwipe` gets 1 for a flick to the left (next), −1 for one to the right. */
export function useSwipe(onSwipe: (by: 1 | -1) => void) {
  const ref = useRef<View>(null);
  const latest = useRef(onSwipe);
  useEffect(() => {
    latest.current = onSwipe;
  });
  useEffect(() => {
    const element = ref.current as unknown as HTMLElement | null;
    if (!element?.addEventListener) return;
    let start: { x: number; y: number } | null = null;
    const down = (event: TouchEvent) => {
      const touch = event.touches[0];
      start = touch && event.touches.length === 1 ? { x: touch.clientX, y: touch.clientY } : null;
    };
    const up = (event: TouchEvent) => {
      const touch = event.changedTouches[0];
      if (!start || !touch) return;
      const [dx, dy] = [touch.clientX - start.x, touch.clientY - start.y];
      start = null;
      if (Math.abs(dx) > LEAST_PX && Math.abs(dx) > 2 * Math.abs(dy)) latest.current(dx < 0 ? 1 : -1);
    };
    element.addEventListener('touchstart', down, { passive: true });
    element.addEventListener('touchend', up, { passive: true });
    return () => {
      element.removeEventListener('touchstart', down);
      element.removeEventListener('touchend', up);
    };
  }, []);
  return ref;
}

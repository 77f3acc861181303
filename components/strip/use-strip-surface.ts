/** Binds the pointer to a strip on the page; the host is read at each event, so that it may change with every render. */
import { useEffect, useRef } from 'react';
import type { View } from 'react-native';
import { bindStripGestures, type StripGestureHost } from './strip-gestures';
import type { WindowLimits } from './window-model';

/** Answers the reference of the element that listens, from when it is `ready` (has a width). */
export function useStripSurface<W extends WindowLimits>(host: StripGestureHost<W>, ready: boolean) {
  const surface = useRef<View>(null);
  const latest = useRef(host);
  useEffect(() => {
    latest.current = host;
  });
  useEffect(() => {
    const element = surface.current as unknown as HTMLElement | null;
    if (!ready || !element?.addEventListener) return;
    return bindStripGestures<W>(element, {
      x: () => latest.current.x(),
      limits: () => latest.current.limits(),
      windows: () => latest.current.windows(),
      editable: () => latest.current.editable(),
      drawsInside: latest.current.drawsInside,
      draw: (...drag) => latest.current.draw(...drag),
      change: (...change) => latest.current.change(...change),
      select: (index) => latest.current.select(index),
      cursor: (timeS) => latest.current.cursor(timeS),
      snap: latest.current.snap && ((...time) => latest.current.snap!(...time)),
      snaps: () => latest.current.snaps?.() !== false,
      clockTop: latest.current.clockTop && (() => latest.current.clockTop!()),
      brush: latest.current.brush && ((...brush) => latest.current.brush!(...brush)),
      clockTap: () => latest.current.clockTap?.(),
      tap: (...tap) => latest.current.tap?.(...tap),
    });
  }, [ready]);
  return surface;
}

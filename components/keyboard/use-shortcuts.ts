import { useEffect, useRef } from 'react';
import { ShortcutKeys, type Shortcuts } from './shortcuts';
import { useSingleKeys } from './single-keys';

/** Listens for `shortcuts` while the component is on the page, unless the person has switched single keys off. */
export function useShortcuts(shortcuts: Shortcuts): void {
  const on = useSingleKeys();
  const latest = useRef(shortcuts);
  useEffect(() => {
    latest.current = shortcuts;
  });
  useEffect(() => {
    if (!on || typeof window === 'undefined' || !window.addEventListener) return;
    const keys = new ShortcutKeys();
    const onKey = (event: KeyboardEvent) => {
      // An open dialog has the page to itself.
      if (event.defaultPrevented || document.querySelector('dialog[open]')) return;
      if (keys.press(event, latest.current)) event.preventDefault();
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, [on]);
}

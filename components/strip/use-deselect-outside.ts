import { useEffect, useRef } from 'react';
import type { View } from 'react-native';

/** A press anywhere else lets the selected window go, so that its bar covers nothing. */
export function useDeselectOutside(setSelected: (index: number | null) => void) {
  const card = useRef<View>(null);
  useEffect(() => {
    const element = card.current as unknown as HTMLElement | null;
    if (!element?.ownerDocument) return;
    const page = element.ownerDocument;
    const onDown = (event: PointerEvent) => {
      if (!element.contains(event.target as Node)) setSelected(null);
    };
    page.addEventListener('pointerdown', onDown);
    return () => page.removeEventListener('pointerdown', onDown);
  }, [setSelected]);
  return card;
}

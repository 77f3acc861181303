import { router } from 'expo-router';
import { useState } from 'react';
import { KeyboardMap } from './KeyboardMap';
import { useShortcuts } from './use-shortcuts';

/** The keys that are heard on every page, and the map of all keys. */
export function Keyboard() {
  const [open, setOpen] = useState(false);
  useShortcuts({
    '?': () => setOpen(true),
    'g t': () => router.navigate('/'),
    'g r': () => router.navigate('/recordings'),
    'g b': () => router.navigate('/bench'),
    'g s': () => router.navigate('/sets'),
  });
  return open ? <KeyboardMap onClose={() => setOpen(false)} /> : null;
}

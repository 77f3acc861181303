/** Whether single keys do anything: who dictates, or rests a hand on the keyboard, switches them off. Kept in the browser. */
import { useSyncExternalStore } from 'react';

const STORAGE_KEY = 'driftwright.single-keys';
const listeners = new Set<() => void>();

const read = (): boolean => {
  try {
    return globalThis.localStorage?.getItem(STORAGE_KEY) !== 'off';
  } catch {
    return true; // storage may be forbidden
  }
};
let on = read();

export function setSingleKeys(next: boolean): void {
  on = next;
  try {
    if (next) globalThis.localStorage?.removeItem(STORAGE_KEY);
    else globalThis.localStorage?.setItem(STORAGE_KEY, 'off');
  } catch {
    // storage may be forbidden: the choice then lasts as long as the page
  }
  for (const listener of listeners) listener();
}

const subscribe = (listener: () => void) => {
  listeners.add(listener);
  return () => listeners.delete(listener);
};

export const useSingleKeys = (): boolean =>
  useSyncExternalStore(
    subscribe,
    () => on,
    () => on,
  );

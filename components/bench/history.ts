/** Undo and redo of what a person sets. Pure; a drag is one step, however many values it passes through. */
export interface History<T> {
  past: readonly T[];
  present: T;
  future: readonly T[];
  /** The step that is still being dragged, so that its next value replaces it. */
  open: string | null;
}

const MOST_STEPS = 200;

export const startHistory = <T>(present: T): History<T> => ({ past: [], present, future: [], open: null });

/**
 * Takes `next`. `key` names what is being changed; while `settled` is false, later values with the same key
 * belong to the same step.
 */
export function commit<T>(history: History<T>, next: T, key: string, settled: boolean): History<T> {
  const open = settled ? null : key;
  if (history.open === key) return { ...history, present: next, open };
  return {
    past: [...history.past, history.present].slice(-MOST_STEPS),
    present: next,
    future: [],
    open,
  };
}

export function undo<T>(history: History<T>): History<T> {
  const previous = history.past[history.past.length - 1];
  if (history.past.length === 0) return history;
  return {
    past: history.past.slice(0, -1),
    present: previous as T,
    future: [history.present, ...history.future],
    open: null,
  };
}

export function redo<T>(history: History<T>): History<T> {
  if (history.future.length === 0) return history;
  return {
    past: [...history.past, history.present],
    present: history.future[0] as T,
    future: history.future.slice(1),
    open: null,
  };
}

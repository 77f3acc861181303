/** Single keys and pairs pressed one after the other. Framework-free. */

/** Keys by name, "g r" for a pair; what each does. */
export type Shortcuts = Readonly<Record<string, () => void>>;

/** The second key of a pair must follow within this, ms. */
const PAIR_MS = 1200;

interface Key {
  key: string;
  ctrlKey: boolean;
  metaKey: boolean;
  altKey: boolean;
  timeStamp: number;
  target: unknown;
}

/** Turns key presses into what `shortcuts` names. */
export class ShortcutKeys {
  private first: { key: string; atMs: number } | null = null;

  /** Answers whether the key did something. Keys with Ctrl, ⌘ or Alt, and keys in a field, are left alone. */
  press(event: Key, shortcuts: Shortcuts): boolean {
    const { key, timeStamp } = event;
    if (event.ctrlKey || event.metaKey || event.altKey || takesKeys(event.target)) return false;
    const { first } = this;
    this.first = null;
    const pair = first && timeStamp - first.atMs < PAIR_MS ? shortcuts[`${first.key} ${key}`] : undefined;
    const does = pair ?? shortcuts[key];
    if (!does) {
      this.first = { key, atMs: timeStamp };
      return false;
    }
    does();
    return true;
  }
}

/** Fields are typed in, and what has keys of its own keeps them; an open dialog keeps all. */
export function takesKeys(target: unknown): boolean {
  const element = target as Partial<HTMLElement> | null;
  if (!element || typeof element.closest !== 'function') return false;
  return element.closest('input, textarea, select, [contenteditable], dialog, [role=slider]') !== null;
}

const DAY_MS = 86_400_000;
const clock = (at: Date) => `${two(at.getHours())}:${two(at.getMinutes())}`;
const two = (n: number) => String(n).padStart(2, '0');
const WEEKDAYS = ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'];
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** When something happened, as one says it: "today 09:12", "yesterday", "Monday", "3 Nov", "3 Nov 2025". Local time. */
export function formatDay(iso: string, now = new Date()): string {
  const at = new Date(iso);
  const days = Math.round((midnight(now) - midnight(at)) / DAY_MS);
  if (days === 0) return `today ${clock(at)}`;
  if (days === 1) return `yesterday ${clock(at)}`;
  if (days > 1 && days < 7) return WEEKDAYS[at.getDay()]!;
  const day = `${at.getDate()} ${MONTHS[at.getMonth()]}`;
  return at.getFullYear() === now.getFullYear() ? day : `${day} ${at.getFullYear()}`;
}

/** Day and clock in full, for facts: "3 Nov 2026, 09:12". Local time. */
export function formatMoment(iso: string): string {
  const at = new Date(iso);
  return `${at.getDate()} ${MONTHS[at.getMonth()]} ${at.getFullYear()}, ${clock(at)}`;
}

const midnight = (at: Date) => new Date(at.getFullYear(), at.getMonth(), at.getDate()).getTime();

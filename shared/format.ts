/** How numbers and times are written for people: three or four significant digits, no exponent where it can be helped. */

/** `value` to `digits` significant digits without trailing noise; thin space between thousands; a true minus sign. */
export function formatNumber(value: number, digits = 3): string {
  if (!Number.isFinite(value)) return '–';
  if (value === 0) return '0';
  const magnitude = Math.floor(Math.log10(Math.abs(value)));
  if (magnitude < -5 || magnitude > 8) return value.toExponential(digits - 1).replace('-', '−');
  const decimals = Math.max(0, digits - 1 - magnitude);
  const fixed = Math.abs(value).toFixed(decimals);
  const [whole, fraction] = fixed.split('.');
  const grouped = whole!.length > 4 ? whole!.replace(/\B(?=(\d{3})+$)/g, '\u2009') : whole!;
  return (value < 0 ? '−' : '') + grouped + (fraction ? `.${fraction}` : '');
}

/** A change with its sign, '0' when nothing changed. */
export const formatChange = (value: number, digits = 3): string =>
  value === 0 ? '0' : (value > 0 ? '+' : '') + formatNumber(value, digits);

/** Seconds as 4:05 or 1:02:03; for axes and strips. */
export function formatClock(seconds: number): string {
  const sign = seconds < 0 ? '−' : '';
  const total = Math.round(Math.abs(seconds));
  const [h, m, s] = [Math.floor(total / 3600), Math.floor((total % 3600) / 60), total % 60];
  const two = (n: number) => String(n).padStart(2, '0');
  return sign + (h > 0 ? `${h}:${two(m)}:${two(s)}` : `${m}:${two(s)}`);
}

/** Seconds as "20 min 40 s", "7 h 58 min". */
export function formatDuration(seconds: number): string {
  if (seconds < 60) return `${formatNumber(seconds, seconds < 10 ? 2 : 3)} s`;
  const total = Math.round(seconds);
  const [h, m, s] = [Math.floor(total / 3600), Math.floor((total % 3600) / 60), total % 60];
  if (h > 0) return m > 0 ? `${h} h ${m} min` : `${h} h`;
  return s > 0 ? `${m} min ${s} s` : `${m} min`;
}

/** Bytes in decimal units. */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  const units = ['kB', 'MB', 'GB', 'TB'];
  const step = Math.min(units.length, Math.floor(Math.log10(bytes) / 3));
  return `${formatNumber(bytes / 1000 ** step, 3)} ${units[step - 1]}`;
}

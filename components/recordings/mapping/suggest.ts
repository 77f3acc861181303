/** First guesses for a file that the intake could not map by itself: the header that looks most like a channel. */

const PATTERNS = {
  time: [/^time/i, /time|stamp|epoch|clock/i, /^t(_|$)/i],
  gyroX: [/gyr.*x|ang.*x|rate.*x|omega.*x/i, /^w_?x/i],
  gyroY: [/gyr.*y|ang.*y|rate.*y|omega.*y/i, /^w_?y/i],
  gyroZ: [/gyr.*z|ang.*z|rate.*z|omega.*z/i, /^w_?z/i],
  accelX: [/acc.*x|force.*x/i, /^[af]_?x/i],
  accelY: [/acc.*y|force.*y/i, /^[af]_?y/i],
  accelZ: [/acc.*z|force.*z/i, /^[af]_?z/i],
  lat: [/lat/i],
  lon: [/lon|lng/i],
  height: [/height|hgt|alt|ellip/i, /^h(_|$)/i],
} as const;
export type Suggestable = keyof typeof PATTERNS;

/** The header that suits, or '' when none does: then the person chooses. */
export function suggestColumn(headers: readonly string[], channel: Suggestable): string {
  for (const pattern of PATTERNS[channel]) {
    const hit = headers.find((header) => pattern.test(header));
    if (hit !== undefined) return hit;
  }
  return '';
}

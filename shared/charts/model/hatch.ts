/** The diagonal hatching of coasting ground, as one path string: no pattern ids to clash, and testable. */

/**
 * Lines at 45° (rising to the right), `spacingPx` apart along x, clipped to the rectangle.
 * They are anchored to the page's origin, so that hatching does not crawl while a window is dragged.
 */
export function hatchPath(
  left: number,
  top: number,
  width: number,
  height: number,
  spacingPx: number,
): string {
  if (!(width > 0) || !(height > 0)) return '';
  const [right, bottom] = [left + width, top + height];
  // A line is x + y = c; it crosses the rectangle while c lies between its top left and bottom right corners.
  const first = Math.ceil((left + top) / spacingPx) * spacingPx;
  let path = '';
  for (let c = first; c < right + bottom; c += spacingPx) {
    const x0 = Math.max(left, c - bottom);
    const x1 = Math.min(right, c - top);
    if (x1 > x0) path += `M${px(x0)} ${px(c - x0)}L${px(x1)} ${px(c - x1)}`;
  }
  return path;
}

/** A pixel with one decimal: finer is not seen and only lengthens the string. */
export const px = (value: number): number => Math.round(value * 10) / 10;

/** The same as text. Writing a fraction costs far more than finding it: each is written once. */
export function pxText(value: number): string {
  const tenths = Math.round(value * 10);
  if (!(tenths >= 0 && tenths < MOST_TENTHS)) return String(tenths / 10);
  return (written[tenths] ??= String(tenths / 10));
}

/** A screen of 4000 px: more than that is off it. */
const MOST_TENTHS = 40_000;
const written: string[] = [];

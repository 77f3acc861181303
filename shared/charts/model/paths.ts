/** Path strings of lines, bands, areas and marks. Coordinates are pixels with one decimal. */
import { px, pxText } from './hatch';
import type { Polyline } from './decimate';

/** An open line; NaN breaks it. A point alone becomes a dot (a stroke of no length with round caps). */
export function linePath(line: Polyline): string {
  let path = '';
  let open = false;
  for (let i = 0; i < line.length; i++) {
    const y = line.y[i]!;
    if (Number.isNaN(y)) {
      open = false;
      continue;
    }
    const point = `${pxText(line.x[i]!)} ${pxText(y)}`;
    const alone = !open && (i + 1 >= line.length || Number.isNaN(line.y[i + 1]!));
    path += alone ? `M${point}h0` : (open ? 'L' : 'M') + point;
    open = true;
  }
  return path;
}

/** The ground between `upper` and `lower`, each with its own points; both break at the same places. */
export function bandPath(upper: Polyline, lower: Polyline): string {
  const [tops, bottoms] = [pieces(upper), pieces(lower)];
  return tops
    .map((top, i) => (bottoms[i] ? `${joined(top)}L${joined(bottoms[i].reverse()).slice(1)}Z` : ''))
    .join('');
}

/** The ground between `line` and the horizontal `baseY`. */
export function areaPath(line: Polyline, baseY: number): string {
  return pieces(line)
    .map((piece) => {
      const [start, end] = [piece[0]!, piece[piece.length - 1]!];
      return `M${px(start.x)} ${px(baseY)}L${joined(piece).slice(1)}L${px(end.x)} ${px(baseY)}Z`;
    })
    .join('');
}

/** Small filled discs. Strokes of no length with round caps: as short as a mark can be written. */
export function dotsPath(xs: ArrayLike<number>, ys: ArrayLike<number>, count: number): string {
  let path = '';
  for (let i = 0; i < count; i++) path += `M${pxText(xs[i]!)} ${pxText(ys[i]!)}h0`;
  return path;
}

/** Hollow diamonds of half-diagonal `r`. */
export function diamondsPath(xs: ArrayLike<number>, ys: ArrayLike<number>, count: number, r: number): string {
  let path = '';
  for (let i = 0; i < count; i++)
    path += `M${px(xs[i]!)} ${px(ys[i]! - r)}l${r} ${r}l${-r} ${r}l${-r} ${-r}Z`;
  return path;
}

/** A horizontal rule. */
export const rulePath = (left: number, right: number, y: number): string =>
  `M${px(left)} ${px(y)}H${px(right)}`;

/** An ellipse's outline: centre, semi-axes and the turn of the first one from +x towards +y (page down), radians. */
export function ellipsePath(cx: number, cy: number, a: number, b: number, turn: number): string {
  const degrees = px((turn * 180) / Math.PI);
  const [dx, dy] = [a * Math.cos(turn), a * Math.sin(turn)];
  const arc = (x: number, y: number) => `A${px(a)} ${px(b)} ${degrees} 0 1 ${px(x)} ${px(y)}`;
  return `M${px(cx + dx)} ${px(cy + dy)}${arc(cx - dx, cy - dy)}${arc(cx + dx, cy + dy)}Z`;
}

interface Point {
  x: number;
  y: number;
}

function pieces(line: Polyline): Point[][] {
  const result: Point[][] = [];
  let current: Point[] | null = null;
  for (let i = 0; i < line.length; i++) {
    const y = line.y[i]!;
    if (Number.isNaN(y)) {
      current = null;
      continue;
    }
    if (!current) result.push((current = []));
    current.push({ x: line.x[i]!, y });
  }
  return result;
}

const joined = (points: Point[]) =>
  points.map((p, i) => `${i === 0 ? 'M' : 'L'}${pxText(p.x)} ${pxText(p.y)}`).join('');

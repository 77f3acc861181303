import { polylineBuffer, type Polyline } from '@/shared/charts/model/decimate';
import { hatchPath } from '@/shared/charts/model/hatch';
import {
  areaPath,
  bandPath,
  diamondsPath,
  dotsPath,
  ellipsePath,
  linePath,
} from '@/shared/charts/model/paths';

function polyline(points: [number, number][]): Polyline {
  const line = polylineBuffer(points.length);
  points.forEach(([x, y], i) => {
    line.x[i] = x;
    line.y[i] = y;
  });
  line.length = points.length;
  return line;
}

describe('path strings', () => {
  it('draws a line, broken where a value is missing, and a point alone as a dot', () => {
    const line = polyline([
      [0, 1],
      [1, 2.04],
      [2, NaN],
      [3, 4],
    ]);
    expect(linePath(line)).toBe('M0 1L1 2M3 4h0');
  });

  it('closes a band along its lower edge backwards', () => {
    const upper = polyline([
      [0, 1],
      [10, 2],
    ]);
    const lower = polyline([
      [0, 9],
      [10, 8],
    ]);
    expect(bandPath(upper, lower)).toBe('M0 1L10 2L10 8L0 9Z');
  });

  it('draws an area down to its base, one for each piece', () => {
    const line = polyline([
      [0, 5],
      [5, 3],
      [6, NaN],
      [7, 2],
      [9, 1],
    ]);
    expect(areaPath(line, 10)).toBe('M0 10L0 5L5 3L5 10ZM7 10L7 2L9 1L9 10Z');
  });

  it('centres dots and diamonds on their values', () => {
    expect(dotsPath([1], [2], 1)).toBe('M1 2h0');
    expect(diamondsPath([10], [20], 1, 4)).toBe('M10 16l4 4l-4 4l-4 -4Z');
  });

  it('draws an ellipse through the ends of its first axis', () => {
    expect(ellipsePath(50, 50, 20, 10, 0)).toBe('M70 50A20 10 0 0 1 30 50A20 10 0 0 1 70 50Z');
  });
});

describe('hatchPath', () => {
  const numbers = (path: string) =>
    [...path.matchAll(/[ML]([\d.-]+) ([\d.-]+)/g)].map((m) => [+m[1]!, +m[2]!]);

  it('stays inside its rectangle and rises at 45°', () => {
    const points = numbers(hatchPath(13, 7, 30, 20, 8));
    expect(points.length).toBeGreaterThan(4);
    for (const [x, y] of points) {
      expect(x).toBeGreaterThanOrEqual(13);
      expect(x).toBeLessThanOrEqual(43);
      expect(y).toBeGreaterThanOrEqual(7);
      expect(y).toBeLessThanOrEqual(27);
    }
    for (let i = 0; i < points.length; i += 2)
      expect(points[i]![0]! + points[i]![1]!).toBeCloseTo(points[i + 1]![0]! + points[i + 1]![1]!, 6);
  });

  it('does not crawl when the rectangle moves: lines stay on the same diagonals', () => {
    const diagonals = (left: number) => numbers(hatchPath(left, 0, 30, 20, 8)).map(([x, y]) => (x! + y!) % 8);
    expect(new Set(diagonals(10))).toEqual(new Set([0]));
    expect(new Set(diagonals(13))).toEqual(new Set([0]));
  });

  it('is empty for an empty rectangle', () => expect(hatchPath(0, 0, 0, 10, 8)).toBe(''));
});

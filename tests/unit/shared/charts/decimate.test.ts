import { decimate, polylineBuffer } from '@/shared/charts/model/decimate';
import { columnSeries } from '@/shared/charts/model/series';
import { linearScale } from '@/shared/charts/model/scale';

const x = linearScale([0, 1000], [0, 100]);
const y = linearScale([-10, 10], [200, 0]);

function series(count: number, value: (i: number) => number) {
  const time = Float64Array.from({ length: count }, (_, i) => (i * 1000) / count);
  return columnSeries(
    time,
    Float32Array.from({ length: count }, (_, i) => value(i)),
    count,
  );
}

describe('decimate', () => {
  it('keeps a one-sample spike among 200 000 points, at its own pixel', () => {
    const flat = series(200_000, (i) => (i === 123_456 ? 9 : 0));
    const line = decimate({ series: flat, fromS: 0, toS: 1000, x, y }, polylineBuffer());
    const top = Math.min(...line.y.subarray(0, line.length));
    const at = line.x[line.y.indexOf(top)]!;
    expect(top).toBeCloseTo(y(9), 6);
    expect(at).toBeCloseTo(x((123_456 * 1000) / 200_000), 6);
  });

  it('writes at most four points a pixel column', () => {
    const noise = series(50_000, (i) => Math.sin(i * 12.9898) * 8);
    const line = decimate({ series: noise, fromS: 0, toS: 1000, x, y }, polylineBuffer());
    expect(line.length).toBeLessThanOrEqual(4 * 101);
    expect(line.length).toBeGreaterThan(2 * 99);
  });

  it('leaves few points as they are, in order', () => {
    const few = series(10, (i) => i);
    const line = decimate({ series: few, fromS: 0, toS: 1000, x, y }, polylineBuffer());
    expect(Array.from(line.x.subarray(0, line.length))).toEqual([0, 10, 20, 30, 40, 50, 60, 70, 80, 90]);
    expect(Array.from(line.y.subarray(0, line.length))).toEqual(
      Array.from({ length: 10 }, (_, i) => 100 - 10 * i),
    );
  });

  it('draws one point beyond each edge of a zoomed view, so that lines run out of the plot', () => {
    const line = decimate({ series: series(10, (i) => i), fromS: 250, toS: 450, x, y }, polylineBuffer());
    expect(Array.from(line.x.subarray(0, line.length))).toEqual([20, 30, 40, 50]);
  });

  it('breaks at missing values and at the edges it is given', () => {
    const holed = series(10, (i) => (i === 4 ? NaN : i));
    const line = decimate({ series: holed, fromS: 0, toS: 1000, x, y, breaksS: [750] }, polylineBuffer());
    const broken = Array.from(line.x.subarray(0, line.length)).filter((_, i) => Number.isNaN(line.y[i]));
    expect(broken).toEqual([40, 80]);
  });

  it('grows its buffer instead of losing points', () => {
    const noise = series(50_000, (i) => Math.cos(i * 7.13));
    const small = decimate({ series: noise, fromS: 0, toS: 1000, x, y }, polylineBuffer(8));
    const roomy = decimate({ series: noise, fromS: 0, toS: 1000, x, y }, polylineBuffer());
    expect(small.length).toBe(roomy.length);
  });
});

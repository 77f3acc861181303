import {
  planeExtent,
  planeOf,
  scaleBar,
  sigmaEllipse,
  trackFrame,
  trackPath,
  type PlanePoints,
} from '@/shared/charts/model/track';

const track = (points: [number, number][]): PlanePoints => ({
  length: points.length,
  north: (i) => points[i]![0],
  east: (i) => points[i]![1],
});
const box = { width: 300, height: 200, margin: 20 };

describe('the frame', () => {
  it('has one scale for both axes, north up, and fits the longer side', () => {
    const frame = trackFrame({ north: [0, 80], east: [0, 520] }, box);
    expect(frame.scale).toBeCloseTo(0.5, 9);
    expect([frame.x(0), frame.x(520)]).toEqual([20, 280]);
    expect(frame.y(80)).toBeLessThan(frame.y(0));
    expect(frame.y(0) - frame.y(80)).toBeCloseTo(40, 9);
    expect(frame.eastAt(frame.x(123))).toBeCloseTo(123, 9);
    expect(frame.northAt(frame.y(45))).toBeCloseTo(45, 9);
  });

  it('gives a standing vehicle a few metres of ground instead of an endless zoom', () => {
    const frame = trackFrame({ north: [3, 3.01], east: [7, 7.01] }, box);
    expect(frame.scale).toBeCloseTo(160 / 5, 6);
  });

  it('takes in all tracks and skips missing points', () => {
    const extent = planeExtent([track([[0, 1], [NaN, 99]]), track([[-5, 4]])]); // prettier-ignore
    expect(extent).toEqual({ north: [-5, 0], east: [1, 4] });
    expect(planeExtent([track([])])).toBeNull();
  });
});

describe('the path', () => {
  const frame = trackFrame({ north: [0, 160], east: [0, 260] }, box);

  it('goes through its points, and lifts the pen where it is told or a point is missing', () => {
    const points = track([[0, 0], [0, 100], [NaN, 0], [50, 100], [50, 200]]); // prettier-ignore
    expect(trackPath(points, frame)).toBe('M20 180L120 180M120 130L220 130');
    expect(trackPath(track([[0, 0], [0, 50], [0, 100]]), frame, { cut: (i) => i === 1 })).toBe('M20 180M70 180L120 180'); // prettier-ignore
  });

  it('leaves out what is not seen', () => {
    const crowded = track(Array.from({ length: 1000 }, (_, i): [number, number] => [0, i / 100]));
    expect(trackPath(crowded, frame).match(/[ML]/g)!.length).toBeLessThan(30);
  });
});

describe('σ ellipses', () => {
  const frame = trackFrame({ north: [-80, 80], east: [-130, 130] }, box);

  it('have their long axis along the larger σ', () => {
    const path = sigmaEllipse({ northM: 0, eastM: 0, sigmaN: 30, sigmaE: 10, covNE: 0 }, frame, 1);
    // The first axis (30 px) points north: up and down on the page.
    expect(path).toBe('M150 70A30 10 -90 0 1 150 130A30 10 -90 0 1 150 70Z');
  });

  it('turn with the covariance: positive means north-east', () => {
    const path = sigmaEllipse({ northM: 0, eastM: 0, sigmaN: 20, sigmaE: 20, covNE: 300 }, frame, 1);
    const [, x, y] = /^M([\d.]+) ([\d.]+)A/.exec(path)!.map(Number);
    expect(x! - 150).toBeGreaterThan(10);
    expect(100 - y!).toBeGreaterThan(10);
  });

  it('are left out when too small to be seen', () => {
    expect(sigmaEllipse({ northM: 0, eastM: 0, sigmaN: 0.1, sigmaE: 0.1, covNE: 0 }, frame, 2.45)).toBe('');
  });
});

describe('the scale bar', () => {
  it.each([
    [260, 100, '100 m'],
    [2600, 100, '1 km'],
    [52_000, 100, '20 km'],
    [5, 100, '2 m'],
  ])('over %d m of ground is at most %d px long and round: %s', (east, most, label) => {
    const bar = scaleBar(trackFrame({ north: [0, 1], east: [0, east] }, box), most);
    expect(bar.label).toBe(label);
    expect(bar.widthPx).toBeLessThanOrEqual(most);
    expect(bar.widthPx).toBeGreaterThan(most / 2.6);
  });
});

it('a hundredth of a degree is as long as the ellipsoid says', () => {
  // WGS-84 at 47.21° N: radii of curvature 6 369 851 m (meridian) and 6 389 661 m (prime vertical).
  const { north, east } = planeOf({ latDeg: 47.21, lonDeg: -14.63 }, 47.22, -14.62);
  expect(north).toBeCloseTo((0.01 * Math.PI * 6_369_851) / 180, 0);
  expect(east).toBeCloseTo((0.01 * Math.PI * 6_389_661 * Math.cos((47.21 * Math.PI) / 180)) / 180, 0);
});

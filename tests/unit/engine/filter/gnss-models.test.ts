import { quatFromEuler, quatFromRotationVector, quatMultiply } from '@/workers/engine/attitude';
import { meridianRadius, transverseRadius } from '@/workers/engine/geodesy';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { GnssModels } from '@/workers/engine/filter/gnss-models';
import { MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { STATES } from '@/workers/engine/filter/states';
import { HEIGHT, LAT, LON, NAV_SIZE, QUAT, VN } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';
import { defaultParameters } from '@/shared/contracts/parameters';
import type { GnssColumns } from '@/workers/engine/types';

const LEVER = [1, 0.5, -0.3] as const;

function gnssRow(
  values: Partial<Record<'lat' | 'lon' | 'h' | 'vn' | 've' | 'vd' | 'sigma', number>>,
): GnssColumns {
  const one = (x: number | undefined) => Float64Array.of(x ?? NaN);
  const three = (x: number | undefined) => [one(x), one(x), one(x)] as const;
  return {
    timeS: one(0),
    latRad: one(values.lat),
    lonRad: one(values.lon),
    heightM: one(values.h),
    velocityNed: [one(values.vn), one(values.ve), one(values.vd)],
    positionSigma: three(values.sigma),
    velocitySigma: three(values.sigma),
  };
}

function startNav(): Float64Array {
  const nav = new Float64Array(NAV_SIZE);
  nav.set([0.8, -0.25, 120, 12, -4, 0.5]);
  nav.set(quatFromEuler(0.1, -0.2, 2.1, new Float64Array(4)), QUAT);
  return nav;
}

function disturbed(error: Float64Array): Strapdown {
  const nav = startNav();
  const rm = meridianRadius(nav[LAT]!) + nav[HEIGHT]!;
  const rn = transverseRadius(nav[LAT]!) + nav[HEIGHT]!;
  nav[LON] = nav[LON]! + error[1]! / (rn * Math.cos(nav[LAT]!));
  nav[LAT] = nav[LAT]! + error[0]! / rm;
  nav[HEIGHT] = nav[HEIGHT]! - error[2]!;
  for (let i = 0; i < 3; i += 1) nav[VN + i] = nav[VN + i]! + error[3 + i]!;
  const turn = quatFromRotationVector(-error[6]!, -error[7]!, -error[8]!, new Float64Array(4));
  nav.set(quatMultiply(turn, nav.slice(QUAT, QUAT + 4), new Float64Array(4)), QUAT);
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(nav);
  return strapdown;
}

const fixes = prepareFixes(
  gnssRow({ lat: 0.8, lon: -0.25, h: 120, vn: 12, ve: -4, vd: 0.5, sigma: 1 }),
  defaultParameters().gnss,
);
const models = new GnssModels(LEVER, 0);
const RATE = [0.2, -0.3, 0.5];

/** Innovation with an error (computed minus true) in the state; a gyro bias error shows as a wrong rate. */
function innovation(kind: 'position' | 'velocity', error: Float64Array): MeasurementUpdate {
  const update = new MeasurementUpdate();
  const strapdown = disturbed(error);
  if (kind === 'position') models.position(strapdown, fixes, 0, 7, update);
  else
    models.velocity(
      strapdown,
      Float64Array.from(RATE, (w, i) => w - error[9 + i]!),
      fixes,
      0,
      7,
      update,
    );
  return update;
}

test.each(['position', 'velocity'] as const)('H of %s is the derivative of its innovation', (kind) => {
  const h = innovation(kind, new Float64Array(STATES)).h;
  for (let j = 0; j < STATES; j += 1) {
    const size = j < 6 ? 1 : 1e-4;
    const error = new Float64Array(STATES);
    error[j] = size;
    const plus = innovation(kind, error).innovation;
    error[j] = -size;
    const minus = innovation(kind, error).innovation;
    // ν = −H δx
    for (let i = 0; i < 3; i += 1)
      expect(Math.abs(h[i * STATES + j]! + (plus[i]! - minus[i]!) / (2 * size))).toBeLessThan(1e-4);
  }
});

test('R-12 the antenna of a turning vehicle: ω × l', () => {
  const level = new Strapdown('coning-sculling');
  const nav = startNav();
  nav.set([0, 0, 0], VN);
  nav.set([1, 0, 0, 0], QUAT);
  level.start(nav);
  const still = prepareFixes(gnssRow({ vn: 0, ve: 0, vd: 0, sigma: 1 }), defaultParameters().gnss);
  const update = new MeasurementUpdate();
  models.velocity(level, Float64Array.of(0, 0, 0.5), still, 0, 7, update);
  // ω (0, 0, 0.5) rad/s, l (1, 0.5, −0.3) m: (−0.25, 0.5, 0) m/s; the Earth's own turn adds below 1e-4.
  expect(update.innovation[0]).toBeCloseTo(0.25, 3);
  expect(update.innovation[1]).toBeCloseTo(-0.5, 3);
  expect(update.innovation[2]).toBeCloseTo(0, 3);
});

test('a fix without down velocity or height measures two rows', () => {
  const flat = prepareFixes(
    gnssRow({ lat: 0.8, lon: -0.25, vn: 3, ve: 1, sigma: 1 }),
    defaultParameters().gnss,
  );
  expect([flat.positionAxes[0], flat.velocityAxes[0]]).toEqual([3, 3]);
  const update = new MeasurementUpdate();
  models.position(disturbed(new Float64Array(STATES)), flat, 0, 3, update);
  expect(update.rows).toBe(2);
});

describe('R', () => {
  const gnss = defaultParameters().gnss;
  const variance = (own: number, changes: Partial<typeof gnss>) =>
    prepareFixes(gnssRow({ lat: 0.8, lon: -0.25, h: 1, vn: 0, ve: 0, vd: 0, sigma: own }), {
      ...gnss,
      ...changes,
    });

  test('is (σ × scale)² of the receiver, never below the floor', () => {
    expect(variance(2, { positionScale: 1.5 }).positionVariance[0]).toBeCloseTo(9, 12);
    expect(variance(0.001, { positionFloorM: 0.05 }).positionVariance[2]).toBeCloseTo(0.0025, 12);
    expect(variance(0.2, { velocityScale: 0.5 }).velocityVariance[1]).toBeCloseTo(0.01, 12);
  });

  test('is the fixed one where the receiver gives none or the parameters say so', () => {
    expect(variance(NaN, { positionSigmaVerticalM: 4 }).positionVariance[2]).toBeCloseTo(16, 12);
    expect(variance(0, { velocitySigmaHorizontalMPerS: 0.3 }).velocityVariance[0]).toBeCloseTo(0.09, 12);
    expect(
      variance(2, { sigmaSource: 'fixed', positionSigmaHorizontalM: 3 }).positionVariance[0],
    ).toBeCloseTo(9, 12);
  });
});

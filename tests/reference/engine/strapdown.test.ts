/** Worked cases of the mechanisation with exact answers, and the classical coning and sculling motions. */
import { degToRad } from '@/shared/units';
import { quatFromEuler, quatFromRotationVector, quatMultiply } from '@/workers/engine/attitude';

import { normalGravity } from '@/workers/engine/gravity';
import { ImuIntervals, INTERVAL_SIZE } from '@/workers/engine/strapdown/imu-intervals';
import { formIncrements } from '@/workers/engine/strapdown/increments';
import { localEarth } from '@/workers/engine/strapdown/local-earth';
import { HEIGHT, LAT, LON, NAV_SIZE, QUAT, VD, VE, VN } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';
import { meridianRadius, transverseRadius } from '@/workers/engine/geodesy';

type Three = readonly [number, number, number];

function constantImu(durationS: number, rateHz: number, rate: Three, force: Three): ImuIntervals {
  const n = Math.round(durationS * rateHz) + 1;
  const column = (x: number) => new Float64Array(n).fill(x);
  return new ImuIntervals({
    timeS: Float64Array.from({ length: n }, (_, k) => k / rateHz),
    gyro: [column(rate[0]), column(rate[1]), column(rate[2])],
    accel: [column(force[0]), column(force[1]), column(force[2])],
    sampling: 'mean-rate',
  });
}

function run(nav: Float64Array, intervals: ImuIntervals): Strapdown {
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(nav);
  for (let k = 1; k < intervals.imu.timeS.length; k += 1) {
    intervals.load(k);
    strapdown.advance(intervals.interval, 0, 1);
  }
  return strapdown;
}

function quaternionError(nav: Float64Array, q: Float64Array): number {
  const dot = Math.abs(
    nav[QUAT]! * q[0]! + nav[QUAT + 1]! * q[1]! + nav[QUAT + 2]! * q[2]! + nav[QUAT + 3]! * q[3]!,
  );
  const cross = quatMultiply(
    Float64Array.of(nav[QUAT]!, -nav[QUAT + 1]!, -nav[QUAT + 2]!, -nav[QUAT + 3]!),
    q,
    new Float64Array(4),
  );
  return dot > 0.5 ? 2 * Math.hypot(cross[1]!, cross[2]!, cross[3]!) : Math.PI;
}

test('R-14 steady flight east at 45°: 600 s at 200 Hz change nothing but the longitude', () => {
  // Titterton & Weston 2004, ch. 3: inputs from ω_ie, ω_en, Coriolis and normal gravity at the point.
  const nav = new Float64Array(NAV_SIZE);
  nav.set([degToRad(45), 0.2, 1000, 0, 200, 0]);
  const q = quatFromEuler(0, 0, degToRad(90), new Float64Array(4));
  nav.set(q, QUAT);
  const end = run(
    nav,
    constantImu(
      600,
      200,
      [0, -8.286273628761785e-5, -8.286273628761784e-5],
      [0, -0.026885155188908, -9.776227788367919],
    ),
  ).nav;
  expect(Math.abs(end[LAT]! - nav[LAT]!) * 6.37e6).toBeLessThan(1e-3);
  expect(Math.abs(end[LON]! - 0.2 - 4.426445547329436e-5 * 600) * 4.5e6).toBeLessThan(1e-3);
  expect(Math.abs(end[HEIGHT]! - 1000)).toBeLessThan(1e-3);
  expect(Math.abs(end[VN]!)).toBeLessThan(1e-6);
  expect(Math.abs(end[VE]! - 200)).toBeLessThan(1e-6);
  expect(Math.abs(end[VD]!)).toBeLessThan(1e-6);
  expect(quaternionError(end, q)).toBeLessThan(1e-9);
});

test('R-15 an hour at rest on the turning Earth', () => {
  const lat = degToRad(45);
  const g = normalGravity(lat, 100);
  // yaw 30°, pitch 20°, roll 10°; the printed force is for g 9.80665.
  const force = [3.35407183854467, -1.6002090492413, -9.07523648854992].map((f) => (f * g) / 9.80665);
  const nav = new Float64Array(NAV_SIZE);
  nav.set([lat, 0, 100]);
  const q = quatFromEuler(degToRad(10), degToRad(20), degToRad(30), new Float64Array(4));
  nav.set(q, QUAT);
  const end = run(
    nav,
    constantImu(
      3600,
      100,
      [5.95974803298958e-5, -3.11515794937838e-5, -2.81995310367503e-5],
      force as unknown as Three,
    ),
  ).nav;
  expect(Math.abs(end[LAT]! - lat) * 6.37e6).toBeLessThan(1e-3);
  expect(Math.abs(end[LON]!) * 4.5e6).toBeLessThan(1e-3);
  expect(Math.abs(end[HEIGHT]! - 100)).toBeLessThan(1e-3);
  expect(Math.hypot(end[VN]!, end[VE]!, end[VD]!)).toBeLessThan(1e-6);
  expect(quaternionError(end, q)).toBeLessThan(1e-9);
});

test('radii and gravity of the strapdown are those of the geodesy', () => {
  for (const latDeg of [-60, 0, 33, 71]) {
    const lat = degToRad(latDeg);
    const out = new Float64Array(3);
    localEarth(Math.sin(lat) ** 2, 2500, out);
    expect(out[0]! / (meridianRadius(lat) + 2500)).toBeCloseTo(1, 14);
    expect(out[1]! / (transverseRadius(lat) + 2500)).toBeCloseTo(1, 14);
    expect(out[2]! / normalGravity(lat, 2500)).toBeCloseTo(1, 14);
  }
});

/** Increments of two successive intervals of equal length as one interval with its bend. */
function intervalOf(previous: readonly number[], current: readonly number[], dt: number): Float64Array {
  const out = new Float64Array(INTERVAL_SIZE);
  out[0] = dt;
  current.forEach((x, i) => {
    out[1 + i] = x;
    out[7 + i] = (x - previous[i]!) / 2;
  });
  return out;
}

const NO_BIAS = new Float64Array(NAV_SIZE);

describe('T-17 coning, previous-increment algorithm (Miller 1983; Ignagni 1990)', () => {
  test.each([
    { aDeg: 1, hz: 10, dt: 0.01, none: -6.172027964e-4, previous: -4.742088537e-5 },
    { aDeg: 1, hz: 10, dt: 0.005, none: -1.566029273e-4, previous: -3.070184679e-6 },
    { aDeg: 1, hz: 1, dt: 0.01, none: -6.293860842e-7, previous: -4.968016e-10 },
    { aDeg: 0.1, hz: 50, dt: 0.001, none: -7.832106791e-6, previous: -1.535494789e-7 },
  ])('$aDeg° at $hz Hz, T $dt s', ({ aDeg, hz, dt, none, previous }) => {
    const a = degToRad(aDeg);
    const omega = 2 * Math.PI * hz;
    // ∫ of ω = (−2Ω sin²(a/2), −Ω sin a sin Ωt, Ω sin a cos Ωt) by product formulas.
    const increment = (t0: number) => {
      const half = Math.sin((omega * dt) / 2);
      const middle = omega * (t0 + dt / 2);
      return [
        -2 * omega * Math.sin(a / 2) ** 2 * dt,
        -2 * Math.sin(a) * Math.sin(middle) * half,
        2 * Math.sin(a) * Math.cos(middle) * half,
        0, 0, 0,
      ]; // prettier-ignore
    };
    const truth = (t: number) =>
      Float64Array.of(
        Math.cos(a / 2),
        0,
        Math.sin(a / 2) * Math.cos(omega * t),
        Math.sin(a / 2) * Math.sin(omega * t),
      );
    const drift = (corrected: boolean) => {
      const q = truth(0);
      const out = new Float64Array(6);
      const turn = new Float64Array(4);
      const steps = Math.round(1 / dt);
      for (let k = 0; k < steps; k += 1) {
        const interval = intervalOf(increment((k - 1) * dt), increment(k * dt), dt);
        formIncrements(interval, 0, 1, NO_BIAS, corrected, out);
        quatMultiply(q, quatFromRotationVector(out[0]!, out[1]!, out[2]!, turn), q);
      }
      const back = truth(1);
      for (let i = 1; i < 4; i += 1) back[i] = -back[i]!;
      return 2 * quatMultiply(back, q, new Float64Array(4))[1]!;
    };
    expect(Math.abs(drift(false) - none)).toBeLessThan(1e-4 * Math.abs(none) + 1e-13);
    expect(Math.abs(drift(true) - previous)).toBeLessThan(1e-4 * Math.abs(previous) + 1e-13);
  });
});

describe('T-22 sculling, previous-increment algorithm (Savage 1998)', () => {
  // Rotation θ0 sin Ωt about x, force A sin Ωt along y: mean acceleration along n-z is A·J1(θ0).
  test.each([
    {
      thetaDeg: 1,
      force: 10,
      hz: 10,
      dt: 0.01,
      mean: 0.0872631397813074,
      half: -0.00562881399,
      previous: -4.321267e-4,
    },
    {
      thetaDeg: 1,
      force: 10,
      hz: 10,
      dt: 0.005,
      mean: 0.0872631397813074,
      half: -0.00142819425,
      previous: -2.789643e-5,
    },
  ])('$thetaDeg°, $force m/s², $hz Hz, T $dt s', ({ thetaDeg, force, hz, dt, mean, half, previous }) => {
    const theta = degToRad(thetaDeg);
    const omega = 2 * Math.PI * hz;
    const increment = (t0: number) => {
      const s = Math.sin((omega * dt) / 2);
      const middle = omega * (t0 + dt / 2);
      return [2 * theta * Math.cos(middle) * s, 0, 0, 0, ((2 * force) / omega) * Math.sin(middle) * s, 0];
    };
    const error = (corrected: boolean) => {
      const out = new Float64Array(6);
      let sum = 0;
      const steps = Math.round(1 / dt);
      for (let k = 0; k < steps; k += 1) {
        const angle = theta * Math.sin(omega * k * dt);
        formIncrements(
          intervalOf(increment((k - 1) * dt), increment(k * dt), dt),
          0,
          1,
          NO_BIAS,
          corrected,
          out,
        );
        sum += Math.sin(angle) * out[4]! + Math.cos(angle) * out[5]!;
      }
      return sum - mean;
    };
    // The table keeps the rotation term to first order; the second, kept here, moves the last per cent.
    expect(Math.abs(error(false) / half - 1)).toBeLessThan(0.01);
    expect(Math.abs(error(true) / previous - 1)).toBeLessThan(0.03);
  });
});

test.each([
  {
    dtheta: [0.02, -0.01, 0.05],
    dv: [0.1, -0.2, -0.05],
    exact: [0.1052036943807608, -0.1969032645489594, -0.05146213066209622],
  },
  {
    dtheta: [0.003, 0.001, -0.004],
    dv: [0.02, 0.01, -0.049],
    exact: [0.01999554634302309, 0.01003350092741543, -0.04899496501087882],
  },
])(
  'T-23 rotation compensation for constant rate and force, closed form (Savage 1998)',
  ({ dtheta, dv, exact }) => {
    const interval = intervalOf([...dtheta, ...dv], [...dtheta, ...dv], 0.01);
    const out = new Float64Array(6);
    formIncrements(interval, 0, 1, NO_BIAS, true, out);
    exact.forEach((value, i) => expect(Math.abs(out[3 + i]! - value)).toBeLessThan(1e-14));
  },
);

test('parts of an interval add up to the whole', () => {
  const previous = [0.011, -0.02, 0.03, 0.1, -0.05, -0.098];
  const current = [0.013, -0.017, 0.036, 0.12, -0.03, -0.1];
  const interval = intervalOf(previous, current, 0.01);
  const whole = new Float64Array(6);
  formIncrements(interval, 0, 1, NO_BIAS, true, whole);
  const q = Float64Array.of(1, 0, 0, 0);
  const v = [0, 0, 0];
  const part = new Float64Array(6);
  const cuts = [0, 0.13, 0.6, 1];
  for (let i = 1; i < cuts.length; i += 1) {
    formIncrements(interval, cuts[i - 1]!, cuts[i]!, NO_BIAS, true, part);
    const rotated = rotate(q, [part[3]!, part[4]!, part[5]!]);
    for (let a = 0; a < 3; a += 1) v[a] = v[a]! + rotated[a]!;
    quatMultiply(q, quatFromRotationVector(part[0]!, part[1]!, part[2]!, new Float64Array(4)), q);
  }
  const once = quatFromRotationVector(whole[0]!, whole[1]!, whole[2]!, new Float64Array(4));
  for (let i = 0; i < 4; i += 1) expect(Math.abs(q[i]! - once[i]!)).toBeLessThan(2e-7);
  for (let i = 0; i < 3; i += 1) expect(Math.abs(v[i]! - whole[3 + i]!)).toBeLessThan(2e-6);
});

function rotate(q: Float64Array, v: readonly number[]): number[] {
  const pure = Float64Array.of(0, v[0]!, v[1]!, v[2]!);
  const conjugate = Float64Array.of(q[0]!, -q[1]!, -q[2]!, -q[3]!);
  const half = quatMultiply(q, pure, new Float64Array(4));
  return [...quatMultiply(half, conjugate, new Float64Array(4))].slice(1);
}

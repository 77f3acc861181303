/** The simulated receiver: where the antenna is, and how wrong it says so. */
import { nedOffset } from '@/workers/engine/geodesy';
import { dcmFromQuat, quatFromEuler } from '@/workers/engine/attitude';
import { createRandom } from '@/workers/engine/random';
import { simulateGnss, type GnssOptions, type SimulatedGnss } from '@/workers/engine/simulator/gnss';
import { inverseMechanisation } from '@/workers/engine/simulator/inverse';
import { multirotorMotion } from '@/workers/engine/simulator/motions/multirotor';
import { roadMotion } from '@/workers/engine/simulator/motions/road';
import { staticMotion } from '@/workers/engine/simulator/motions/static';
import { averageBounds, shareHalfWidth } from '@/workers/engine/statistics/consistency';
import { autocorrelation } from '@/workers/engine/statistics/correlation';
import { gnssErrorsSchema } from '@/shared/contracts/scenarios';

const place = { latRad: 0.824, lonRad: -0.255, heightM: 120 };
const base: GnssOptions = { ...gnssErrorsSchema.parse({}), rateHz: 5, leverArmM: [0, 0, 0] };
const exact: Partial<GnssOptions> = {
  positionSigmaHorizontalM: 0,
  positionSigmaVerticalM: 0,
  velocitySigmaHorizontalMPerS: 0,
  velocitySigmaVerticalMPerS: 0,
};
const drive = () =>
  roadMotion({ durationS: 200, staticStartS: 5, initialHeadingRad: 0.6, random: createRandom(1) });
const flight = () =>
  multirotorMotion({ durationS: 100, staticStartS: 2, initialHeadingRad: 1, random: createRandom(2) });
const receive = (options: Partial<GnssOptions>, motion = drive(), endS = 100, seed = 3) =>
  simulateGnss(motion, place, 0, endS, { ...base, ...options }, createRandom(seed));
/** Errors of epoch k, NED metres. */
const positionError = ({ gnss, truth }: SimulatedGnss, k: number) =>
  nedOffset(
    truth.latRad[k]!,
    truth.lonRad[k]!,
    truth.heightM[k]!,
    gnss.latRad[k]!,
    gnss.lonRad[k]!,
    gnss.heightM[k]!,
    new Float64Array(3),
  );

test('without errors it reports the track itself', () => {
  const { gnss } = receive(exact);
  const { truth } = inverseMechanisation(drive(), place, gnss.timeS);
  expect(gnss.timeS.length).toBe(501);
  for (let k = 0; k < 501; k += 10) {
    expect(Math.abs(gnss.latRad[k]! - truth.latRad[k]!) * 6.4e6).toBeLessThan(1e-6);
    expect(gnss.velocityNed[1][k]).toBeCloseTo(truth.velocityNed[1][k]!, 10);
  }
});

test('R-12 the lever arm: position by C·l, velocity as the antenna moves', () => {
  const lever = [0.4, -0.7, -1.2] as const;
  const h = 0.001;
  const motion = flight();
  for (const from of [20, 44.5, 71.2]) {
    // Three fixes h apart: the velocity of the middle one is the difference of the outer ones.
    const { gnss } = receive(
      { ...exact, leverArmM: lever, rateHz: 1 / h, phaseS: from },
      motion,
      from + 2 * h + 1e-9,
    );
    const ned = nedOffset(
      gnss.latRad[0]!,
      gnss.lonRad[0]!,
      gnss.heightM[0]!,
      gnss.latRad[2]!,
      gnss.lonRad[2]!,
      gnss.heightM[2]!,
      new Float64Array(3),
    );
    for (const axis of [0, 1, 2] as const)
      expect(Math.abs(ned[axis]! / (2 * h) - gnss.velocityNed[axis][1]!)).toBeLessThan(1e-4);

    const body = inverseMechanisation(motion, place, Float64Array.of(0, from)).truth;
    const [roll, pitch, yaw] = body.attitude.map((angle) => angle[1]!) as [number, number, number];
    const c = dcmFromQuat(quatFromEuler(roll, pitch, yaw, new Float64Array(4)), new Float64Array(9));
    const arm = nedOffset(
      body.latRad[1]!,
      body.lonRad[1]!,
      body.heightM[1]!,
      gnss.latRad[0]!,
      gnss.lonRad[0]!,
      gnss.heightM[0]!,
      new Float64Array(3),
    );
    for (const axis of [0, 1, 2] as const) {
      const expected = c[3 * axis]! * lever[0] + c[3 * axis + 1]! * lever[1] + c[3 * axis + 2]! * lever[2];
      expect(Math.abs(arm[axis]! - expected)).toBeLessThan(1e-6);
    }
  }
});

test('latency: an epoch reports where the antenna was; velocity may lag on its own', () => {
  const late = receive({ ...exact, latencyS: 0.2 });
  const sharp = receive(exact);
  const lagging = receive({ ...exact, velocityLagS: 0.4 });
  for (let k = 5; k < 500; k += 20) {
    expect(late.gnss.latRad[k]).toBeCloseTo(sharp.gnss.latRad[k - 1]!, 12);
    expect(late.gnss.velocityNed[0][k]).toBeCloseTo(sharp.gnss.velocityNed[0][k - 1]!, 10);
    expect(lagging.gnss.latRad[k]).toBe(sharp.gnss.latRad[k]);
    expect(lagging.gnss.velocityNed[0][k]).toBeCloseTo(sharp.gnss.velocityNed[0][k - 2]!, 10);
  }
});

test('outages take the fixes away, from included, to excluded', () => {
  const { gnss } = receive({
    outagesS: [
      [20, 30],
      [60, 61],
    ],
  });
  expect(gnss.timeS.length).toBe(501 - 50 - 5);
  expect(Array.from(gnss.timeS).some((t) => (t >= 20 && t < 30) || (t >= 60 && t < 61))).toBe(false);
  expect(Array.from(gnss.timeS)).toContain(30);
});

test('white errors are as large as the receiver claims: average normalised squared error in its 95 % bounds', () => {
  const received = receive({}, staticMotion(0), 2000);
  const n = received.gnss.timeS.length;
  const north = new Float64Array(n);
  let position = 0;
  let velocity = 0;
  for (let k = 0; k < n; k += 1) {
    const error = positionError(received, k);
    north[k] = error[0]!;
    for (const axis of [0, 1, 2] as const) {
      position += (error[axis]! / received.gnss.positionSigma[axis][k]!) ** 2;
      const v = received.gnss.velocityNed[axis][k]! - received.truth.velocityNed[axis][k]!;
      velocity += (v / received.gnss.velocitySigma[axis][k]!) ** 2;
    }
  }
  const [low, high] = averageBounds(n, 3);
  for (const average of [position / n, velocity / n]) {
    expect(average).toBeGreaterThan(low);
    expect(average).toBeLessThan(high);
  }
  for (const r of autocorrelation(north, 5)) expect(Math.abs(r)).toBeLessThan(0.04);
});

test('correlated errors: the same spread, correlation e^(−Δt/τ)', () => {
  const received = receive({ correlationTimeS: 20, rateHz: 1 }, staticMotion(0), 20_000);
  const n = received.gnss.timeS.length;
  const east = Float64Array.from({ length: n }, (_, k) => positionError(received, k)[1]!);
  const sigma = Math.sqrt(east.reduce((sum, v) => sum + v * v, 0) / n);
  expect(Math.abs(sigma / 1.5 - 1)).toBeLessThan(0.15);
  const r = autocorrelation(east, 20);
  expect(Math.abs(r[0]! - Math.exp(-1 / 20))).toBeLessThan(0.02);
  expect(Math.abs(r[19]! - Math.exp(-1))).toBeLessThan(0.15);
});

test('outliers: their share and their size, position and velocity apart', () => {
  const received = receive({ outlierShare: 0.02, outlierSigmas: 50 }, staticMotion(0), 4000);
  const n = received.gnss.timeS.length;
  let marked = 0;
  for (let k = 0; k < n; k += 1) {
    const error = positionError(received, k);
    const size = Math.hypot(
      ...[0, 1, 2].map((axis) => error[axis]! / received.gnss.positionSigma[axis as 0][k]!),
    );
    const spoilt = (received.outlier[k]! & 1) === 1;
    if (spoilt) marked += 1;
    if (spoilt !== size > 20) throw new Error(`epoch ${k}: marked ${spoilt}, ${size} σ off`);
  }
  expect(Math.abs(marked / n - 0.02)).toBeLessThan(1.5 * shareHalfWidth(0.02, n));
});

test('a receiver may claim better than it is', () => {
  const { gnss } = receive({ claimedSigmaFactor: 0.5 });
  expect(gnss.positionSigma[0][0]).toBe(0.75);
  expect(gnss.velocitySigma[2][7]).toBe(0.075);
});

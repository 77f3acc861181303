import { Matrix, inverse } from 'ml-matrix';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { nedOffset } from '@/workers/engine/geodesy';
import { AxisTrack, gnssOnlyTrack, whiteJerk } from '@/workers/engine/gnss-only';
import { createRandom } from '@/workers/engine/random';
import { simulateScenario } from '@/workers/engine/simulator/scenario';
import { averageBounds } from '@/workers/engine/statistics/consistency';
import type { GnssColumns } from '@/workers/engine/types';

const drive = simulateScenario(
  scenarioSchema.parse({ durationS: 300, staticStartS: 5, imuRateHz: 10, gnssRateHz: 5 }),
);

/** Errors of the track against the antenna's truth, NED metres, by row. */
const errors = (track: ReturnType<typeof gnssOnlyTrack>) =>
  Array.from(track.timeS, (t, k) => {
    const i = drive.antenna.timeS.indexOf(t);
    const { latRad, lonRad, heightM } = drive.antenna;
    return nedOffset(
      latRad[i]!,
      lonRad[i]!,
      heightM[i]!,
      track.latRad[k]!,
      track.lonRad[k]!,
      track.heightM[k]!,
      new Float64Array(3),
    );
  });
const rmsHorizontal = (list: Float64Array[]) =>
  Math.sqrt(list.reduce((sum, e) => sum + e[0]! ** 2 + e[1]! ** 2, 0) / list.length);

test('Q-03 process noise of white jerk (Bar-Shalom, Li & Kirubarajan 2001, §6.2)', () => {
  expect(whiteJerk(1, 1)).toEqual([
    [1 / 20, 1 / 8, 1 / 6],
    [1 / 8, 1 / 3, 1 / 2],
    [1 / 6, 1 / 2, 1],
  ]);
  const two = whiteJerk(2, 1).flat();
  [1.6, 2, 4 / 3, 2, 8 / 3, 2, 4 / 3, 2, 2].forEach((value, i) => expect(two[i]).toBeCloseTo(value, 14));
});

test('one axis equals a dense filter written with ml-matrix, uneven times and noises included', () => {
  const random = createRandom(1);
  const axis = new AxisTrack(0.7);
  axis.start(3, 4);
  let x = Matrix.columnVector([3, 0, 0]);
  let p = Matrix.diag([4, 900, 9]);
  const h = new Matrix([[1, 0, 0]]);
  for (let k = 0; k < 200; k += 1) {
    const dt = 0.05 + random.uniform();
    const variance = 0.5 + 5 * random.uniform();
    const z = 10 * Math.sin(k / 10) + random.normal();
    axis.predict(dt);
    axis.correct(z, variance);
    const phi = new Matrix([
      [1, dt, (dt * dt) / 2],
      [0, 1, dt],
      [0, 0, 1],
    ]);
    x = phi.mmul(x);
    p = phi
      .mmul(p)
      .mmul(phi.transpose())
      .add(new Matrix(whiteJerk(dt, 0.7)));
    const s = h.mmul(p).mmul(h.transpose()).add(variance);
    const gain = p.mmul(h.transpose()).mmul(inverse(s));
    x = x.add(gain.mmul(Matrix.columnVector([z - x.get(0, 0)])));
    p = Matrix.eye(3).sub(gain.mmul(h)).mmul(p);
  }
  for (let i = 0; i < 3; i += 1) {
    expect(axis.state.mean[i]![0]).toBeCloseTo(x.get(i, 0), 9);
    for (let j = 0; j < 3; j += 1) expect(axis.state.covariance[i]![j]).toBeCloseTo(p.get(i, j), 9);
  }
});

test('it smooths the fixes, and its σ is of the size of its error', () => {
  const track = gnssOnlyTrack(drive.gnss);
  const list = errors(track).slice(50);
  expect(track.timeS.length).toBe(drive.gnss.timeS.length);
  expect(rmsHorizontal(list)).toBeLessThan(0.7 * Math.hypot(1.5, 1.5));
  const nees =
    list.reduce(
      (sum, e, k) =>
        sum + [0, 1, 2].reduce((s, i) => s + (e[i]! / track.positionSigma[i as 0][k + 50]!) ** 2, 0),
      0,
    ) / list.length;
  const [, high] = averageBounds(list.length / 10, 3); // errors hang together over some ten fixes
  expect(nees).toBeLessThan(high);
  expect(nees).toBeGreaterThan(1.5);
});

test('it coasts through what is withheld and through missing fixes, its σ growing', () => {
  const track = gnssOnlyTrack(drive.gnss, { withheldS: [[100, 110]] });
  const at = (t: number) => track.timeS.indexOf(t);
  expect(track.used[at(99.8)]).toBe(1);
  expect(track.used[at(105)]).toBe(0);
  expect(track.positionSigma[0][at(109.8)]).toBeGreaterThan(10 * track.positionSigma[0][at(99.8)]!);
  expect(track.positionSigma[0][at(112)]).toBeLessThan(2);
  const nan = { ...drive.gnss, latRad: drive.gnss.latRad.map((lat, i) => (i % 3 === 0 ? Number.NaN : lat)) };
  const holed = gnssOnlyTrack(nan);
  expect(holed.timeS.length).toBe(nan.latRad.filter((lat) => !Number.isNaN(lat)).length);
  expect(holed.latRad.every(Number.isFinite)).toBe(true);
});

test('after a long silence it starts anew', () => {
  const late = { ...drive.gnss, timeS: drive.gnss.timeS.map((t) => (t > 150 ? t + 1000 : t)) };
  const track = gnssOnlyTrack(late);
  const k = track.timeS.findIndex((t) => t > 1000);
  const i = drive.gnss.timeS.findIndex((t) => t > 150);
  expect(track.latRad[k]).toBeCloseTo(drive.gnss.latRad[i]!, 12);
  expect(track.positionSigma[0][k]).toBeCloseTo(1.5, 12);
});

test('times that repeat or go back are passed over; σ that are missing are replaced', () => {
  const timeS = drive.gnss.timeS.slice();
  timeS[20] = timeS[19]!;
  timeS[30] = 0;
  const sigma = drive.gnss.positionSigma.map((column) => column.map(() => Number.NaN));
  const dirty = { ...drive.gnss, timeS, positionSigma: sigma as unknown as GnssColumns['positionSigma'] };
  const track = gnssOnlyTrack(dirty, { defaultSigmaHorizontalM: 2 });
  expect(track.timeS.length).toBe(timeS.length - 2);
  expect(track.positionSigma[0][0]).toBe(2);
  expect(track.positionSigma[2][0]).toBe(2.5);
});

test('no fixes: empty columns', () => {
  const none = { ...drive.gnss, latRad: drive.gnss.latRad.map(() => Number.NaN) };
  expect(gnssOnlyTrack(none).timeS.length).toBe(0);
});

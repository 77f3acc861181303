import type { ParametersInput } from '@/shared/contracts/parameters';
import type { ScenarioInput } from '@/shared/contracts/scenarios';
import { degToRad, radToDeg } from '@/shared/units';
import { createRun } from '@/workers/engine';
import { align } from '@/workers/engine/alignment/align';
import { initialBudget } from '@/workers/engine/alignment/initial-covariance';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { ATTITUDE, GYRO_BIAS, STATES } from '@/workers/engine/filter/states';
import { EARTH_RATE } from '@/workers/engine/geodesy';
import { emptyError, ReferenceReader, stateError } from '@/workers/engine/run/reference';
import { averageBounds } from '@/workers/engine/statistics/consistency';
import { NAV_GYRO_BIAS } from '@/workers/engine/strapdown/navigation-state';
import { nees, requestOf, simulateCase, type SimulatedCase } from '../support/monte-carlo';

const standing = (seed: number, more: ScenarioInput = {}, parameters: ParametersInput = {}) =>
  simulateCase(
    {
      motion: 'static', durationS: 90, imuRateHz: 20, imuGrade: 'navigation', seed,
      initialHeadingDeg: 40 * seed, ...more,
    },
    parameters,
  ); // prettier-ignore

function alignCase({ recording, parameters, scenario }: SimulatedCase) {
  return align(recording.imu, prepareFixes(recording.gnss, parameters.gnss), parameters, scenario.leverArmM);
}

test('σ of the heading is √(b² + N²/T)/(Ω cos φ)', () => {
  const simulated = standing(1, {}, { accel: { turnOnBiasSigmaMPerS2: 1e-9 } });
  const { report } = alignCase(simulated);
  const { gyro } = simulated.parameters;
  const turnOn = Math.hypot(gyro.turnOnBiasSigmaRadPerS, gyro.biasInstabilityRadPerS);
  const walk = ((2 * gyro.biasInstabilityRadPerS ** 2) / gyro.biasCorrelationTimeS) * (60 / 3);
  const sigma = Math.hypot(turnOn, gyro.whiteNoiseRadPerSqrtS / Math.sqrt(60), Math.sqrt(walk));
  const expected = sigma / (EARTH_RATE * Math.cos(degToRad(47.21)));
  expect(report.heading).toBe('gyrocompass');
  expect(report.sentence).toMatch(/heading by gyrocompassing over 60\.0 s/);
  expect(degToRad(report.attitudeSigmaDeg[2]) / expected).toBeCloseTo(1, 2);
});

test('errors of heading and gyro bias are what the covariance says, their correlation included', () => {
  const RUNS = 20;
  let all = 0;
  let yaw = 0;
  for (let i = 0; i < RUNS; i += 1) {
    const simulated = standing(i + 1);
    const { nav, p, sample } = alignCase(simulated);
    const e = emptyError();
    const reader = new ReferenceReader(simulated.recording.reference);
    expect(reader.read(simulated.recording.imu.timeS[sample]!)).toBe(true);
    stateError(nav, reader.state, e);
    const error = new Float64Array(STATES);
    error.set(e.attitude, ATTITUDE);
    for (let axis = 0; axis < 3; axis += 1)
      error[GYRO_BIAS + axis] =
        nav[NAV_GYRO_BIAS + axis]! - simulated.recording.gyroBias[axis as 0 | 1 | 2][sample]!;
    all += nees(error, p, ATTITUDE, 6) / RUNS;
    yaw += nees(error, p, ATTITUDE + 2, 1) / RUNS;
  }
  for (const [mean, dimension] of [[all, 6], [yaw, 1]] as const) {
    const [low, high] = averageBounds(RUNS, dimension, 0.998);
    expect(mean).toBeGreaterThan(low);
    expect(mean).toBeLessThan(high);
  } // prettier-ignore
});

test('its parts by cause sum to the covariance', () => {
  const { p, causes } = alignCase(standing(4));
  const parts = Object.values(initialBudget(causes));
  for (let i = 0; i < STATES; i += 1)
    for (let j = 0; j < STATES; j += 1) {
      const sum = parts.reduce((total, part) => total + part[i * STATES + j]!, 0);
      const unit = Math.sqrt(p[i * (STATES + 1)]! * p[j * (STATES + 1)]!);
      expect(Math.abs(sum - p[i * STATES + j]!) / unit).toBeLessThan(1e-12);
    }
});

test('gyros that cannot are not asked to', () => {
  for (const imuGrade of ['tactical', 'industrial', 'consumer'] as const)
    expect(() => alignCase(standing(2, { imuGrade }))).toThrow(/Heading cannot be found/);
  // A given bias is taken off first.
  const biased = standing(3, { imuErrors: { gyroTurnOnBiasSigmaRadPerS: 0 } });
  biased.recording.imu.gyro[0].forEach((w, k, column) => (column[k] = w + 1e-5));
  biased.parameters.initial.gyroBiasRadPerS = [1e-5, 0, 0];
  const { report } = alignCase(biased);
  expect(report.heading).toBe('gyrocompass');
  const error = ((report.attitudeDeg[2] - 120 + 540) % 360) - 180;
  expect(Math.abs(error)).toBeLessThan(4 * report.attitudeSigmaDeg[2]);
});

test('a poor course gives way to it, a good one does not', () => {
  const drive = (turnOn: number) =>
    alignCase(
      standing(5, {
        motion: 'road', durationS: 60, staticStartS: 30,
        imuErrors: { gyroTurnOnBiasSigmaRadPerS: turnOn },
      }),
    ).report; // prettier-ignore
  expect(drive(4e-8).heading).toBe('gyrocompass');
  // 1.5° against a course that is good to about half a degree.
  expect(drive(0.026 * EARTH_RATE * Math.cos(degToRad(47.21))).heading).toBe('course');
});

test('the filter goes on from it and stays true', () => {
  const simulated = standing(6, { motion: 'road', durationS: 120, staticStartS: 60 });
  const run = createRun(simulated.recording, requestOf(simulated));
  while (!run.advance(1e6));
  const { summary } = run.finish();
  expect(summary.alignment.heading).toBe('gyrocompass');
  expect(summary.truth!.aneesAttitude!).toBeLessThan(12);
  expect(summary.truth!.attitudeRmseDeg!.yaw).toBeLessThan(4 * radToDeg(0.002));
});

/** The generated sensor errors have the statistics that they claim. */
import { createRandom } from '@/workers/engine/random';
import { GaussMarkov, MatchedRandomWalk } from '@/workers/engine/simulator/gauss-markov';
import { IMU_GRADES, type ImuModel } from '@/workers/engine/simulator/grades';
import { senseImu } from '@/workers/engine/simulator/imu-errors';
import { imuModel, regularTimes } from '@/workers/engine/simulator/scenario';
import { autocorrelation } from '@/workers/engine/statistics/correlation';
import { mean, rms, standardDeviation } from '@/workers/engine/statistics/descriptive';
import type { ImuColumns, ImuSampling } from '@/workers/engine/types';

const still = (durationS: number, rateHz: number, sampling: ImuSampling = 'mean-rate'): ImuColumns => {
  const timeS = regularTimes(durationS, rateHz);
  const zeros = () => new Float64Array(timeS.length);
  return {
    timeS,
    sampling,
    gyro: [zeros(), zeros(), zeros()],
    accel: [zeros(), zeros(), zeros()],
  };
};
const model = (change: Partial<ImuModel>): ImuModel => ({ ...IMU_GRADES.perfect, ...change });

test('a perfect sensor changes nothing', () => {
  const imu = still(10, 100);
  imu.gyro[1].fill(0.3);
  const sensed = senseImu(imu, IMU_GRADES.perfect, createRandom(1));
  expect(sensed.imu.gyro[1]).toEqual(imu.gyro[1]);
  expect(sensed.imu.accel).toEqual(imu.accel);
});

test.each([
  ['mean-rate', 200, 0.05 / 57.29577951308232 / Math.sqrt(0.5)],
  ['mean-rate', 100, 0.05 / 57.29577951308232],
] as const)('U-07 0.3 °/√h as %s at %d Hz', (sampling, rateHz, sigma) => {
  const sensed = senseImu(
    still(400, rateHz, sampling),
    model({ gyroWhiteNoiseRadPerSqrtS: 8.726646259971648e-5 }),
    createRandom(2),
  );
  const x = sensed.imu.gyro[0];
  expect(Math.abs(standardDeviation(x) / sigma - 1)).toBeLessThan(4 / Math.sqrt(2 * x.length));
  for (const r of autocorrelation(x, 3)) expect(Math.abs(r)).toBeLessThan(4 / Math.sqrt(x.length));
});

test('U-08 100 µg/√Hz as increments at 200 Hz', () => {
  const sensed = senseImu(
    still(300, 200, 'increment'),
    model({ accelWhiteNoiseMPerSPerSqrtS: 9.80665e-4 }),
    createRandom(3),
  );
  const x = sensed.imu.accel[2];
  expect(Math.abs(rms(x) / 6.934349e-5 - 1)).toBeLessThan(4 / Math.sqrt(2 * x.length));
});

test('turn-on constants have the stated spread over many sensors, and stay constant', () => {
  const spread = Array.from({ length: 300 }, (_, seed) => {
    const { gyroBias } = senseImu(
      still(0.1, 10),
      model({ gyroTurnOnBiasSigmaRadPerS: 0.01 }),
      createRandom(seed),
    );
    expect(gyroBias[0][1]).toBe(gyroBias[0][0]);
    return gyroBias.map((axis) => axis[0]!);
  }).flat();
  expect(Math.abs(mean(spread)) / 0.01).toBeLessThan(4 / Math.sqrt(spread.length));
  expect(Math.abs(standardDeviation(spread) / 0.01 - 1)).toBeLessThan(4 / Math.sqrt(2 * spread.length));
});

test('Q-05 in-run wander: stationary from the first sample, correlation e^(−Δt/τ), at any step', () => {
  for (const dt of [0.01, 7]) {
    const random = createRandom(4);
    const pairs = Array.from({ length: 20_000 }, () => {
      const process = new GaussMarkov(2, 50, random);
      const first = process.value;
      return [first, process.step(dt)] as const;
    });
    const first = pairs.map((p) => p[0]);
    const second = pairs.map((p) => p[1]);
    const phi = Math.exp(-dt / 50);
    expect(Math.abs(rms(first) / 2 - 1)).toBeLessThan(0.02);
    expect(Math.abs(rms(second) / 2 - 1)).toBeLessThan(0.02);
    const drive = pairs.map(([a, b]) => b - phi * a);
    expect(Math.abs(rms(drive) / (2 * Math.sqrt(1 - phi * phi)) - 1)).toBeLessThan(0.02);
    const covariance = mean(pairs.map(([a, b]) => a * b)) / 4;
    expect(Math.abs(covariance - phi)).toBeLessThan(0.04);
  }
});

test('Q-08 the random-walk wander: first spread σ, then 2σ²/τ a second', () => {
  const random = createRandom(10);
  const walks = Array.from({ length: 5000 }, () => {
    const walk = new MatchedRandomWalk(2, 50, random);
    const first = walk.value;
    walk.step(10);
    return [first, walk.step(15) - first] as const;
  });
  expect(Math.abs(rms(walks.map((w) => w[0])) / 2 - 1)).toBeLessThan(0.04);
  expect(Math.abs(rms(walks.map((w) => w[1])) / Math.sqrt((2 * 4 * 25) / 50) - 1)).toBeLessThan(0.04);
  const walking = model({
    gyroBiasInstabilityRadPerS: 1,
    gyroBiasCorrelationTimeS: 1,
    wander: 'random-walk',
  });
  const spread = standardDeviation(senseImu(still(400, 10), walking, createRandom(11)).imu.gyro[0]);
  expect(spread).toBeGreaterThan(3); // a Gauss–Markov process of this σ would stay near 1
});

test('scale, range and step act in that order', () => {
  const imu = still(1, 10);
  imu.gyro[0].fill(1.234);
  imu.gyro[1].fill(-9);
  const sensed = senseImu(
    imu,
    model({ gyroRangeRadPerS: 5, gyroStepRadPerS: 0.01, gyroScaleSigma: 0 }),
    createRandom(5),
  );
  expect(sensed.imu.gyro[0][3]).toBeCloseTo(1.23, 12);
  expect(sensed.imu.gyro[1][3]).toBeCloseTo(-5, 12);
  const scaled = senseImu(imu, model({ gyroScaleSigma: 0.01 }), createRandom(6)).imu.gyro[0];
  expect(scaled[0]! / 1.234).not.toBe(1);
  expect(Math.abs(scaled[0]! / 1.234 - 1)).toBeLessThan(0.05);
  expect(scaled[9]).toBe(scaled[0]);
});

test('the biases that are reported are those that were added', () => {
  const noiseless = { ...IMU_GRADES.industrial, gyroWhiteNoiseRadPerSqrtS: 0, gyroStepRadPerS: 0 };
  const sensed = senseImu(still(50, 20), noiseless, createRandom(7));
  expect(sensed.imu.gyro[2]).toEqual(sensed.gyroBias[2]);
});

test('axes and groups have errors of their own; the same seed the same ones', () => {
  const one = senseImu(still(1, 10), IMU_GRADES.consumer, createRandom(8)).imu;
  const two = senseImu(still(1, 10), IMU_GRADES.consumer, createRandom(8)).imu;
  expect(two).toEqual(one);
  expect(one.gyro[0]).not.toEqual(one.gyro[1]);
});

test('named errors replace the grade’s', () => {
  const changed = imuModel('tactical', {
    gyroWhiteNoiseRadPerSqrtS: 1,
    accelTurnOnBiasSigmaMPerS2: undefined,
  });
  expect(changed).toEqual({ ...IMU_GRADES.tactical, gyroWhiteNoiseRadPerSqrtS: 1 });
});

test('grades get better in each figure (Groves 2013 §4.4 and usual practice: their order)', () => {
  const order = (['consumer', 'industrial', 'tactical', 'navigation'] as const).map(
    (grade) => IMU_GRADES[grade],
  );
  for (const key of Object.keys(IMU_GRADES.perfect) as (keyof ImuModel)[]) {
    if (!/WhiteNoise|TurnOn|Instability/.test(key)) continue;
    const figures = order.map((grade) => Number(grade[key]));
    expect([...figures].sort((a, b) => b - a)).toEqual(figures);
  }
});

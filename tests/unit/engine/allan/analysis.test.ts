import { analyseNoise } from '@/workers/engine/allan/analysis';
import { IMU_GRADES } from '@/workers/engine/simulator/grades';
import { simulateScenario } from '@/workers/engine/simulator/scenario';
import { scenarioSchema } from '@/shared/contracts/scenarios';
import { noiseStartValues } from '@/workers/engine/allan/start-values';
import { mean } from '@/workers/engine/statistics/descriptive';
import { noiseSeries } from '@/tests/support/noise-series';

const HOUR = 3600;

describe('eight hours at rest with known terms', () => {
  const truth = { white: 8.7e-5, biasInstability: 2e-5, rateRandomWalk: 1e-6 };
  const logs = Array.from({ length: 8 }, (_, seed) =>
    analyseNoise(noiseSeries(truth, 8 * HOUR * 4, 0.25, seed), 0.25),
  );

  test('white noise within 3 %, bias instability within 15 %, each log', () => {
    for (const { terms } of logs) {
      expect(Math.abs(terms.white.value! / truth.white - 1)).toBeLessThan(0.03);
      expect(Math.abs(terms.biasInstability.value! / truth.biasInstability - 1)).toBeLessThan(0.15);
    }
  });

  test('rate random walk within 25 % over eight logs, and each says how little it knows', () => {
    const found = logs.map((log) => log.terms.rateRandomWalk);
    expect(found.every((term) => term.observable)).toBe(true);
    expect(Math.abs(mean(found.map((term) => term.value!)) / truth.rateRandomWalk - 1)).toBeLessThan(0.25);
    for (const { value, sigma } of found) {
      expect(sigma! / value!).toBeGreaterThan(0.08);
      expect(Math.abs(value! - truth.rateRandomWalk)).toBeLessThan(3.5 * sigma!);
    }
  });

  test('what is not there is not observable: quantisation, ramp', () => {
    const alarms = logs.filter(({ terms }) => terms.quantisation.observable || terms.ramp.observable);
    expect(alarms.length).toBeLessThanOrEqual(1);
    expect(logs[0]!.terms.ramp).toMatchObject({ observable: false, value: null, sigma: null });
  });

  test('the stated σ of the white noise is its scatter, within a factor', () => {
    const pulls = logs.map(({ terms }) => (terms.white.value! - truth.white) / terms.white.sigma!);
    const spread = Math.sqrt(mean(pulls.map((x) => x * x)));
    expect(spread).toBeGreaterThan(0.4);
    expect(spread).toBeLessThan(2);
  });

  test('the curve carries its confidence: wide at long τ, narrow at short', () => {
    const { points } = logs[0]!;
    const width = (i: number) => (points[i]!.high - points[i]!.low) / points[i]!.deviation;
    expect(width(0)).toBeLessThan(0.02);
    expect(width(points.length - 1)).toBeGreaterThan(0.3);
    const inside = points.filter((p) => p.model > p.low && p.model < p.high).length / points.length;
    expect(inside).toBeGreaterThan(0.4);
  });
});

test('a short log says that it cannot tell the slow terms', () => {
  const rates = noiseSeries(
    { white: 8.7e-5, biasInstability: 4.8e-6, rateRandomWalk: 1e-7 },
    300 * 50,
    0.02,
    1,
  );
  const { terms } = analyseNoise(rates, 0.02);
  expect(Math.abs(terms.white.value! / 8.7e-5 - 1)).toBeLessThan(0.04);
  expect(terms.biasInstability.value).toBeNull();
  expect(terms.rateRandomWalk).toMatchObject({ observable: false, value: null });
});

test('A-21 where white noise meets random walk the minimum ÷ 0.664 is far too large; the fit is not', () => {
  const rates = noiseSeries({ white: 2e-4, biasInstability: 1e-5, rateRandomWalk: 1e-6 }, 8 * HOUR, 1, 3);
  const analysis = analyseNoise(rates, 1);
  const minimum = Math.min(...analysis.points.map((p) => p.deviation)) / 0.6642824702679601;
  expect(minimum).toBeGreaterThan(2e-5);
  const fitted = analysis.terms.biasInstability.value ?? 0;
  expect(fitted).toBeLessThan(1.8e-5);
});

test('quantisation and ramp are found where they are', () => {
  const rates = noiseSeries({ white: 1e-4, quantisation: 2e-5, ramp: 2e-7 }, 2 * HOUR * 20, 0.05, 4);
  const { terms } = analyseNoise(rates, 0.05);
  expect(Math.abs(terms.quantisation.value! / 2e-5 - 1)).toBeLessThan(0.05);
  expect(Math.abs(terms.ramp.value! / 2e-7 - 1)).toBeLessThan(0.1);
});

test('start values: the wander that rises as high as the plateau, its time from the random walk', () => {
  const rates = noiseSeries({ white: 8.7e-5, biasInstability: 2e-5, rateRandomWalk: 1e-6 }, 8 * HOUR, 1, 5);
  const analysis = analyseNoise(rates, 1);
  const start = noiseStartValues(analysis);
  const b = analysis.terms.biasInstability.value!;
  expect(start.whiteNoise).toBe(analysis.terms.white.value);
  expect(start.biasInstability).toBeCloseTo(1.076 * b, 7);
  const k = start.biasRandomWalk!;
  expect(start.biasCorrelationTimeS! / ((2 * start.biasInstability! ** 2) / k ** 2)).toBeCloseTo(1, 12);
  const white = noiseStartValues(analyseNoise(noiseSeries({ white: 1e-4 }, HOUR, 1, 6), 1));
  expect(white).toMatchObject({ biasInstability: null, biasCorrelationTimeS: null, biasRandomWalk: null });
});

test('misuse: too few samples, values that are not numbers', () => {
  expect(() => analyseNoise(new Float64Array(50), 0.01)).toThrow(/50 samples at rest are too few/);
  const holed = noiseSeries({ white: 1 }, 500, 1, 1);
  holed[77] = Number.NaN;
  expect(() => analyseNoise(holed, 1)).toThrow(/not a finite number/);
});

test('a simulated log at rest shows the white noise of its grade on every axis', () => {
  const scenario = scenarioSchema.parse({
    motion: 'static',
    durationS: 900,
    imuRateHz: 50,
    imuGrade: 'consumer',
  });
  const { imu } = simulateScenario(scenario);
  const grade = IMU_GRADES.consumer;
  for (const axis of [0, 1, 2] as const) {
    const gyro = analyseNoise(imu.gyro[axis], 0.02).terms.white.value!;
    const accel = analyseNoise(imu.accel[axis], 0.02).terms.white.value!;
    expect(Math.abs(gyro / grade.gyroWhiteNoiseRadPerSqrtS - 1)).toBeLessThan(0.05);
    expect(Math.abs(accel / grade.accelWhiteNoiseMPerSPerSqrtS - 1)).toBeLessThan(0.05);
  }
});

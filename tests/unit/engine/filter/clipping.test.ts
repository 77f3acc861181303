import { parametersSchema } from '@/shared/contracts/parameters';
import { createRun, type ImuColumns, type RunResult } from '@/workers/engine';
import { findClipping } from '@/workers/engine/filter/clipping';
import { addShock } from '@/tests/support/shock';
import { requestOf, simulateCase } from '../support/monte-carlo';

const DEFAULTS = parametersSchema.parse({}).clipping;

function imuOf(gyroX: number[], accelZ: number[]): ImuColumns {
  const n = gyroX.length;
  const noise = () => Float64Array.from({ length: n }, (_, k) => 0.01 * Math.sin(7 * k));
  return {
    timeS: Float64Array.from({ length: n }, (_, k) => k / 100),
    gyro: [Float64Array.from(gyroX), noise(), noise()],
    accel: [noise(), noise(), Float64Array.from(accelZ)],
    sampling: 'mean-rate',
  };
}

const wave = (n: number, size: number) => Array.from({ length: n }, (_, k) => size * Math.sin(k / 3));
const cut = (x: number[], low: number, high: number) => x.map((v) => Math.min(high, Math.max(low, v)));

describe('finding clipped samples', () => {
  const calm = wave(200, 1);

  test('flat tops at an axis’ own extremes, their heights different by sign', () => {
    const runs = findClipping(imuOf(cut(wave(200, 6), -4.3, 4.1), calm), DEFAULTS);
    expect(runs.length).toBeGreaterThan(15);
    const imu = imuOf(cut(wave(200, 6), -4.3, 4.1), calm);
    for (const { from, to, gyroNoise, accelNoise } of runs) {
      for (let k = from; k <= to; k += 1) expect([-4.3, 4.1]).toContain(imu.gyro[0][k]);
      expect(gyroNoise).toBeGreaterThan(0);
      expect(accelNoise).toBe(0);
    }
  });

  test('a stated range, no flat top needed', () => {
    const x = wave(200, 1);
    x[50] = 8.73;
    const runs = findClipping(imuOf(x, calm), { ...DEFAULTS, gyroRangeRadPerS: 8.73 });
    expect(runs).toEqual([expect.objectContaining({ from: 50, to: 50 })]);
  });

  test('nothing in clean data, in a steady turn of a coarse sensor, or when switched off', () => {
    expect(findClipping(imuOf(calm, calm), DEFAULTS)).toEqual([]);
    // Rises step by step to a plateau and falls again: 0.01 rad/s a step.
    const plateau = Array.from({ length: 200 }, (_, k) => Math.min(50, k, 199 - k) / 100);
    expect(findClipping(imuOf(plateau, calm), DEFAULTS)).toEqual([]);
    const off = { ...DEFAULTS, enabled: false };
    expect(findClipping(imuOf(cut(wave(200, 6), -4, 4), calm), off)).toEqual([]);
  });
});

describe('a shock beyond the range, then no GNSS', () => {
  const RANGE = 30;
  /** A forward shock of 80 m/s² for 30 ms just before the outage, cut at the range; the truth is the uncut drive. */
  function coast(enabled: boolean, seed: number): RunResult {
    const simulated = simulateCase(
      { motion: 'road', durationS: 160, imuRateHz: 100, staticStartS: 20, seed },
      { clipping: { enabled, accelRangeMPerS2: RANGE } },
    );
    addShock(simulated.recording, { atS: 99.9, samples: 3, shockMPerS2: 80, rangeMPerS2: RANGE });
    const run = createRun(
      simulated.recording,
      requestOf(simulated, { outages: [{ startS: 99.8, endS: 130, withhold: 'gnss' }] }),
    );
    while (!run.advance(1e6));
    return run.finish();
  }

  test('stays inside 3σ with the policy, and does not without', () => {
    for (const seed of [1, 2, 3]) {
      const ratio = (result: RunResult) => {
        const end = result.summary.outages[0]!.points.at(-1)!;
        return end.horizontalM / end.predictedHorizontalM;
      };
      const with_ = coast(true, seed);
      expect(ratio(with_)).toBeLessThan(3);
      expect(with_.summary.warnings.some((w) => w.code === 'clipped')).toBe(true);
      expect(ratio(coast(false, seed))).toBeGreaterThan(3);
    }
  });
});

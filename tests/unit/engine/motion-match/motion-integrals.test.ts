import { MotionIntegrator } from '@/workers/engine/motion-match/motion-integrals';

/** A turn at constant rate and a force that grows evenly: their integrals are known exactly. */
const gathered = (mostRows: number, seconds: number) => {
  const integrator = new MotionIntegrator(mostRows);
  for (let k = 0; k <= seconds * 100; k += 1) {
    const timeS = k / 100;
    // Mean over the interval that ends here.
    integrator.add(timeS, Float64Array.from([0, 0, 0.2, 2 * (timeS - 0.005), 0, -9.8]));
  }
  return integrator.finish();
};

describe('running integrals', () => {
  it('keeps a row every four or five samples at 100 Hz', () => {
    const { timeS, gyro } = gathered(1000, 20);
    const steps = timeS.slice(1).map((t, i) => t - timeS[i]!);
    expect(Math.min(...steps)).toBeGreaterThan(0.039);
    expect(Math.max(...steps)).toBeLessThan(0.051);
    for (const [i, t] of timeS.entries()) expect(gyro[2][i]).toBeCloseTo(0.2 * t, 9);
  });

  it('thins a log that is longer than it may keep, and stays exact over its whole length', () => {
    const { timeS, gyro, accel } = gathered(64, 20);
    expect(timeS.length).toBeGreaterThan(32);
    expect(timeS.length).toBeLessThanOrEqual(64);
    expect(timeS[0]).toBe(0);
    expect(timeS.at(-1)!).toBeGreaterThan(19.3);
    for (const [i, t] of timeS.entries()) {
      expect(gyro[2][i]).toBeCloseTo(0.2 * t, 9);
      expect(accel[0][i]).toBeCloseTo(t * t, 9);
    }
  });

  it('marks a pause instead of integrating over it', () => {
    const integrator = new MotionIntegrator();
    for (const timeS of [0, 0.1, 0.2, 3, 3.1]) integrator.add(timeS, Float64Array.from([1, 0, 0, 0, 0, 0]));
    const { timeS, gyro, breaksS } = integrator.finish();
    expect([...breaksS]).toEqual([3]);
    expect([...timeS]).toEqual([0, 0.1, 0.2, 3, 3.1]);
    expect(gyro[0][4]).toBeCloseTo(0.3, 12);
  });
});

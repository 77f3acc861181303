import { newProfilePoint, RAMP_SLOPE, SmoothProfile } from '@/workers/engine/simulator/profile';

const build = () => new SmoothProfile(2).rampTo(1, 3, 8).rampTo(6, 2, -1).rampTo(8, 0.5, 4);
const at = (profile: SmoothProfile, t: number) => ({ ...profile.at(t, newProfilePoint()) });

test('holds its values between ramps and extends on both sides', () => {
  const profile = build();
  expect(at(profile, -10)).toEqual({ value: 2, rate: 0, curve: 0, integral: -20 });
  expect(at(profile, 5).value).toBe(8);
  expect(at(profile, 100).value).toBe(4);
  expect(profile.endS).toBe(8.5);
});

test('rate, curve and integral belong to the value (finite differences, everywhere)', () => {
  const profile = build();
  const h = 1e-4;
  for (let t = 0.05; t < 10; t += 0.0371) {
    const p = at(profile, t);
    const before = at(profile, t - h);
    const after = at(profile, t + h);
    expect(Math.abs((after.value - before.value) / (2 * h) - p.rate)).toBeLessThan(1e-4);
    expect(Math.abs((after.rate - before.rate) / (2 * h) - p.curve)).toBeLessThan(2e-3);
    expect(Math.abs((after.integral - before.integral) / (2 * h) - p.value)).toBeLessThan(1e-6);
  }
});

test('value, rate and curve go on smoothly over each joint', () => {
  const profile = build();
  for (const joint of [1, 4, 6, 8, 8.5]) {
    const before = at(profile, joint - 1e-7);
    const after = at(profile, joint + 1e-7);
    expect(Math.abs(after.value - before.value)).toBeLessThan(1e-12);
    expect(Math.abs(after.rate - before.rate)).toBeLessThan(1e-8);
    expect(Math.abs(after.curve - before.curve)).toBeLessThan(1e-3);
    expect(Math.abs(after.integral - before.integral - 2e-7 * after.value)).toBeLessThan(1e-12);
  }
});

test('the steepest slope of a ramp is as stated', () => {
  const profile = new SmoothProfile(0).rampTo(0, 4, 10);
  expect(at(profile, 2).rate).toBeCloseTo((10 * RAMP_SLOPE) / 4, 12);
});

test('times may come in any order', () => {
  const profile = build();
  const fresh = build();
  for (const t of [9, 0, 6.5, 3, 8.2, -1, 7, 2, 5, 1.5]) expect(at(profile, t)).toEqual(at(build(), t));
  for (let t = 0; t < 10; t += 0.5) expect(at(fresh, t)).toEqual(at(build(), t));
});

test('ramps that overlap or take no time are refused', () => {
  expect(() => build().rampTo(8.2, 1, 0)).toThrow(RangeError);
  expect(() => build().rampTo(10, 0, 0)).toThrow(/take time/);
});

import type { ParametersInput } from '@/shared/contracts/parameters';
import { quatFromEuler, quatFromRotationVector, quatMultiply } from '@/workers/engine/attitude';
import { createRun, type RunResult } from '@/workers/engine';
import { nonHolonomic, zeroRotation, zeroVelocity } from '@/workers/engine/filter/aid-models';
import { MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { STATES } from '@/workers/engine/filter/states';
import { NAV_SIZE, QUAT, VN } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';
import { requestOf, simulateCase } from '../support/monte-carlo';

function disturbed(error: Float64Array): Strapdown {
  const nav = new Float64Array(NAV_SIZE);
  nav.set([0.8, -0.25, 120, 12, -4, 0.5]);
  nav.set(quatFromEuler(0.1, -0.2, 2.1, new Float64Array(4)), QUAT);
  for (let i = 0; i < 3; i += 1) nav[VN + i] = nav[VN + i]! + error[3 + i]!;
  const turn = quatFromRotationVector(-error[6]!, -error[7]!, -error[8]!, new Float64Array(4));
  nav.set(quatMultiply(turn, nav.slice(QUAT, QUAT + 4), new Float64Array(4)), QUAT);
  for (let i = 0; i < 6; i += 1) nav[10 + i] = error[9 + i]!;
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(nav);
  return strapdown;
}

const MEAN_RATE = Float64Array.of(0.01, -0.02, 0.03);

test.each([
  ['zero velocity', 3, (s: Strapdown, u: MeasurementUpdate) => zeroVelocity(s, 1, u), 1e-9],
  ['zero rotation', 3, (s: Strapdown, u: MeasurementUpdate) => zeroRotation(s, MEAN_RATE, 1, u), 1e-8],
  ['non-holonomic', 2, (s: Strapdown, u: MeasurementUpdate) => nonHolonomic(s, 1, 1, u), 1e-4],
] as const)('H of %s is the derivative of its innovation', (_name, rows, model, tolerance) => {
  const at = (error: Float64Array) => {
    const update = new MeasurementUpdate();
    model(disturbed(error), update);
    return update;
  };
  const { h } = at(new Float64Array(STATES));
  for (let j = 0; j < STATES; j += 1) {
    const size = j >= 6 && j < 9 ? 1e-4 : 1e-2;
    const error = new Float64Array(STATES);
    error[j] = size;
    const plus = at(error).innovation;
    error[j] = -size;
    const minus = at(error).innovation;
    for (let i = 0; i < rows; i += 1)
      expect(Math.abs(h[i * STATES + j]! + (plus[i]! - minus[i]!) / (2 * size))).toBeLessThan(tolerance);
  }
});

describe('over a drive', () => {
  function run(parameters: ParametersInput, outage = true): RunResult {
    const simulated = simulateCase(
      { motion: 'road', durationS: 260, imuRateHz: 50, staticStartS: 40, imuGrade: 'consumer', seed: 5 },
      parameters,
    );
    const outages = outage ? [{ startS: 120, endS: 240, withhold: 'gnss' as const }] : [];
    const engine = createRun(simulated.recording, requestOf(simulated, { outages }));
    while (!engine.advance(1e6));
    return engine.finish();
  }
  const plain = run({});
  const drift = (result: RunResult) => result.summary.outages[0]!.points.at(-1)!;

  test('off by default, and then nothing is said of them', () => {
    expect(plain.summary.aids).toEqual([]);
  });

  test('non-holonomic constraint holds a car’s drift down, and the covariance knows', () => {
    const constrained = run({ aids: { nonHolonomic: { enabled: true } } });
    expect(drift(constrained).horizontalM).toBeLessThan(0.5 * drift(plain).horizontalM);
    expect(drift(constrained).horizontalM).toBeLessThan(3 * drift(constrained).predictedHorizontalM);
    const [aid] = constrained.summary.aids!;
    expect(aid).toMatchObject({ aid: 'non-holonomic', dimension: 2 });
    expect(aid!.used).toBeGreaterThan(100);
    expect(aid!.nisMean!).toBeLessThan(3);
  });

  test('stops: zero velocity and zero rotation are used at rest only and sharpen the biases', () => {
    const aided = run({ aids: { zeroVelocity: { enabled: true }, zeroRotation: { enabled: true } } }, false);
    const names = aided.summary.aids!.map((a) => a.aid);
    expect(names).toEqual(['zero-velocity', 'zero-rotation']);
    for (const { used, rejected } of aided.summary.aids!) {
      expect(used).toBeGreaterThan(60);
      expect(rejected).toBeLessThan(0.12 * used);
    }
    const at = aided.solution.time_s!.findIndex((t) => t >= 35);
    const free = run({}, false);
    for (const name of ['sigma_gyro_bias_z_rad_s', 'sigma_vn_m_s'])
      expect(aided.solution[name]![at]).toBeLessThan(0.9 * free.solution[name]![at]!);
    const truth = aided.summary.truth!;
    expect(truth.aneesVelocity!).toBeLessThan(6);
    expect(truth.aneesPosition).toBeLessThan(6);
  });
});

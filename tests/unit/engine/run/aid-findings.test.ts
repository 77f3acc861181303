import type { ParametersInput } from '@/shared/contracts/parameters';
import { createRun } from '@/workers/engine';
import { requestOf, simulateCase } from '../support/monte-carlo';

const STATES: ParametersInput['states'] = { leverArm: { enabled: true }, accelScale: { enabled: true } };

function findingsOf(parameters: ParametersInput, spoil = 0, motion: 'road' | 'static' = 'road') {
  const simulated = simulateCase(
    { motion, durationS: 120, imuRateHz: 25, staticStartS: 15, seed: 21 },
    motion === 'static' ? { ...parameters, initial: { headingDeg: 35 } } : parameters,
    { aids: { odometer: { rateHz: 5, sigmaMPerS: 0.1 } } },
  );
  const { speedMPerS } = simulated.recording.aids!.odometer!;
  for (let k = 0; k < speedMPerS.length; k += 4) speedMPerS[k] = speedMPerS[k]! + spoil;
  const run = createRun(simulated.recording, requestOf(simulated, { outputRateHz: 1 }));
  while (!run.advance(1e6));
  return run.finish().summary.findings;
}

const odometer = (sigmaMPerS: number): ParametersInput => ({
  aids: { odometer: { enabled: true, sigmaSource: 'fixed', sigmaMPerS } },
});

test('an aid whose σ is right gives nothing to say', () => {
  expect(findingsOf(odometer(0.1)).filter((f) => f.code.startsWith('odometer'))).toEqual([]);
});

test.each([
  [0.3, 'odometer-sigma-large', 0.333],
  [0.06, 'odometer-sigma-small', 1.67],
] as const)('σ of %p m/s where 0.1 m/s is true: %s, the factor named', (sigma, code, factor) => {
  const { suggestion } = findingsOf(odometer(sigma)).find((f) => f.code === code)!;
  expect(suggestion!.path).toBe('aids.odometer.sigmaScale');
  expect(suggestion!.value / factor).toBeGreaterThan(0.8);
  expect(suggestion!.value / factor).toBeLessThan(1.2);
});

test('readings that do not fit are told of', () => {
  const codes = findingsOf(odometer(0.1), 5).map((f) => f.code);
  expect(codes).toContain('odometer-rejected');
});

test('states that the motion does not show are named', () => {
  const still = findingsOf({ states: STATES }, 0, 'static').find((f) => f.code === 'state-not-seen')!;
  expect(still.sentence).toMatch(/lever_arm_x_m.*do(es)? not tell them/);
  expect(findingsOf({}).map((f) => f.code)).not.toContain('state-not-seen');
});

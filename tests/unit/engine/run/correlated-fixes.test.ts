import { runSummarySchema } from '@/shared/contracts/runs';
import { createRun } from '@/workers/engine';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { requestOf, simulateCase } from '../support/monte-carlo';

jest.setTimeout(60_000);

const TAU_S = 10;
const RATE_HZ = 2;
const RHO = Math.exp(-1 / (RATE_HZ * TAU_S));
/** The mean of n samples of a first-order process is as good as that of n(1 − ρ)/(1 + ρ) white ones (Bartlett 1946). */
const FACTOR = (1 + RHO) / (1 - RHO);

function drive(seed: number, positionInflation: number) {
  const simulated = simulateCase(
    {
      motion: 'road', durationS: 240, imuRateHz: 25, gnssRateHz: RATE_HZ, staticStartS: 15, seed,
      imuGrade: 'tactical', gnss: { correlationTimeS: TAU_S },
    },
    { gnss: { positionInflation } },
  ); // prettier-ignore
  const run = createRun(simulated.recording, requestOf(simulated, { outputRateHz: 1 }));
  while (!run.advance(1e6));
  return run.finish().summary;
}

test('R is (σ × scale)² × inflation, and 1 leaves it to the last bit', () => {
  const { recording, parameters } = simulateCase({ durationS: 10, imuRateHz: 10, seed: 1 });
  const variance = (inflation: number) =>
    prepareFixes(recording.gnss, {
      ...parameters.gnss,
      positionInflation: inflation,
      velocityInflation: inflation,
    });
  expect(variance(4).positionVariance[0]).toBe(4 * variance(1).positionVariance[0]!);
  expect(variance(4).velocityVariance[2]).toBe(4 * variance(1).velocityVariance[2]!);
  expect(variance(1).positionVariance[0]).toBe(recording.gnss.positionSigma[0][0]! ** 2);
});

describe('fixes whose errors last', () => {
  const RUNS = 10;
  const mean = (inflation: number) => {
    let sum = 0;
    for (let i = 0; i < RUNS; i += 1) sum += drive(60 + i, inflation).truth!.aneesPosition / RUNS;
    return sum;
  };

  test('make the covariance several times too small; inflated by (1 + ρ)/(1 − ρ) it is right', () => {
    expect(mean(1)).toBeGreaterThan(4 * 3);
    const inflated = mean(FACTOR);
    expect(inflated).toBeGreaterThan(3 / 2);
    expect(inflated).toBeLessThan(3 * 2);
  });

  test('are found by their autocorrelation, the factor named; inflated, it is said and not asked for again', () => {
    const plain = drive(60, 1);
    const found = plain.findings.find((f) => f.code === 'position-correlated')!;
    expect(found.suggestion!.path).toBe('gnss.positionInflation');
    expect(found.suggestion!.value).toBeGreaterThan(FACTOR / 4);
    expect(found.suggestion!.value).toBeLessThan(FACTOR * 4);
    expect(plain.warnings.map((w) => w.code)).not.toContain('position-r-inflated');

    const inflated = drive(60, FACTOR);
    expect(runSummarySchema.parse(inflated)).toEqual(inflated);
    expect(inflated.warnings.find((w) => w.code === 'position-r-inflated')!.sentence).toMatch(
      /inflated by 40(\.0)?×/,
    );
    const codes = inflated.findings.map((f) => f.code);
    expect(codes).toContain('position-inflated');
    expect(codes).not.toContain('position-correlated');
    expect(codes).not.toContain('position-r-large');
  });
});

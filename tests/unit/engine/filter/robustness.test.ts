import type { ParametersInput } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import type { ScenarioInput } from '@/shared/contracts/scenarios';
import { createRun, type RunResult } from '@/workers/engine';
import type { ScenarioExtras } from '@/workers/engine/simulator/scenario';
import { requestOf, simulateCase, type SimulatedCase } from '../support/monte-carlo';

jest.setTimeout(30_000);

interface Setting {
  scenario?: ScenarioInput;
  parameters?: ParametersInput;
  extras?: ScenarioExtras;
  outages?: Outage[];
  change?: (simulated: SimulatedCase) => void;
}

function run({ scenario, parameters, extras, outages, change }: Setting): RunResult {
  const simulated = simulateCase(
    { motion: 'road', durationS: 200, imuRateHz: 50, staticStartS: 20, seed: 1, ...scenario },
    parameters,
    extras,
  );
  change?.(simulated);
  const filter = createRun(simulated.recording, requestOf(simulated, { outages: outages ?? [] }));
  while (!filter.advance(1e6));
  return filter.finish();
}

/** Drops the IMU samples in (from, to]. */
const gap = (fromS: number, toS: number) => (simulated: SimulatedCase) => {
  const { imu } = simulated.recording;
  const keep = [...imu.timeS.keys()].filter((k) => imu.timeS[k]! <= fromS || imu.timeS[k]! > toS);
  const pick = (column: Float64Array) => Float64Array.from(keep, (k) => column[k]!);
  const three = (axes: typeof imu.gyro) => [pick(axes[0]), pick(axes[1]), pick(axes[2])] as const;
  simulated.recording.imu = {
    ...imu,
    timeS: pick(imu.timeS),
    gyro: three(imu.gyro),
    accel: three(imu.accel),
  };
};

const plain = run({});
const codes = (result: RunResult) => [...new Set(result.summary.warnings.map((w) => w.code))];

function expectAsGoodAsPlain(result: RunResult, share = 1.15): void {
  const [truth, reference] = [result.summary.truth!, plain.summary.truth!];
  expect(truth.positionRmseM).toBeLessThan(share * reference.positionRmseM);
  expect(truth.velocityRmseMPerS!).toBeLessThan(share * reference.velocityRmseMPerS!);
  expect(truth.aneesPosition).toBeLessThan(share * reference.aneesPosition + 0.5);
}

test('clean fixes: NIS near 3, rejected at the gate’s own rate', () => {
  for (const group of plain.summary.groups) {
    expect(group.nisMean!).toBeGreaterThan(2.75);
    expect(group.nisMean!).toBeLessThan(3.25);
    expect(group.rejected).toBeLessThanOrEqual(5);
    expect(group.insideShare!).toBeGreaterThan(0.93);
  }
  expect(codes(plain)).toEqual([]);
});

describe('the same drive, recorded in another way, comes out as well', () => {
  test.each([
    ['instantaneous rates', { extras: { sampling: 'instantaneous' } }],
    ['increments', { extras: { sampling: 'increment' } }],
    ['a lever arm', { scenario: { leverArmM: [1.5, -0.8, -2] } }],
    ['fixes between samples', { extras: { gnss: { phaseS: 0.1037 } } }],
    [
      'fixes that come late',
      { extras: { gnss: { latencyS: 0.137 } }, parameters: { gnss: { latencyS: 0.137 } } },
    ],
    ['covariance at every sample', { parameters: { mechanisation: { covarianceIntervalS: 0 } } }],
    [
      'a start without heading but wide',
      { parameters: { initial: { headingDeg: 60, attitudeSigmaDeg: [1, 1, 30] } } },
    ],
  ] as [string, Setting][])('%s', (_name, setting) => expectAsGoodAsPlain(run(setting)));

  test('a latency or lever arm that is left out shows', () => {
    const late = run({ extras: { gnss: { latencyS: 0.3 } } });
    expect(late.summary.truth!.positionRmseM).toBeGreaterThan(2 * plain.summary.truth!.positionRmseM);
    expect(late.summary.findings.some((f) => f.code === 'velocity-correlated')).toBe(true);
  });
});

test('2 % outliers of 50 σ move the error by less than 5 %', () => {
  const spoilt = run({ scenario: { gnss: { outlierShare: 0.02, outlierSigmas: 50 } } });
  expect(spoilt.summary.truth!.positionRmseM).toBeLessThan(1.05 * plain.summary.truth!.positionRmseM);
  expect(spoilt.summary.groups[0]!.rejected).toBeGreaterThan(10);
});

test('after an outage of ten minutes the first fixes are taken back in', () => {
  const result = run({
    scenario: { durationS: 760, imuRateHz: 20 },
    outages: [{ startS: 100, endS: 700, withhold: 'gnss' }],
  });
  const after = result.position.timeS.findIndex((t) => t >= 700);
  expect([...result.position.accepted.slice(after, after + 5)]).toEqual([1, 1, 1, 1, 1]);
  expect(codes(result)).toEqual([]);
});

test('a filter that was too sure to take fixes back in re-initialises and says so', () => {
  const result = run({
    scenario: { durationS: 400, imuGrade: 'consumer' },
    parameters: {
      gyro: { whiteNoiseRadPerSqrtS: 1e-8, biasInstabilityRadPerS: 1e-9 },
      accel: { whiteNoiseMPerSPerSqrtS: 1e-7, biasInstabilityMPerS2: 1e-8 },
    },
    outages: [{ startS: 100, endS: 300, withhold: 'gnss' }],
  });
  expect(codes(result)).toContain('position-reinitialised');
  const { position } = result;
  const last = position.timeS.length;
  expect([...position.accepted.slice(last - 50)].filter((a) => a === 1).length).toBeGreaterThan(25);
  expect(Math.abs(position.innovation[0][last - 1]!)).toBeLessThan(10);
});

describe('a wrong initial heading', () => {
  const yawErrorAtEnd = (result: RunResult) => {
    const yaw = result.solution.yaw_deg!.at(-1)!;
    const truth = plain.solution.yaw_deg!.at(-1)!;
    return Math.abs(((((yaw - truth) % 360) + 540) % 360) - 180);
  };
  const wrongBy = (deg: number, sigma?: number) =>
    run({
      parameters: {
        initial: { headingDeg: 35 + deg, ...(sigma ? { attitudeSigmaDeg: [1, 1, sigma] } : {}) },
      },
    });

  test.each([30, -30])('by %p° recovers', (deg) => {
    expect(yawErrorAtEnd(wrongBy(deg))).toBeLessThan(1);
    expect(yawErrorAtEnd(wrongBy(deg, 30))).toBeLessThan(1);
  });

  test.each([90, -90, 180])('by %p° is reported, and found in the end', (deg) => {
    const result = wrongBy(deg);
    const warning = result.summary.warnings.find((w) => w.code === 'heading-corrected');
    expect(warning?.sentence).toMatch(/GNSS turned the heading by \d+° .*wrong/);
    expect(yawErrorAtEnd(result)).toBeLessThan(8);
  });
});

describe('gaps in the IMU log', () => {
  test('half a second is bridged and reported', () => {
    const result = run({ change: gap(100, 100.5) });
    expect(result.summary.warnings).toEqual([
      expect.objectContaining({ code: 'gap-bridged', timeS: expect.closeTo(100, 6) }),
    ]);
    expectAsGoodAsPlain(result, 1.3);
  });

  test('ten seconds do not break the solution', () => {
    const result = run({ change: gap(100, 110) });
    expect(result.summary.truth!.positionRmseM).toBeLessThan(2 * plain.summary.truth!.positionRmseM);
    expect(result.summary.truth!.aneesPosition).toBeLessThan(6);
  });

  test('jitter and single lost samples are no gaps', () => {
    expect(codes(run({ change: gap(100, 100.05) }))).toEqual([]);
  });
});

test('GNSS with position only, or with no down velocity', () => {
  const positionOnly = run({
    scenario: { gnssRateHz: 1 },
    change: ({ recording }) => recording.gnss.velocityNed.forEach((column) => column.fill(NaN)),
  });
  expect(positionOnly.velocity.timeS.length).toBe(0);
  expect(positionOnly.summary.truth!.horizontalRmseM).toBeLessThan(1.5);
  const flat = run({ change: ({ recording }) => recording.gnss.velocityNed[2].fill(NaN) });
  expect(flat.summary.groups.map((g) => g.dimension)).toEqual([3, 2]);
  expect(flat.summary.groups[1]!.nisMean!).toBeCloseTo(2, 0);
  expectAsGoodAsPlain(flat, 2);
});

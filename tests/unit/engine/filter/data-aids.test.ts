import type { ParametersInput } from '@/shared/contracts/parameters';
import { runSummarySchema, type Outage } from '@/shared/contracts/runs';
import { createRun, type RunResult } from '@/workers/engine';
import { align } from '@/workers/engine/alignment/align';
import { quatFromEuler, quatFromRotationVector, quatMultiply } from '@/workers/engine/attitude';
import {
  barometricHeight,
  forwardSpeed,
  fullAttitude,
  heading,
} from '@/workers/engine/filter/data-aid-models';
import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { MeasurementUpdate } from '@/workers/engine/filter/measurement-update';
import { STATES } from '@/workers/engine/filter/states';
import { emptyError, ReferenceReader, stateError } from '@/workers/engine/run/reference';
import type { AidErrors } from '@/workers/engine/simulator/aid-sensors';
import { averageBounds } from '@/workers/engine/statistics/consistency';
import { HEIGHT, NAV_SIZE, QUAT, VN } from '@/workers/engine/strapdown/navigation-state';
import { WideUpdate } from '@/workers/engine/filter/wide-update';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';
import { nees, requestOf, simulateCase, type SimulatedCase } from '../support/monte-carlo';

jest.setTimeout(60_000);

const SIZE = STATES + 1;
const BIAS = STATES;

function disturbed(error: Float64Array): Strapdown {
  const nav = new Float64Array(NAV_SIZE);
  nav.set([0.8, -0.25, 120, 12, -4, 0.5]);
  nav.set(quatFromEuler(0.1, -0.2, 2.1, new Float64Array(4)), QUAT);
  nav[HEIGHT] = nav[HEIGHT]! - error[2]!;
  for (let i = 0; i < 3; i += 1) nav[VN + i] = nav[VN + i]! + error[3 + i]!;
  const turn = quatFromRotationVector(-error[6]!, -error[7]!, -error[8]!, new Float64Array(4));
  nav.set(quatMultiply(turn, nav.slice(QUAT, QUAT + 4), new Float64Array(4)), QUAT);
  const strapdown = new Strapdown('coning-sculling');
  strapdown.start(nav);
  return strapdown;
}

type Model = (strapdown: Strapdown, error: Float64Array, update: MeasurementUpdate) => void;
test.each<[string, number, Model]>([
  ['barometric height', 1, (s, e, u) => barometricHeight(s, 3 + e[BIAS]!, BIAS, 125, 1, u)],
  ['heading', 1, (s, _e, u) => heading(s, 2.13, 1, u)],
  ['forward speed', 1, (s, _e, u) => forwardSpeed(s, 10, 1, u)],
  ['attitude', 3, (s, _e, u) => fullAttitude(s, 0.1, -0.2, 2.1, [1, 1, 1], u)],
])('H of %s is the derivative of its innovation', (_name, rows, model) => {
  const at = (error: Float64Array) => {
    const update = new WideUpdate(SIZE);
    model(disturbed(error), error, update);
    return update;
  };
  const { h } = at(new Float64Array(SIZE));
  for (let j = 0; j < SIZE; j += 1) {
    const size = j >= 6 && j < 9 ? 1e-5 : 1e-2;
    const error = new Float64Array(SIZE);
    error[j] = size;
    const plus = at(error).innovation;
    error[j] = -size;
    const minus = at(error).innovation;
    for (let i = 0; i < rows; i += 1)
      expect(h[i * SIZE + j]! + (plus[i]! - minus[i]!) / (2 * size)).toBeCloseTo(0, 5);
  }
});

test('a heading near the vertical says nothing, one across ±180° the short way', () => {
  const update = new MeasurementUpdate();
  const strapdown = new Strapdown('coning-sculling');
  const pointing = (pitch: number, yaw: number) => {
    const nav = new Float64Array(NAV_SIZE);
    nav[0] = 0.8;
    nav.set(quatFromEuler(0, pitch, yaw, new Float64Array(4)), QUAT);
    strapdown.start(nav);
  };
  pointing(1.55, 0);
  expect(heading(strapdown, 0, 1, update)).toBe(false);
  pointing(0, 3.1);
  expect(heading(strapdown, -3.1, 1, update)).toBe(true);
  expect(update.innovation[0]).toBeCloseTo(2 * Math.PI - 6.2, 9);
});

/** Readings that lie between IMU samples. */
const SENSORS: AidErrors = {
  barometer: { rateHz: 5, phaseS: 0.013, sigmaM: 0.4, offsetSigmaM: 20, walkMPerSqrtS: 0.05 },
  heading: { rateHz: 2, phaseS: 0.007, sigmaRad: 0.02 },
  odometer: { rateHz: 10, phaseS: 0.009, sigmaMPerS: 0.05 },
  attitude: { rateHz: 1, phaseS: 0.011, sigmaRad: 0.01 },
};
const ALL_ON: ParametersInput = {
  aids: {
    barometer: { enabled: true },
    heading: { enabled: true },
    odometer: { enabled: true },
    attitude: { enabled: true },
  },
  states: { barometerBias: { enabled: true, initialSigmaM: 20, randomWalkMPerSqrtS: 0.05 } },
};

const drive = (seed: number, parameters: ParametersInput = ALL_ON, durationS = 120) =>
  simulateCase(
    { motion: 'road', durationS, imuRateHz: 50, gnssRateHz: 2, staticStartS: 15, seed, leverArmM: [0.5, 0, -1] },
    parameters,
    { aids: SENSORS, imu: { wander: 'random-walk' } },
  ); // prettier-ignore

function complete(simulated: SimulatedCase, outages: Outage[] = [], truth = true, smooth = false): RunResult {
  const recording = truth ? simulated.recording : { ...simulated.recording, reference: null };
  const run = createRun(recording, requestOf(simulated, { outages, smooth }));
  while (!run.advance(1e6));
  return run.finish();
}

describe('over drives with all four', () => {
  const RUNS = 12;
  const nis = new Map<string, number[]>();
  const ends = Array.from({ length: RUNS }, (_, i) => {
    const simulated = drive(40 + i);
    const { recording, parameters, scenario } = simulated;
    const { imu, gnss, reference, aids } = recording;
    const fixes = prepareFixes(gnss, parameters.gnss);
    const start = align(imu, fixes, parameters, scenario.leverArmM, aids);
    const filter = new ErrorStateFilter(
      imu, fixes, new Uint8Array(fixes.count), parameters, scenario.leverArmM,
      {
        onInnovation: (name, _t, _axes, update) => nis.set(name, [...(nis.get(name) ?? []), update.nis]),
        onWarning: () => undefined,
      },
      aids,
    ); // prettier-ignore
    filter.start(start.sample, start.fix, start.nav, start.p, start.headingUntilS);
    while (filter.sample < imu.timeS.length - 1) filter.advanceSample();
    const e = emptyError();
    const reader = new ReferenceReader(reference);
    if (!reader.read(filter.timeS)) throw new Error('No truth at the end.');
    stateError(filter.strapdown.nav, reader.state, e);
    const bias = filter.optional!.barometerBias - recording.barometerBias.at(-1)!;
    const p = filter.covarianceNow(new Float64Array(SIZE * SIZE));
    return { error: Float64Array.of(...e.position, ...e.velocity, ...e.attitude), bias, p };
  });

  test.each([
    ['position', 0],
    ['velocity', 3],
    ['attitude', 6],
  ] as const)('NEES of %s within its 99.9 % bounds', (_name, first) => {
    const mean = ends.reduce((sum, { error, p }) => sum + nees(error, p, first, 3), 0) / RUNS;
    const [low, high] = averageBounds(RUNS, 3, 0.999);
    expect(mean).toBeGreaterThan(low);
    expect(mean).toBeLessThan(high);
  });

  test('the barometer’s offset is found, and its σ is true', () => {
    const at = BIAS * (SIZE + 1);
    const mean = ends.reduce((sum, { bias, p }) => sum + bias ** 2 / p[at]!, 0) / RUNS;
    const [low, high] = averageBounds(RUNS, 1, 0.999);
    expect(mean).toBeGreaterThan(low);
    expect(mean).toBeLessThan(high);
    for (const { p } of ends) expect(Math.sqrt(p[at]!)).toBeLessThan(1);
  });

  test.each([
    ['barometer', 1],
    ['heading', 1],
    ['odometer', 1],
    ['attitude', 3],
  ] as const)('mean NIS of %s within its 99.9 % bounds', (name, dimension) => {
    const values = nis.get(name)!;
    const mean = values.reduce((sum, x) => sum + x, 0) / values.length;
    const [low, high] = averageBounds(values.length, dimension, 0.999);
    expect(mean).toBeGreaterThan(low);
    expect(mean).toBeLessThan(high);
  });
});

test('a barometer’s offset settles where Riccati’s equation says', () => {
  // Height known to a millimetre: p = (p + QΔt) R/(p + QΔt + R) after each reading.
  const simulated = simulateCase(
    {
      motion: 'static', durationS: 60, imuRateHz: 20, gnssRateHz: 20, seed: 3,
      gnss: { positionSigmaHorizontalM: 0.001, positionSigmaVerticalM: 0.001 },
    },
    {
      initial: { headingDeg: 35 },
      gnss: { positionFloorM: 0 },
      aids: { barometer: { enabled: true, sigmaSource: 'fixed', sigmaM: 0.5 } },
      states: { barometerBias: { enabled: true, initialSigmaM: 30, randomWalkMPerSqrtS: 0.2 } },
    },
    { aids: { barometer: { rateHz: 4, sigmaM: 0.5 } } },
  ); // prettier-ignore
  const [q, r] = [0.2 ** 2 / 4, 0.5 ** 2];
  const before = (q + Math.sqrt(q * q + 4 * q * r)) / 2;
  const result = complete(simulated);
  const column = result.solution.sigma_barometer_bias_m!;
  // The last row lies on a reading's own time.
  expect(column.at(-1)! ** 2 / ((before * r) / (before + r))).toBeCloseTo(1, 2);
});

describe('a run', () => {
  const simulated = drive(5);

  test('reports each aid and the barometer’s offset, as the contract has it', () => {
    const { summary } = complete(simulated);
    expect(runSummarySchema.parse(summary)).toEqual(summary);
    const used = Object.fromEntries(summary.aids!.map((a) => [a.aid, a.used + a.rejected]));
    // The heading that started the filter is not used again.
    expect(used).toEqual({ barometer: 600, heading: 239, odometer: 1200, attitude: 120 });
    expect(summary.optionalStates!.map((s) => s.name)).toEqual(['barometer_bias_m']);
    expect(summary.alignment.heading).toBe('aid');
    expect(summary.alignment.attitudeSigmaDeg[2]).toBeCloseTo((0.02 * 180) / Math.PI, 1);
  });

  test('withholds an aid in its window and nothing else, forked or straight', () => {
    const outages: Outage[] = [
      { startS: 40, endS: 60, withhold: 'odometer' },
      { startS: 70, endS: 90, withhold: 'heading' },
    ];
    const [straight, forked] = [complete(simulated, outages), complete(simulated, outages, false)];
    const count = (result: RunResult, aid: string) => {
      const found = result.summary.aids!.find((a) => a.aid === aid)!;
      return found.used + found.rejected;
    };
    expect(count(straight, 'odometer')).toBe(1000);
    expect(count(straight, 'heading')).toBe(199);
    expect(count(straight, 'barometer')).toBe(600);
    expect(straight.position.timeS.length).toBe(complete(simulated).position.timeS.length);
    for (const name of Object.keys(straight.solution))
      expect(forked.solution[name]).toEqual(straight.solution[name]);
    expect(forked.summary.outages.map((o) => o.withhold)).toEqual(['odometer', 'heading']);
    expect(forked.summary.outages[0]!.points.at(-1)!.horizontalM).toBeGreaterThan(0);
  });

  test('coasts better with odometer and heading, and knows it', () => {
    const outage: Outage[] = [{ startS: 60, endS: 110, withhold: 'gnss' }];
    const aided = complete(simulated, outage).summary.outages[0]!.points.at(-1)!;
    const plain = complete(drive(5, {}), outage).summary.outages[0]!.points.at(-1)!;
    expect(aided.predictedHorizontalM).toBeLessThan(0.5 * plain.predictedHorizontalM);
    expect(aided.horizontalM).toBeLessThan(3.5 * aided.predictedHorizontalM);
    expect(aided.verticalM).toBeLessThan(3.5 * aided.predictedVerticalM);
  });

  test('smooths over the aids', () => {
    const { smoothed, solution, summary } = complete(simulated, [], true, true);
    expect(summary.smoothedTruth!.horizontalRmseM).toBeLessThan(summary.truth!.horizontalRmseM);
    smoothed!.sigma_barometer_bias_m!.forEach((s, i) =>
      expect(s).toBeLessThan(solution.sigma_barometer_bias_m![i]! * 1.0001),
    );
  });

  test('refuses readings that are far off and passes over missing ones', () => {
    const spoilt = drive(6);
    const { heading: compass, odometer } = spoilt.recording.aids!;
    for (let k = 100; k < 110; k += 1) compass!.headingRad[k] = compass!.headingRad[k]! + 1;
    odometer!.speedMPerS.fill(NaN, 500, 600);
    const { aids } = complete(spoilt).summary;
    const of = (name: string) => aids!.find((a) => a.aid === name)!;
    expect(of('heading').rejected).toBeGreaterThanOrEqual(10);
    expect(of('heading').rejected).toBeLessThan(14);
    expect(of('odometer').used + of('odometer').rejected).toBe(1100);
  });

  test('switched off, what is logged changes nothing', () => {
    const off = drive(5, {});
    const [a, b] = [complete(off), complete({ ...off, recording: { ...off.recording, aids: null } })];
    expect(a.solution).toEqual(b.solution);
    expect(a.summary).toEqual(b.summary);
  });
});

test('a vehicle that never moves starts with a heading aid, and says without one what would help', () => {
  const still = (parameters: ParametersInput) =>
    simulateCase({ motion: 'static', durationS: 30, imuRateHz: 20, seed: 2 }, parameters, {
      aids: { heading: { rateHz: 1, sigmaRad: 0.03 } },
    });
  const { summary } = complete(still({ aids: { heading: { enabled: true } } }));
  expect(summary.alignment.heading).toBe('aid');
  expect(Math.abs(summary.alignment.attitudeDeg[2] - 35)).toBeLessThan(4 * 1.72);
  expect(summary.truth!.attitudeRmseDeg!.yaw).toBeLessThan(4);
  expect(() => complete(still({}))).toThrow(/switch on a heading aid/);
});

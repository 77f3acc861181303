import { FRAME_TABLES } from '@/shared/contracts/frames';
import { parametersSchema } from '@/shared/contracts/parameters';
import { runSummarySchema, SOLUTION_COLUMNS, type Outage } from '@/shared/contracts/runs';
import { createRun, EngineError, type EngineRun, type RunResult } from '@/workers/engine';
import { requestOf, simulateCase, type SimulatedCase } from '../support/monte-carlo';

const road = simulateCase({
  motion: 'road',
  durationS: 150,
  imuRateHz: 50,
  gnssRateHz: 5,
  staticStartS: 15,
  leverArmM: [0.4, -0.2, -1.1],
  seed: 7,
});
const withoutTruth: SimulatedCase = {
  ...road,
  recording: { ...road.recording, reference: null as unknown as SimulatedCase['recording']['reference'] },
};
const GNSS_OUT: Outage = { startS: 60, endS: 80, withhold: 'gnss' };

function complete(run: EngineRun, slice = 1000): RunResult {
  while (!run.advance(slice));
  return run.finish();
}

const runOf = (simulated: SimulatedCase, outages: Outage[] = [], outputRateHz = 10) =>
  createRun(simulated.recording, requestOf(simulated, { outages, outputRateHz }));

/** All numbers of a result as bytes. */
function bytes(result: RunResult): Buffer {
  const parts: ArrayBufferView[] = [...Object.values(result.solution), ...Object.values(result.coasting)];
  for (const table of [result.position, result.velocity])
    parts.push(table.timeS, ...table.innovation, ...table.sigma, table.nis, table.accepted);
  return Buffer.concat(parts.map((a) => Buffer.from(a.buffer, a.byteOffset, a.byteLength)));
}

describe('a run without outages', () => {
  const run = runOf(road);
  const result = complete(run);

  test('keeps the solution at IMU samples next to the output grid, first and last included', () => {
    const time = result.solution.time_s!;
    expect(Object.keys(result.solution)).toEqual([...SOLUTION_COLUMNS, 'cov_ne_m2']);
    expect(time.length).toBe(1501);
    time.forEach((t, i) => expect(t).toBeCloseTo(i / 10, 9));
  });

  test('gives a summary as the contract has it', () => {
    const { summary } = result;
    expect(runSummarySchema.parse(summary)).toEqual(summary);
    expect(summary.imuSamples).toBe(7501);
    expect(summary.durationS).toBeCloseTo(150, 9);
    expect(summary.alignment.levelling).toBe('static');
    expect(summary.outages).toEqual([]);
  });

  test('is near the truth, and its covariance knows how near', () => {
    const truth = result.summary.truth!;
    expect(truth.horizontalRmseM).toBeLessThan(1);
    expect(truth.velocityRmseMPerS!).toBeLessThan(0.15);
    expect(truth.attitudeRmseDeg!.yaw).toBeLessThan(2);
    expect(truth.aneesPosition).toBeGreaterThan(1);
    expect(truth.aneesPosition).toBeLessThan(9);
    expect(truth.epochs).toBe(1501);
  });

  test('lists every fix with its innovation, σ and verdict', () => {
    const { position, velocity } = result;
    // The fix that gave the start position is not used again.
    expect(position.timeS.length).toBe(750);
    expect(velocity.timeS.length).toBe(750);
    const used = result.summary.groups.map((g) => g.used + g.rejected);
    expect(used).toEqual([750, 750]);
    for (let i = 0; i < position.timeS.length; i += 1) {
      const sum = [0, 1, 2].map(
        (a) => position.innovation[a as 0 | 1 | 2][i]! / position.sigma[a as 0 | 1 | 2][i]!,
      );
      // Axes of one fix are almost independent here: NIS near the sum of squares.
      expect(position.nis[i]! / sum.reduce((s, z) => s + z * z, 1e-9)).toBeCloseTo(1, 0);
    }
  });
});

/** The same drive with other sensors logged too; `parameters` say what is made of them. */
function withEverything(): SimulatedCase {
  const simulated = simulateCase(
    { ...road.scenario, durationS: 90 },
    {
      aids: {
        barometer: { enabled: true },
        heading: { enabled: true },
        odometer: { enabled: true },
        attitude: { enabled: true },
        nonHolonomic: { enabled: true },
      },
      states: {
        gyroScale: { enabled: true },
        accelScale: { enabled: true },
        leverArm: { enabled: true },
        barometerBias: { enabled: true },
      },
    },
    {
      aids: {
        barometer: { rateHz: 4, phaseS: 0.013, sigmaM: 0.5, offsetSigmaM: 10 },
        heading: { rateHz: 3, phaseS: 0.007, sigmaRad: 0.02 },
        odometer: { rateHz: 7, sigmaMPerS: 0.1 },
        attitude: { rateHz: 1, sigmaRad: 0.01 },
      },
    },
  );
  return { ...simulated, recording: { ...simulated.recording, reference: null as never } };
}

test.each([
  ['all options off', () => withoutTruth],
  ['all states and aids on', withEverything],
])('the same input gives the same bytes, however it is sliced: %s', (_name, make) => {
  const simulated = make();
  const once = complete(runOf(simulated, [GNSS_OUT]), 1e9);
  const again = complete(runOf(simulated, [GNSS_OUT]), 37);
  expect(bytes(once).equals(bytes(again))).toBe(true);
  expect(once.summary).toEqual(again.summary);
  expect(once.solution.lat_deg!.every(Number.isFinite)).toBe(true);
});

test('the output rate does not change the solution', () => {
  const coarse = complete(runOf(road, [], 1));
  const fine = complete(runOf(road, [], 50));
  expect(fine.solution.time_s!.length).toBe(7501);
  coarse.solution.time_s!.forEach((t, i) => {
    const j = fine.solution.time_s!.indexOf(t);
    for (const name of ['lat_deg', 've_m_s', 'yaw_deg', 'sigma_n_m', 'sigma_yaw_deg'])
      expect(fine.solution[name]![j]).toBe(coarse.solution[name]![i]);
  });
});

describe('an outage window', () => {
  test('against the fully aided solution where there is no truth', () => {
    const result = complete(runOf(withoutTruth, [GNSS_OUT]));
    const [outage] = result.summary.outages;
    expect(outage).toMatchObject({ startS: 60, endS: 80, reference: 'aided' });
    expect(outage!.points.map((p) => p.afterS)).toEqual([10, 20]);
    const [ten, end] = outage!.points;
    expect(end!.predictedHorizontalM).toBeGreaterThan(ten!.predictedHorizontalM);
    expect(end!.horizontalM).toBeLessThan(4 * end!.predictedHorizontalM);
    expect(result.summary.truth).toBeNull();
    expect(Object.keys(result.coasting)).toEqual([...FRAME_TABLES.coasting]);
    expect(result.coasting.time_s![0]).toBeCloseTo(60, 9);
    expect(result.coasting.time_s!.length).toBe(200);
    expect(result.coasting.horizontal_m![0]).toBeLessThan(0.05);
  });

  test('against truth where the recording has it', () => {
    const result = complete(runOf(road, [GNSS_OUT]));
    expect(result.summary.outages[0]!.reference).toBe('truth');
    expect(result.summary.outages[0]!.points).toHaveLength(2);
  });

  test('withholds the named channels in [start, end) and no others', () => {
    const start = 60;
    const end = 80;
    const inside = (t: Float64Array) => t.filter((x) => x >= start && x < end).length;
    const counts = (withhold: Outage['withhold']) => {
      const { position, velocity } = complete(runOf(road, [{ startS: start, endS: end, withhold }]));
      return [inside(position.timeS), inside(velocity.timeS)];
    };
    expect(counts('gnss')).toEqual([0, 0]);
    expect(counts('position')).toEqual([0, 100]);
    expect(counts('velocity')).toEqual([100, 0]);
  });

  test('forks: before the window all is as without it', () => {
    const free = complete(runOf(withoutTruth));
    const cut = complete(runOf(withoutTruth, [GNSS_OUT]));
    for (const name of SOLUTION_COLUMNS) {
      const upTo = 600;
      expect(cut.solution[name]!.subarray(0, upTo)).toEqual(free.solution[name]!.subarray(0, upTo));
    }
    expect(cut.solution.lat_deg![700]).not.toBe(free.solution.lat_deg![700]);
  });

  test('forked from the aided pass equals run from the start', () => {
    // With truth there is one pass with the windows applied; without it the coasting pass forks.
    const forked = complete(runOf(withoutTruth, [GNSS_OUT]));
    const straight = complete(runOf(road, [GNSS_OUT]));
    for (const name of SOLUTION_COLUMNS) expect(forked.solution[name]).toEqual(straight.solution[name]);
    expect(forked.position.nis).toEqual(straight.position.nis);
  });

  test('forks with optional states as without', () => {
    const states = {
      gyroScale: { enabled: true },
      accelScale: { enabled: true },
      leverArm: { enabled: true },
    };
    const parameters = parametersSchema.parse({ ...road.parameters, states });
    const [forked, straight] = [withoutTruth, road].map((simulated) =>
      complete(runOf({ ...simulated, parameters }, [GNSS_OUT])),
    );
    const names = Object.keys(straight!.solution);
    expect(names.slice(-2)).toEqual(['sigma_lever_arm_y_m', 'sigma_lever_arm_z_m']);
    for (const name of names) expect(forked!.solution[name]).toEqual(straight!.solution[name]);
    const { summary } = straight!;
    expect(runSummarySchema.parse(summary)).toEqual(summary);
    const arm = summary.optionalStates!.find((s) => s.name === 'lever_arm_x_m')!;
    expect(arm).toMatchObject({ unit: 'm', firstSigma: 0.2 });
    expect(Math.abs(arm.value - 0.4)).toBeLessThan(4 * arm.sigma);
    expect(arm.sigma).toBeLessThan(0.9 * arm.firstSigma);
  });

  test('predicted σ grows as the error does, over several windows', () => {
    const outages = [30, 60, 90, 120].map((startS) => ({
      startS,
      endS: startS + 20,
      withhold: 'gnss' as const,
    }));
    const { outages: results } = complete(runOf(road, outages)).summary;
    expect(results.map((o) => o.startS)).toEqual([30, 60, 90, 120]);
    const ratios = results.map((o) => o.points.at(-1)!.horizontalM / o.points.at(-1)!.predictedHorizontalM);
    expect(Math.sqrt(ratios.reduce((s, r) => s + r * r, 0) / 4)).toBeLessThan(2);
  });

  test('at the very start and past the end of the recording', () => {
    const outages: Outage[] = [
      { startS: -5, endS: 5, withhold: 'gnss' },
      { startS: 140, endS: 300, withhold: 'gnss' },
      { startS: 400, endS: 500, withhold: 'gnss' },
    ];
    const result = complete(runOf(withoutTruth, outages));
    const [first, last, beyond] = result.summary.outages;
    expect(first!.points.length).toBeGreaterThan(0);
    expect(last!.points.at(-1)!.afterS).toBeCloseTo(10, 6);
    expect(beyond!.points).toEqual([]);
  });
});

test('progress and rows grow as the run goes', () => {
  const run = runOf(withoutTruth, [GNSS_OUT]);
  let progress = 0;
  let rows = 0;
  while (!run.advance(500)) {
    expect(run.progress).toBeGreaterThanOrEqual(progress);
    expect(run.counts.solution).toBeGreaterThanOrEqual(rows);
    progress = run.progress;
    rows = run.counts.solution;
    expect(run.reachedS).toBe(run.tables.solution.time_s![rows - 1]);
  }
  expect(run.progress).toBe(1);
  expect(run.reachedS).toBeCloseTo(150, 9);
});

describe('data that cannot be filtered', () => {
  const attempt = (change: (simulated: SimulatedCase) => void) => {
    const copy = simulateCase({ motion: 'road', durationS: 40, imuRateHz: 20, staticStartS: 10, seed: 3 });
    change(copy);
    try {
      complete(createRun(copy.recording, requestOf(copy)));
    } catch (error) {
      if (error instanceof EngineError) return `${error.code}: ${error.message}`;
      throw error;
    }
    return 'no error';
  };

  test('IMU and GNSS that do not overlap', () => {
    expect(attempt(({ recording }) => recording.gnss.timeS.forEach((t, i, a) => (a[i] = t + 1000)))).toMatch(
      /^no-overlap: No GNSS position lies within the IMU log .*clocks/,
    );
  });
  test('a vehicle that never moves has no heading', () => {
    const still = simulateCase({ motion: 'static', durationS: 30, imuRateHz: 20 });
    expect(() => createRun(still.recording, requestOf(still))).toThrow(
      /Heading cannot be found: the log never exceeds 2 m\/s.*initial\.headingDeg/,
    );
  });
  test('a value that is not a number', () => {
    expect(attempt(({ recording }) => (recording.imu.accel[1][500] = NaN))).toMatch(
      /^not-finite: .*near 25\.\d+ s/,
    );
  });
  test('times that do not increase', () => {
    expect(attempt(({ recording }) => (recording.imu.timeS[300] = 1))).toMatch(/^time-order: /);
  });
  test('a log of a few samples', () => {
    expect(
      attempt((simulated) => {
        const { imu } = simulated.recording;
        simulated.recording.imu = { ...imu, timeS: imu.timeS.slice(0, 3) };
      }),
    ).toMatch(/^too-short: The IMU log holds 3 samples/);
  });
});

test('whiteness: lags 1 to 20 and Ljung–Box, and correlated fixes fail it', () => {
  const white = complete(runOf(road)).summary.channels;
  for (const channel of white) {
    expect(channel.autocorrelation).toHaveLength(20);
    expect(channel.lag1).toBe(channel.autocorrelation![0]);
    expect(channel.whitenessP!).toBeGreaterThan(1e-4);
  }
  const drifting = simulateCase({
    motion: 'road',
    durationS: 150,
    imuRateHz: 50,
    staticStartS: 15,
    seed: 7,
    gnss: { correlationTimeS: 20 },
  });
  const result = complete(runOf(drifting)).summary;
  expect(result.channels[0]!.whitenessP!).toBeLessThan(1e-6);
  expect(result.findings.map((f) => f.code)).toContain('position-correlated');
});

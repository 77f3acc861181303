import { createRun, EngineError } from '@/workers/engine';
import { createSearch, type SearchCase, type SearchRequest } from '@/workers/engine/search';
import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { align } from '@/workers/engine/alignment/align';
import { determinant, inverse, Matrix } from 'ml-matrix';
import { simulateCase, type SimulatedCase } from '../support/monte-carlo';

jest.setTimeout(60_000);

const drive = simulateCase({
  motion: 'road',
  durationS: 180,
  imuRateHz: 20,
  gnssRateHz: 2,
  staticStartS: 20,
  seed: 4,
  imuGrade: 'consumer',
});

const caseOf = (simulated: SimulatedCase, more: Partial<SearchCase> = {}): SearchCase => ({
  recording: simulated.recording,
  leverArmM: simulated.scenario.leverArmM,
  trainingS: [[0, 120]],
  heldOutS: [[120, 181]],
  ...more,
});

/** Both R scales, started wrong. */
function requestOf(more: Partial<SearchRequest> = {}, source = caseOf(drive)): SearchRequest {
  const parameters = structuredClone(drive.parameters);
  parameters.gnss.positionScale = 3;
  parameters.gnss.velocityScale = 0.4;
  return {
    cases: [source],
    parameters,
    tuned: [{ name: 'positionScale' }, { name: 'velocityScale' }],
    evaluations: 30,
    ...more,
  };
}

function searched(request: SearchRequest, slice = 1e6) {
  const search = createSearch(request);
  const progress: number[] = [];
  while (!search.advance(slice)) progress.push(search.progress);
  return { result: search.finish(), progress, search };
}

const plain = searched(requestOf());

test('finds the receiver’s true accuracies, and says how well', () => {
  for (const { value, standing, sigmaPercent, start } of plain.result.tuned) {
    expect(standing).toBe('observable');
    expect(Math.abs(Math.log(value))).toBeLessThan((3 * sigmaPercent!) / 100);
    expect(sigmaPercent!).toBeLessThan(10);
    expect([3, 0.4]).toContain(start);
  }
  expect(plain.result.converged).toBe(true);
  expect(plain.result.parameters.gnss.positionScale).toBe(plain.result.tuned[0]!.value);
  expect(plain.result.parameters.gyro).toEqual(drive.parameters.gyro);
});

test('both sides of the split are scored, at the start and at the end', () => {
  const { training, heldOut } = plain.result;
  // Position and velocity, twice a second: 120 s less alignment and settling, and the last minute.
  expect(training.start.groups).toBe(training.tuned.groups);
  expect(heldOut!.tuned.groups).toBe(2 * 2 * 60 + 2);
  expect(training.tuned.negativeLogLikelihood).toBeLessThan(training.start.negativeLogLikelihood - 100);
  expect(heldOut!.tuned.perGroup).toBeLessThan(heldOut!.start.perGroup - 0.5);
  expect(training.tuned.perGroup * training.tuned.groups).toBeCloseTo(
    training.tuned.negativeLogLikelihood,
    6,
  );
});

test('in slices of any size: the same values, progress that never falls', () => {
  const fine = searched(requestOf(), 777);
  expect(fine.result).toEqual(plain.result);
  expect(fine.progress.length).toBeGreaterThan(100);
  expect(fine.progress).toEqual([...fine.progress].sort((a, b) => a - b));
  expect(fine.search.progress).toBe(1);
  expect(fine.search.evaluations).toBe(fine.result.evaluations);
});

test('a slice is as long as asked for: cancel is heard between them', () => {
  const search = createSearch(requestOf());
  search.advance(500);
  expect(search.evaluations).toBe(0);
  for (let i = 0; i < 10; i += 1) search.advance(500);
  expect(search.evaluations).toBeGreaterThan(0);
  expect(search.evaluations).toBeLessThan(4);
  expect(() => search.finish()).toThrow('finish() before');
});

test('what is held out moves nothing', () => {
  const gnss = drive.recording.gnss;
  const spoilt = { ...gnss, heightM: gnss.heightM.map((h, j) => (gnss.timeS[j]! > 120 ? h + 400 : h)) };
  const other = { ...drive.recording, gnss: spoilt };
  const { result } = searched(requestOf({}, caseOf({ ...drive, recording: other })));
  expect(result.tuned).toEqual(plain.result.tuned);
  expect(result.heldOut!.tuned.perGroup).toBeGreaterThan(plain.result.heldOut!.tuned.perGroup + 1);
});

test('without outliers’ share the score is Σ(ln|S| + νᵀS⁻¹ν) of the filter’s own innovations', () => {
  const request = requestOf({ outlierShare: 0 });
  const { parameters } = request;
  parameters.gate.enabled = false;
  const { imu, gnss } = drive.recording;
  const fixes = prepareFixes(gnss, parameters.gnss);
  const { sample, fix, nav, p } = align(imu, fixes, parameters, drive.scenario.leverArmM);
  let sum = 0;
  // The first fifth, at most two minutes, is left to settle.
  const settledS = imu.timeS[sample]! + 0.2 * (180 - imu.timeS[sample]!);
  const none = new Uint8Array(fixes.count);
  const filter = new ErrorStateFilter(imu, fixes, none, parameters, drive.scenario.leverArmM, {
    onWarning: () => undefined,
    onInnovation: (_group, timeS, _axes, { s, innovation }) => {
      if (timeS < settledS || timeS >= 120) return;
      const covariance = Matrix.from1DArray(3, 3, [...s]);
      const v = Matrix.columnVector([...innovation]);
      sum += Math.log(determinant(covariance)) + v.transpose().mmul(inverse(covariance)).mmul(v).get(0, 0);
    },
  });
  filter.start(sample, fix, nav, p);
  while (filter.sample < imu.timeS.length - 1) filter.advanceSample();
  expect(searched(request).result.training.start.negativeLogLikelihood / sum).toBeCloseTo(1, 9);
});

test('outliers do not buy themselves a larger R', () => {
  const spoilt = simulateCase({ ...drive.scenario, gnss: { outlierShare: 0.03, outlierSigmas: 50 } });
  const request = requestOf({}, caseOf({ ...drive, recording: spoilt.recording }));
  const scale = (r: SearchRequest) => searched(r).result.tuned[0]!.value;
  expect(Math.abs(scale(request) - 1)).toBeLessThan(0.25);
  expect(scale({ ...request, outlierShare: 0 })).toBeGreaterThan(3);
});

describe('coasting', () => {
  const outages = [
    { startS: 60, endS: 75, withhold: 'gnss' as const },
    { startS: 90, endS: 110, withhold: 'gnss' as const },
    { startS: 140, endS: 160, withhold: 'gnss' as const },
  ];
  /** What a run of the same parameters with one outage gives. */
  function drift(
    outage: (typeof outages)[number],
    recording = drive.recording as SearchCase['recording'],
  ): number {
    const { parameters, scenario } = drive;
    const run = createRun(recording, {
      parameters,
      leverArmM: scenario.leverArmM,
      outages: [outage],
      outputRateHz: 1,
    });
    while (!run.advance(1e6));
    return run.finish().summary.outages[0]!.points.at(-1)!.horizontalM;
  }
  const rms = (values: number[]) => Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);
  const still = {
    parameters: drive.parameters,
    evaluations: 1,
    tuned: [{ name: 'accelTurnOnBias' as const }],
  };

  test.each([
    ['truth', drive.recording],
    ['the aided solution', { ...drive.recording, reference: null }],
  ] as const)('forks drift as runs of their own do, against %s', (_name, recording) => {
    const source = caseOf({ ...drive, recording: recording as typeof drive.recording }, { outages });
    const { training, heldOut } = searched(requestOf(still, source)).result;
    expect([training.start.windows, heldOut!.start.windows]).toEqual([2, 1]);
    const expected = outages.map((outage) => drift(outage, recording));
    expect(training.start.driftRmsM!).toBeCloseTo(rms(expected.slice(0, 2)), 2);
    expect(heldOut!.start.driftRmsM!).toBeCloseTo(expected[2]!, 2);
  });

  test('the fixes are scored as if nothing had been withheld', () => {
    const withForks = searched(requestOf(still, caseOf(drive, { outages }))).result.training.start;
    const without = searched(requestOf(still)).result.training.start;
    expect(withForks.negativeLogLikelihood).toBe(without.negativeLogLikelihood);
    expect(without.driftRmsM).toBeNull();
  });

  test('weighed heavily, drift is what is made small', () => {
    const request = requestOf({ tuned: [{ name: 'velocityScale' }] }, caseOf(drive, { outages }));
    const light = searched(request).result.training.tuned;
    const heavy = searched({ ...request, driftWeight: 100 }).result.training.tuned;
    expect(heavy.driftRmsM!).toBeLessThan(light.driftRmsM!);
    expect(heavy.negativeLogLikelihood).toBeGreaterThan(light.negativeLogLikelihood);
  });
});

test('what the data do not tell gets no number', () => {
  const { tuned } = searched(
    requestOf({ tuned: [{ name: 'positionScale' }, { name: 'gyroTurnOnBias' }] }),
  ).result;
  expect(tuned[0]!.standing).toBe('observable');
  expect(tuned[1]!.standing).not.toBe('observable');
  expect(tuned[1]!.sigmaPercent).toBeNull();
});

test('a value at its bound is said to be there', () => {
  const { tuned } = searched(requestOf({ tuned: [{ name: 'positionScale', bounds: [2, 5] }] })).result;
  expect(tuned[0]).toMatchObject({ standing: 'at-bound', sigmaPercent: null });
  expect(tuned[0]!.value).toBeCloseTo(2, 3);
});

test('a narrow prior holds where the data are weak, and is not taken for the data’s word', () => {
  const prior = { value: drive.parameters.gyro.turnOnBiasSigmaRadPerS, factor: 1.05 };
  const { tuned } = searched(requestOf({ tuned: [{ name: 'gyroTurnOnBias', prior }] })).result;
  expect(Math.abs(tuned[0]!.value / prior.value - 1)).toBeLessThan(0.1);
  expect(tuned[0]!.sigmaPercent).toBeNull();
});

describe('a request that cannot be carried out says why', () => {
  const source = caseOf(drive);
  test.each([
    [{ tuned: [] }, 'Name at least one'],
    [{ tuned: [{ name: 'positionScale' }, { name: 'positionScale' }] }, 'Name each once'],
    [{ cases: [{ ...source, trainingS: [] }] }, 'Give at least one recording a training interval'],
    [{ cases: [{ ...source, heldOutS: [[100, 140]] }] }, 'recording 1 overlap near 100 s'],
    [{ cases: [{ ...source, trainingS: [[50, 50]] }] }, 'ends at 50 s, not after its start'],
    [
      { cases: [{ ...source, outages: [{ startS: 110, endS: 130, withhold: 'gnss' }] }] },
      'outage at 110 s of recording 1',
    ],
    [{ tuned: [{ name: 'positionScale', bounds: [0.001, 10] }] }, 'lie within 0.01 and 100 1'],
    [{ tuned: [{ name: 'positionScale', bounds: [0.5, 2] }] }, 'lies outside its bounds'],
    [{ tuned: [{ name: 'positionScale', prior: { value: 1, factor: 1 } }] }, 'a factor above 1'],
    [{ outlierShare: 0.5 }, '[0, 0.5)'],
    [{ driftWeight: -1 }, 'must not be negative'],
  ] as [Partial<SearchRequest>, string][])('%j', (change, words) => {
    expect(() => createSearch(requestOf(change))).toThrow(EngineError);
    expect(() => createSearch(requestOf(change))).toThrow(words);
  });

  test('training that ends before the filter has settled', () => {
    const search = createSearch(requestOf({}, { ...source, trainingS: [[0, 5]] }));
    expect(() => search.advance(1e6)).toThrow('No fix lies in the training intervals');
  });

  test('a start that cannot be aligned', () => {
    const gnss = { ...drive.recording.gnss, latRad: drive.recording.gnss.latRad.map(() => NaN) };
    const search = createSearch(requestOf({}, { ...source, recording: { ...drive.recording, gnss } }));
    expect(() => search.advance(1e6)).toThrow(EngineError);
  });
});

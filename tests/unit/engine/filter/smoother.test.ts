import { inverse, Matrix } from 'ml-matrix';
import { dcmFromQuat, quatFromRotationVector } from '@/workers/engine/attitude';
import { align } from '@/workers/engine/alignment/align';
import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { Smoother } from '@/workers/engine/filter/smoother';
import type { StateLayout } from '@/workers/engine/filter/states';
import { BREAK, OUTPUT, STEP, Tape, UPDATE } from '@/workers/engine/filter/tape';
import { transitionOf } from '@/workers/engine/filter/wide-transition';
import type { ParametersInput } from '@/shared/contracts/parameters';
import { createRun, type RunResult } from '@/workers/engine';
import { requestOf, simulateCase } from '../support/monte-carlo';

jest.setTimeout(30_000);
const square = (values: Float64Array) =>
  Matrix.from1DArray(Math.sqrt(values.length), Math.sqrt(values.length), values);

/** A filter pass with its tape, an output at each whole second. */
function taped(states: ParametersInput['states']) {
  const { recording, parameters, scenario } = simulateCase(
    {
      motion: 'road',
      durationS: 40,
      imuRateHz: 20,
      gnssRateHz: 2,
      staticStartS: 10,
      seed: 9,
      leverArmM: [1, 0, -1],
    },
    { mechanisation: { covarianceIntervalS: 0 }, states },
  );
  const { imu, gnss } = recording;
  const fixes = prepareFixes(gnss, parameters.gnss);
  const start = align(imu, fixes, parameters, scenario.leverArmM);
  const silent = { onInnovation: () => undefined, onWarning: () => undefined };
  const filter = new ErrorStateFilter(
    imu, fixes, new Uint8Array(fixes.count), parameters, scenario.leverArmM, silent,
  ); // prettier-ignore
  const { size } = filter.layout;
  const tape = new Tape(size);
  filter.tape = tape;
  filter.start(start.sample, start.fix, start.nav, start.p);
  while (filter.sample < imu.timeS.length - 1) {
    filter.advanceSample();
    if (filter.sample % 20 === 0)
      tape.writeOutput(
        filter.sample,
        filter.motion,
        filter.covarianceNow(new Float64Array(size * size)),
        filter.optional?.values,
      );
  }
  return { filter, tape, startP: start.p };
}

interface Moment {
  kind: number;
  sample: number;
  /** Of a step: its transition and length, s. */
  phi: Matrix;
  dt: number;
  /** Of an update: I − KH, the correction that was fed back, the reset of attitude and accelerometer bias. */
  rest: Matrix;
  correction: Matrix;
  reset: Matrix;
  /** Covariance before and after. */
  prior: Matrix;
  p: Matrix;
}

/** Rauch, Tung & Striebel (1965) with dense matrices, over the same records read forward. */
function rauchTungStriebel({ filter, tape, startP }: ReturnType<typeof taped>, layout: StateLayout) {
  const N = layout.size;
  const moments: Moment[] = [];
  const zero = () => Matrix.zeros(N, 1);
  for (let kind = tape.back(); ; kind = tape.isEmpty ? 0 : tape.back()) {
    if (kind === 0) break;
    const moment: Moment = {
      kind,
      sample: tape.sample,
      phi: Matrix.eye(N),
      dt: tape.motion.sumForce[3]!,
      rest: Matrix.eye(N),
      correction: zero(),
      reset: Matrix.eye(N),
      prior: Matrix.eye(N),
      p: Matrix.eye(N),
    };
    if (kind === STEP) {
      const transition = transitionOf(layout);
      transition.form(tape.motion, 0, 0);
      moment.phi = square(transition.dense(new Float64Array(N * N)));
    }
    if (kind === UPDATE) {
      const h = Matrix.from1DArray(3, N, tape.h);
      const k = Matrix.from1DArray(N, 3, tape.gain);
      moment.correction = k.mmul(Matrix.columnVector(tape.innovation));
      moment.rest = Matrix.eye(N).sub(k.mmul(h));
      const [n, e, d] = tape.turn as unknown as [number, number, number];
      const [c, s] = [Math.cos(d), Math.sin(d)];
      const tilt = new Matrix([[1, 0, -e / 2], [0, 1, n / 2], [e / 2, -n / 2, 1]]); // prettier-ignore
      moment.reset.setSubMatrix(new Matrix([[c, s, 0], [-s, c, 0], [0, 0, 1]]).mmul(tilt), 6, 6); // prettier-ignore
      const [x, y, z] = tape.tilt as unknown as [number, number, number];
      const turn = dcmFromQuat(quatFromRotationVector(x, y, z, new Float64Array(4)), new Float64Array(9));
      moment.reset.setSubMatrix(square(turn), 12, 12);
    }
    expect(kind).not.toBe(BREAK);
    moments.unshift(moment);
    if (tape.isEmpty) break;
  }
  // Forward: covariances before and after each moment.
  let p = square(startP);
  const q = (dt: number) => {
    filter.noise.fill(dt);
    return Matrix.diag([...filter.noise.half]);
  };
  for (const moment of moments) {
    if (moment.kind === STEP) {
      const half = q(moment.dt);
      moment.prior = p;
      p = moment.phi.mmul(Matrix.add(p, half)).mmul(moment.phi.transpose()).add(half);
    }
    if (moment.kind === UPDATE) {
      p = moment.rest.mmul(p);
      p = moment.reset.mmul(p.add(p.transpose()).mul(0.5)).mmul(moment.reset.transpose());
    }
    moment.p = p;
  }
  return backward(moments, N);
}

/** Smoothed correction and covariance at the outputs. */
function backward(moments: Moment[], N: number) {
  const out = new Map<number, { e: Matrix; p: Matrix }>();
  let e = Matrix.zeros(N, 1);
  let ps = moments.at(-1)!.p.clone();
  for (const moment of [...moments].reverse()) {
    if (moment.kind === OUTPUT) out.set(moment.sample, { e: e.clone(), p: ps.clone() });
    if (moment.kind === UPDATE) {
      // Against the state before the correction; the smoothed covariance is the same but for the reset.
      const back = inverse(moment.reset);
      e = back.mmul(e).add(moment.correction);
      ps = back.mmul(ps).mmul(back.transpose());
    }
    if (moment.kind === STEP) {
      const scale = Matrix.diag(moment.p.diagonal().map((x) => 1 / Math.sqrt(x)));
      const inverted = scale.mmul(inverse(scale.mmul(moment.p).mmul(scale))).mmul(scale);
      const gain = moment.prior.mmul(moment.phi.transpose()).mmul(inverted);
      e = gain.mmul(e);
      ps = Matrix.add(moment.prior, gain.mmul(Matrix.sub(ps, moment.p)).mmul(gain.transpose()));
    }
  }
  return out;
}

const ALL_STATES = {
  gyroScale: { enabled: true, randomWalkPpmPerSqrtS: 5 },
  accelScale: { enabled: true, randomWalkPpmPerSqrtS: 5 },
  leverArm: { enabled: true },
  barometerBias: { enabled: true },
};
test.each([
  ['fifteen states', {}],
  ['all optional states with them', ALL_STATES],
])('equals the smoother of Rauch, Tung and Striebel: %s', (_name, states) => {
  const pass = taped(states);
  const { layout } = pass.filter;
  const N = layout.size;
  const tape = taped(states).tape;
  const expected = rauchTungStriebel(pass, layout);
  const smoother = new Smoother(tape, 0, 0, layout);
  let outputs = 0;
  let worst = 0;
  while (smoother.next(null)) {
    const reference = expected.get(tape.sample)!;
    outputs += 1;
    for (let i = 0; i < N; i += 1) {
      const sigma = Math.sqrt(reference.p.get(i, i));
      worst = Math.max(worst, Math.abs(smoother.correction[i]! - reference.e.get(i, 0)) / sigma);
      worst = Math.max(worst, Math.abs(Math.sqrt(smoother.covariance[i * (N + 1)]!) / sigma - 1));
    }
  }
  expect(outputs).toBe(expected.size);
  expect(outputs).toBeGreaterThan(35);
  expect(worst).toBeLessThan(1e-3);
});

describe('a run with the smoother', () => {
  const simulated = simulateCase({
    motion: 'road',
    durationS: 150,
    imuRateHz: 50,
    staticStartS: 15,
    seed: 7,
  });
  const outages = [{ startS: 60, endS: 90, withhold: 'gnss' as const }];
  const run = (smooth: boolean, withTruth: boolean): RunResult => {
    const recording = withTruth ? simulated.recording : { ...simulated.recording, reference: null };
    const engine = createRun(recording, requestOf(simulated, { outages, smooth }));
    let progress = 0;
    while (!engine.advance(700)) {
      expect(engine.progress).toBeGreaterThanOrEqual(progress - 1e-12);
      progress = engine.progress;
      expect(progress).toBeLessThanOrEqual(1);
    }
    return engine.finish();
  };
  const smooth = run(true, true);
  const plain = run(false, true);

  test('leaves the filter’s own results as they are', () => {
    expect(smooth.solution).toEqual(plain.solution);
    expect(plain.smoothed).toBeNull();
  });

  test('has a row for each of the solution’s, nearer to the truth and surer', () => {
    expect(smooth.smoothed!.time_s).toEqual(smooth.solution.time_s);
    const { truth, smoothedTruth } = smooth.summary;
    expect(smoothedTruth!.horizontalRmseM).toBeLessThan(0.5 * truth!.horizontalRmseM);
    expect(smoothedTruth!.attitudeRmseDeg!.yaw).toBeLessThan(truth!.attitudeRmseDeg!.yaw);
    for (const name of ['sigma_n_m', 'sigma_ve_m_s', 'sigma_yaw_deg', 'sigma_accel_bias_x_m_s2'])
      smooth.smoothed![name]!.forEach((s, i) => expect(s).toBeLessThan(smooth.solution[name]![i]! * 1.0001));
    expect(smoothedTruth!.aneesPosition).toBeLessThan(7);
    expect(smoothedTruth!.aneesAttitude!).toBeLessThan(7);
  });

  test('is the reference of the coasting error where there is no truth', () => {
    const result = run(true, false);
    expect(result.summary.outages[0]!.reference).toBe('smoothed');
    const [against, truth] = [result, plain].map((r) => r.summary.outages[0]!.points.at(-1)!.horizontalM);
    // The smoothed, aided solution is within decimetres of the truth.
    expect(Math.abs(against! - truth!)).toBeLessThan(0.6);
    for (const name of Object.keys(plain.solution))
      expect(result.solution[name]).toEqual(plain.solution[name]);
    expect(result.smoothed!.time_s!.length).toBe(plain.solution.time_s!.length);
  });
});

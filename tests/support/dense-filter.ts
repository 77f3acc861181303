/**
 * The same filter written plainly with ml-matrix: dense F, Φ = I + FΔt + ½F²Δt², trapezoidal Qd, Joseph update. The
 * oracle of the flat kernels in the tests, and what their speed is measured against in the benchmark.
 */
import { inverse, Matrix } from 'ml-matrix';
import type { Parameters } from '@/shared/contracts/parameters';
import { dcmFromQuat, quatFromRotationVector, quatMultiply } from '@/workers/engine/attitude';
import { biasDecayRate, biasNoiseDensity } from '@/workers/engine/filter/bias-models';
import { biasParameters } from '@/workers/engine/filter/bias-parameters';
import type { Fixes } from '@/workers/engine/filter/fixes';
import { EARTH_RATE, meridianRadius, transverseRadius } from '@/workers/engine/geodesy';
import { normalGravity } from '@/workers/engine/gravity';
import { DURATION, ANGLE, ImuIntervals } from '@/workers/engine/strapdown/imu-intervals';
import { HEIGHT, LAT, LON, QUAT, VD, VE, VN } from '@/workers/engine/strapdown/navigation-state';
import { Strapdown } from '@/workers/engine/strapdown/strapdown';
import type { ImuColumns } from '@/workers/engine/types';

const N = 15;

export const skew = (v: readonly number[]) =>
  new Matrix([
    [0, -v[2]!, v[1]!],
    [v[2]!, 0, -v[0]!],
    [-v[1]!, v[0]!, 0],
  ]);

export const block = (matrix: Matrix, row: number, column: number, part: Matrix) =>
  matrix.setSubMatrix(part, row, column);

/** F of the phi-angle model, computed minus true, from its vector form (position in metres, NED). */
export function denseF(
  nav: Float64Array,
  force: readonly number[],
  dcm: Matrix,
  gyroDecay: number,
  accelDecay: number,
): Matrix {
  const lat = nav[LAT]!;
  const rm = meridianRadius(lat) + nav[HEIGHT]!;
  const rn = transverseRadius(lat) + nav[HEIGHT]!;
  const v = [nav[VN]!, nav[VE]!, nav[VD]!] as const;
  const tan = Math.tan(lat);
  const earth = [EARTH_RATE * Math.cos(lat), 0, -EARTH_RATE * Math.sin(lat)];
  const transport = [v[1] / rn, -v[0] / rm, (-v[1] * tan) / rn];
  const sum = (a: readonly number[], b: readonly number[], k = 1) => a.map((x, i) => x + k * b[i]!);
  // ω_en = T_v v + …; derivatives of ω_ie and ω_en by position in metres (δφ = δr_N/R_M, δh = −δr_D).
  const transportByV = new Matrix([
    [0, 1 / rn, 0],
    [-1 / rm, 0, 0],
    [0, -tan / rn, 0],
  ]);
  const earthByR = new Matrix([
    [(-EARTH_RATE * Math.sin(lat)) / rm, 0, 0],
    [0, 0, 0],
    [(-EARTH_RATE * Math.cos(lat)) / rm, 0, 0],
  ]);
  const transportByR = new Matrix([
    [0, 0, v[1] / rn ** 2],
    [0, 0, -v[0] / rm ** 2],
    [-v[1] / (rn * rm * Math.cos(lat) ** 2), 0, (-v[1] * tan) / rn ** 2],
  ]);
  const f = Matrix.zeros(N, N);
  block(f, 0, 0, new Matrix([
    [-v[2] / rm, 0, v[0] / rm],
    [(v[1] * tan) / rm, -v[2] / rn - (v[0] * tan) / rm, v[1] / rn],
    [0, 0, 0],
  ])); // prettier-ignore
  block(f, 0, 3, Matrix.eye(3));
  const gradient = Matrix.zeros(3, 3);
  gradient.set(2, 2, (2 * normalGravity(lat, nav[HEIGHT]!)) / Math.sqrt(rm * rn));
  block(f, 3, 0, skew(v).mmul(earthByR.clone().mul(2).add(transportByR)).add(gradient));
  block(
    f,
    3,
    3,
    skew(v)
      .mmul(transportByV)
      .sub(skew(sum(transport, earth, 2))),
  );
  block(f, 3, 6, skew(force));
  block(f, 3, 12, dcm.clone().mul(-1));
  block(f, 6, 0, earthByR.clone().add(transportByR));
  block(f, 6, 3, transportByV);
  block(f, 6, 6, skew(sum(earth, transport)).mul(-1));
  block(f, 6, 9, dcm);
  block(f, 9, 9, Matrix.eye(3).mul(-gyroDecay));
  block(f, 12, 12, Matrix.eye(3).mul(-accelDecay));
  return f;
}

export interface DenseResult {
  nav: Float64Array;
  p: Matrix;
  steps: number;
}

export class DenseFilter {
  readonly strapdown: Strapdown;
  p: Matrix;
  sample: number;
  private fix: number;
  private readonly intervals: ImuIntervals;
  private readonly q: Matrix;
  private readonly gyroDecay: number;
  private readonly accelDecay: number;
  private readonly stepS: number;

  constructor(
    private readonly imu: ImuColumns,
    private readonly fixes: Fixes,
    parameters: Parameters,
    private readonly leverArm: readonly [number, number, number],
    start: { sample: number; fix: number; nav: Float64Array; p: Float64Array },
  ) {
    this.strapdown = new Strapdown(parameters.mechanisation.scheme);
    this.intervals = new ImuIntervals(imu);
    const bias = biasParameters(parameters);
    this.gyroDecay = biasDecayRate(bias.gyro);
    this.accelDecay = biasDecayRate(bias.accel);
    const three = (x: number) => [x, x, x];
    this.q = Matrix.diag([
      ...three(0),
      ...three(parameters.accel.whiteNoiseMPerSPerSqrtS ** 2),
      ...three(parameters.gyro.whiteNoiseRadPerSqrtS ** 2),
      ...three(biasNoiseDensity(bias.gyro)),
      ...three(biasNoiseDensity(bias.accel)),
    ]);
    this.stepS = parameters.mechanisation.covarianceIntervalS - 0.5 * this.intervals.nominalS;
    this.p = Matrix.from1DArray(N, N, start.p);
    this.sample = start.sample;
    this.fix = start.fix;
    this.strapdown.start(start.nav);
  }

  advanceSample(): void {
    const { intervals, fixes, imu } = this;
    const k = this.sample + 1;
    intervals.load(k);
    const start = imu.timeS[k - 1]!;
    const end = imu.timeS[k]!;
    let from = 0;
    while (this.fix < fixes.count && fixes.timeS[this.fix]! <= end + 1e-7) {
      const j = this.fix;
      this.fix += 1;
      const to =
        end - fixes.timeS[j]! <= 1e-7 ? 1 : Math.max(from, (fixes.timeS[j]! - start) / (end - start));
      if (to > from) this.strapdown.advance(intervals.interval, from, to);
      from = to;
      this.covarianceStep();
      this.position(j);
      this.velocity(j, to);
    }
    if (from < 1) this.strapdown.advance(intervals.interval, from, 1);
    this.sample = k;
    if (this.strapdown.sumForce[3]! >= this.stepS) this.covarianceStep();
  }

  covarianceStep(): void {
    const { nav, sumDcm, sumForce } = this.strapdown;
    const dt = sumForce[3]!;
    if (dt === 0) return;
    const force = [sumForce[0]! / dt, sumForce[1]! / dt, sumForce[2]! / dt];
    const dcm = Matrix.from1DArray(3, 3, sumDcm).div(dt);
    const f = denseF(nav, force, dcm, this.gyroDecay, this.accelDecay).mul(dt);
    const phi = Matrix.eye(N).add(f).add(f.mmul(f).mul(0.5));
    const qd = phi
      .mmul(this.q)
      .mmul(phi.transpose())
      .add(this.q)
      .mul(0.5 * dt);
    this.p = phi.mmul(this.p).mmul(phi.transpose()).add(qd);
    this.strapdown.resetSums();
  }

  private position(j: number): void {
    const { nav, dcm } = this.strapdown;
    const arm = Matrix.from1DArray(3, 3, dcm)
      .mmul(Matrix.columnVector([...this.leverArm]))
      .to1DArray();
    const lat = nav[LAT]!;
    const innovation = [
      (this.fixes.latRad[j]! - lat) * (meridianRadius(lat) + nav[HEIGHT]!) - arm[0]!,
      (this.fixes.lonRad[j]! - nav[LON]!) * (transverseRadius(lat) + nav[HEIGHT]!) * Math.cos(lat) - arm[1]!,
      nav[HEIGHT]! - this.fixes.heightM[j]! - arm[2]!,
    ];
    const h = Matrix.zeros(3, N);
    block(h, 0, 0, Matrix.eye(3));
    block(h, 0, 6, skew(arm));
    this.update(h, innovation, this.fixes.positionVariance.subarray(3 * j, 3 * j + 3));
  }

  private velocity(j: number, at: number): void {
    const { nav, dcm } = this.strapdown;
    const { interval } = this.intervals;
    const c = Matrix.from1DArray(3, 3, dcm);
    const rate = [0, 1, 2].map(
      (i) => (interval[ANGLE + i]! + (2 * at - 1) * interval[7 + i]!) / interval[DURATION]! - nav[10 + i]!,
    );
    const arm = c.mmul(Matrix.columnVector([...this.leverArm]));
    const spin = c
      .mmul(skew(rate))
      .mmul(Matrix.columnVector([...this.leverArm]))
      .to1DArray();
    const earth = [EARTH_RATE * Math.cos(nav[LAT]!), 0, -EARTH_RATE * Math.sin(nav[LAT]!)];
    const drag = skew(earth).mmul(arm).to1DArray();
    const innovation = [0, 1, 2].map(
      (i) => this.fixes.velocity[i as 0 | 1 | 2][j]! - nav[VN + i]! - spin[i]! + drag[i]!,
    );
    const h = Matrix.zeros(3, N);
    block(h, 0, 3, Matrix.eye(3));
    block(h, 0, 6, skew(spin));
    block(h, 0, 9, c.mmul(skew(this.leverArm)));
    this.update(h, innovation, this.fixes.velocityVariance.subarray(3 * j, 3 * j + 3));
  }

  private update(h: Matrix, innovation: readonly number[], variance: Float64Array): void {
    const r = Matrix.diag([...variance]);
    const pht = this.p.mmul(h.transpose());
    const gain = pht.mmul(inverse(h.mmul(pht).add(r)));
    const rest = Matrix.eye(N).sub(gain.mmul(h));
    this.p = rest.mmul(this.p).mmul(rest.transpose()).add(gain.mmul(r).mmul(gain.transpose()));
    const c = gain.mmul(Matrix.columnVector([...innovation])).to1DArray();
    this.feedBack(c);
  }

  private feedBack(correction: readonly number[]): void {
    const { nav, dcm } = this.strapdown;
    const c = [...correction];
    // Tilt and accelerometer bias along their curve: half the turn to the estimate, all of it to the covariance.
    const attitude = Matrix.from1DArray(3, 3, dcm);
    const w = attitude.transpose().mmul(Matrix.columnVector([c[6]!, c[7]!, 0])).to1DArray(); // prettier-ignore
    const bias = Matrix.columnVector(c.slice(12));
    const bent = Matrix.add(bias, skew(w).mmul(bias).mul(0.5)).to1DArray();
    c.splice(12, 3, ...bent);
    const lat = nav[LAT]!;
    nav[LON] = nav[LON]! + c[1]! / ((transverseRadius(lat) + nav[HEIGHT]!) * Math.cos(lat));
    nav[LAT] = lat + c[0]! / (meridianRadius(lat) + nav[HEIGHT]!);
    nav[HEIGHT] = nav[HEIGHT]! - c[2]!;
    for (let i = 0; i < 3; i += 1) nav[VN + i] = nav[VN + i]! + c[3 + i]!;
    for (let i = 0; i < 6; i += 1) nav[10 + i] = nav[10 + i]! + c[9 + i]!;
    // Heading after tilt, and the covariance turned along.
    const heading = quatFromRotationVector(0, 0, -c[8]!, new Float64Array(4));
    const tilt = quatFromRotationVector(-c[6]!, -c[7]!, 0, new Float64Array(4));
    const q = quatMultiply(tilt, nav.slice(QUAT, QUAT + 4), new Float64Array(4));
    nav.set(quatMultiply(heading, q, q), QUAT);
    this.strapdown.attitudeChanged();
    const [cos, sin] = [Math.cos(c[8]!), Math.sin(c[8]!)];
    const about = new Matrix([
      [cos, sin, 0],
      [-sin, cos, 0],
      [0, 0, 1],
    ]);
    const g = Matrix.eye(N);
    block(g, 6, 6, about.mmul(Matrix.eye(3).sub(skew([c[6]!, c[7]!, 0]).mul(0.5))));
    const turn = quatFromRotationVector(w[0]!, w[1]!, w[2]!, new Float64Array(4));
    block(g, 12, 12, Matrix.from1DArray(3, 3, dcmFromQuat(turn, new Float64Array(9))));
    this.p = g.mmul(this.p).mmul(g.transpose());
  }
}

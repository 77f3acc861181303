/**
 * Recovery after a stated time of continuous rejection: the state, not the receiver, is taken to be wrong. What the
 * group measures is set from the fix; where velocity is in doubt too, attitude and biases are widened by the factor
 * that the rejected innovation shows, so that what made the state run away can be found again.
 */
import type { CorrectedState } from './corrected-state';
import type { GroupName } from './filter-types';
import { biasParameters } from './bias-parameters';
import { initialBiasVariance } from './bias-models';
import type { MeasurementUpdate } from './measurement-update';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, POSITION, sizeOf, STATES, VELOCITY } from './states';

/** Attitude is never widened beyond these, rad: the error model is for small angles. */
const MAX_TILT_SIGMA = (10 * Math.PI) / 180;
const MAX_HEADING_SIGMA = (60 * Math.PI) / 180;
/** R of a fix taken in this way counts this many times: a fix that surprised is not trusted like others. */
const CAUTION = 4;
/** Velocity left without a measurement is not known better than this, m/s. */
const MIN_VELOCITY_SIGMA = 1;

/** `update` holds the prepared innovation of `group` at `timeS` for the axes given as bits. */
export function recoverGroups(
  filter: CorrectedState,
  group: GroupName,
  timeS: number,
  axes: number,
  update: MeasurementUpdate,
): void {
  const { p, gates, parameters } = filter;
  const { size } = filter.layout;
  const excess = Math.max(1, update.nis / update.rows);
  const velocityUsed = parameters.gnss.useVelocity && gates.velocity.hasJudged;
  const velocityInDoubt = group === 'velocity' || gates.velocity.isRejecting || !velocityUsed;
  const correction = new Float64Array(size);
  const cut = new Float64Array(size);
  const given = new Float64Array(size);
  const scale = new Float64Array(size).fill(1);
  if (velocityInDoubt) widen(p, excess, parameters, scale);
  const first = group === 'position' ? POSITION : VELOCITY;
  let row = 0;
  for (let axis = 0; axis < 3; axis += 1) {
    if (((axes >> axis) & 1) === 0) continue;
    correction[first + axis] = update.innovation[row]!;
    cut[first + axis] = 1;
    given[first + axis] = CAUTION * update.r[row]!;
    if (group === 'position' && velocityInDoubt) {
      const speed = update.innovation[row]! / parameters.gate.recoveryAfterS;
      const variance = Math.max(p[(VELOCITY + axis) * (size + 1)]!, speed * speed, MIN_VELOCITY_SIGMA ** 2);
      cut[VELOCITY + axis] = 1;
      given[VELOCITY + axis] = variance;
    }
    row += 1;
  }
  for (let i = 0; i < size; i += 1) if (cut[i] === 1) isolate(p, i, given[i]!);
  filter.tape?.writeBreak(cut);
  filter.budget?.recover(scale, cut, given);
  filter.feedBack(correction);
  gates[group].reset();
  const what =
    group === 'position' ? (velocityInDoubt ? 'position and velocity were' : 'position was') : 'velocity was';
  filter.warn(
    `${group}-reinitialised`,
    `${group === 'position' ? 'Position' : 'Velocity'} fixes were rejected for more than ${parameters.gate.recoveryAfterS} s; ${what} set anew from GNSS.`,
    timeS,
  );
}

/** Cuts state i from all others and gives it a variance. */
function isolate(p: Float64Array, i: number, variance: number): void {
  const size = sizeOf(p);
  for (let j = 0; j < size; j += 1) {
    p[i * size + j] = 0;
    p[j * size + i] = 0;
  }
  p[i * size + i] = variance;
}

/** P ← DPD on attitude and biases: variances `excess` times larger, within what such a state can be. */
function widen(
  p: Float64Array,
  excess: number,
  parameters: CorrectedState['parameters'],
  scale: Float64Array,
): void {
  const size = sizeOf(p);
  const bias = biasParameters(parameters);
  const gyro = initialBiasVariance(bias.gyro);
  const accel = initialBiasVariance(bias.accel);
  for (let i = ATTITUDE; i < STATES; i += 1) {
    let limit = accel;
    if (i < ATTITUDE + 2) limit = MAX_TILT_SIGMA ** 2;
    else if (i < GYRO_BIAS) limit = MAX_HEADING_SIGMA ** 2;
    else if (i < ACCEL_BIAS) limit = gyro;
    const factor = Math.sqrt(Math.max(1, Math.min(excess, limit / p[i * size + i]!)));
    scale[i] = factor;
    for (let j = 0; j < size; j += 1) {
      p[i * size + j] = p[i * size + j]! * factor;
      p[j * size + i] = p[j * size + i]! * factor;
    }
  }
}

/** All that two logs say of their clocks: the offset, and whether the receiver's velocity is older than its position. */
import type { GnssColumns } from '../types';
import type { MotionIntegrals } from './motion-integrals';
import { clockOffset, type OffsetEstimate } from './clock-offset';
import type { MotionSource } from './track-stretches';
import { velocityLag, type VelocityLag } from './velocity-lag';

export interface ClockFindings {
  /** Added to the GNSS times it brings the positions onto the IMU's clock, s, with its 1σ; null: the motion does not tell. */
  offset: { offsetS: number; sigmaS: number } | null;
  /** By so much the velocities are older than the positions, s, with 1σ; null: not told, or not significant. */
  velocityLag: { lagS: number; sigmaS: number } | null;
  /**
   * Turn by GNSS ÷ turn by the IMU about the vertical: 1; −1 where the senses differ, 57.3 or 1/57.3 where the gyro's unit
   * is wrong; null where nothing tells.
   */
  turnFactor: number | null;
  /** Where the vertical axis tells nothing of the turns and another one does: which (0, 1, 2: x, y, z of the body). */
  turnAxis: number | null;
}

/** A lag counts from here, σ. */
const SIGNIFICANT = 4;

export function findClockOffsets(motion: MotionIntegrals, gnss: GnssColumns): ClockFindings {
  const by = (source: MotionSource) => {
    const turn = clockOffset(motion, gnss, 'turn', source);
    return { turn, all: combined([plausible(turn), plausible(clockOffset(motion, gnss, 'speed', source))]) };
  };
  const velocity = by('velocity');
  // Positions alone tell less by far; beside velocities they tell how old those are.
  const position = velocity.all ? null : by('position');
  const lag = velocity.all ? significant(velocityLag(gnss)) : null;
  const turn = velocity.turn ?? position?.turn ?? null;
  return {
    offset: velocity.all ? later(velocity.all, lag) : (position?.all ?? null),
    velocityLag: lag,
    turnFactor: turn?.factor ?? null,
    turnAxis: turn ? null : axisOfTurns(motion, gnss),
  };
}

type Weighed = Pick<OffsetEstimate, 'offsetS' | 'sigmaS'>;

/** Only motion that the IMU feels in full size, but for its sign and unit, is the motion that GNSS saw. */
function plausible(found: OffsetEstimate | null): OffsetEstimate | null {
  if (!found) return null;
  const size = Math.abs(found.factor);
  return UNITS.some((unit) => size > unit / SIZE && size < unit * SIZE) ? found : null;
}
const UNITS = [1, 180 / Math.PI, Math.PI / 180, 9.80665, 1 / 9.80665];
const SIZE = 1.35;

const significant = (lag: VelocityLag | null): VelocityLag | null =>
  lag && Math.abs(lag.lagS) > SIGNIFICANT * lag.sigmaS ? lag : null;

/** Positions are younger than the velocities that the offset was found from. */
const later = ({ offsetS, sigmaS }: Weighed, lag: VelocityLag | null): Weighed =>
  lag ? { offsetS: offsetS + lag.lagS, sigmaS: Math.hypot(sigmaS, lag.sigmaS) } : { offsetS, sigmaS };

/** Turns are about the vertical: a body axis that follows the course far from it has been taken for another. */
function axisOfTurns(motion: MotionIntegrals, gnss: GnssColumns): number | null {
  const strength = [0, 1, 2].map((axis) => {
    const along = [0, 1, 2].map((i) => (i === axis ? 1 : 0));
    const found =
      clockOffset(motion, gnss, 'turn', 'velocity', along) ??
      clockOffset(motion, gnss, 'turn', 'position', along);
    return Math.abs(found?.correlation ?? 0);
  });
  const best = strength.indexOf(Math.max(...strength));
  return strength[best]! > LEAST_TURN_CORRELATION ? best : null;
}

const LEAST_TURN_CORRELATION = 0.9;

/** Mean weighted by 1/σ²; widened where the parts disagree. */
function combined(parts: readonly (Weighed | null)[]): Weighed | null {
  const known = parts.filter((part) => part !== null);
  if (known.length === 0) return null;
  const weight = known.reduce((sum, { sigmaS }) => sum + 1 / sigmaS ** 2, 0);
  const offsetS = known.reduce((sum, part) => sum + part.offsetS / part.sigmaS ** 2, 0) / weight;
  const misfit = known.reduce((sum, part) => sum + ((part.offsetS - offsetS) / part.sigmaS) ** 2, 0);
  const birge = Math.sqrt(Math.max(1, misfit / Math.max(1, known.length - 1)));
  return { offsetS, sigmaS: birge / Math.sqrt(weight) };
}

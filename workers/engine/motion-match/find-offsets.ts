/** All that two logs say of their clocks: the offset, and whether the receiver's velocity is older than its position. */
import type { GnssColumns } from '../types';
import type { MotionIntegrals } from './motion-integrals';
import { clockOffset, type OffsetEstimate } from './clock-offset';
import type { MotionSource } from './track-stretches';

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

/** A lag, or a disagreement, counts from here, σ. */
const SIGNIFICANT = 3;

export function findClockOffsets(motion: MotionIntegrals, gnss: GnssColumns): ClockFindings {
  const by = (source: MotionSource) => {
    const turn = clockOffset(motion, gnss, 'turn', source);
    return { turn, all: combined([turn, clockOffset(motion, gnss, 'speed', source)]) };
  };
  const [position, velocity] = [by('position'), by('velocity')];
  const turn = velocity.turn ?? position.turn;
  return {
    ...together(position.all, velocity.all),
    turnFactor: turn?.factor ?? null,
    turnAxis: turn ? null : axisOfTurns(motion, gnss),
  };
}

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

type Weighed = Pick<OffsetEstimate, 'offsetS' | 'sigmaS'>;

function together(
  position: Weighed | null,
  velocity: Weighed | null,
): Pick<ClockFindings, 'offset' | 'velocityLag'> {
  if (!position || !velocity) return { offset: position ?? velocity, velocityLag: null };
  const lagS = position.offsetS - velocity.offsetS;
  const sigmaS = Math.hypot(position.sigmaS, velocity.sigmaS);
  if (Math.abs(lagS) > SIGNIFICANT * sigmaS) return { offset: position, velocityLag: { lagS, sigmaS } };
  return { offset: combined([position, velocity]), velocityLag: null };
}

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

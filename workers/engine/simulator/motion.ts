/** How a simulated vehicle moves: velocity and attitude as functions of time, with exact derivatives. */
import type { Motion as MotionKind } from '@/shared/contracts/scenarios';
import type { RandomSource } from '../random';

/** Velocity of the IMU's origin over the Earth and attitude of the body, at one instant. */
export interface Kinematics {
  /** North, east, down, m/s. */
  vn: number;
  ve: number;
  vd: number;
  /** Time derivatives of the three components, m/s². */
  an: number;
  ae: number;
  ad: number;
  /** Euler angles 3-2-1, rad, and their rates, rad/s. */
  roll: number;
  pitch: number;
  yaw: number;
  rollRate: number;
  pitchRate: number;
  yawRate: number;
}

export const newKinematics = (): Kinematics => ({
  vn: 0,
  ve: 0,
  vd: 0,
  an: 0,
  ae: 0,
  ad: 0,
  roll: 0,
  pitch: 0,
  yaw: 0,
  rollRate: 0,
  pitchRate: 0,
  yawRate: 0,
});

/**
 * A motion: velocity three times and attitude twice continuously differentiable in time. Position is what its velocity
 * integrates to. Valid at any t, before 0 as well.
 */
export interface Motion {
  kind: MotionKind;
  evaluate(t: number, out: Kinematics): void;
  /** Highest frequency in it, Hz: sets the quadrature's step. */
  bandwidthHz: number;
}

export interface MotionOptions {
  durationS: number;
  /** Stands still first, s. */
  staticStartS: number;
  initialHeadingRad: number;
  random: RandomSource;
}

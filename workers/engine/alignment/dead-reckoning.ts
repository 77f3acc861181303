/**
 * Dead reckoning from a start with level known and heading not: attitude, velocity and way in a level frame whose
 * first axis points where the vehicle pointed at the start. Short stretches only: flat, and with what a static
 * stretch read (gyros' offset, gravity's size) taken off.
 */
import {
  dcmFromQuat,
  eulerFromQuat,
  quatFromEuler,
  quatFromRotationVector,
  quatMultiply,
  quatNormalise,
} from '../attitude';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';

export class DeadReckoning {
  /** Attitude level frame ← body, row by row. */
  readonly dcm = new Float64Array(9);
  /** Rate of the last sample, offset taken off, rad/s. */
  readonly rate = new Float64Array(3);
  /** In the level frame, m/s and m; from `moveFrom` on. */
  readonly velocity = new Float64Array(3);
  readonly way = new Float64Array(3);
  /** ∫C_D· dt, s: what a gyro bias does to the heading. */
  readonly biasArm = new Float64Array(3);
  /** ∫cos and ∫sin of the heading since the start, s: the way at unit speed where the vehicle points. */
  readonly pointed = new Float64Array(2);
  /** Largest turn of the heading since the start, rad. */
  largestTurn = 0;
  sample: number;
  private readonly q: Float64Array;
  private readonly turn = new Float64Array(4);
  private readonly euler = new Float64Array(3);
  private readonly scale: number;

  /** `gravity`: size of the specific force at rest, m/s²; before sample `moveFrom` the vehicle stands still. */
  constructor(
    private readonly imu: ImuColumns,
    readonly start: number,
    private readonly moveFrom: number,
    roll: number,
    pitch: number,
    private readonly rateOffset: readonly [number, number, number],
    private readonly accelOffset: readonly [number, number, number],
    private readonly gravity: number,
  ) {
    this.sample = start;
    this.q = quatFromEuler(roll, pitch, 0, new Float64Array(4));
    dcmFromQuat(this.q, this.dcm);
    this.scale = imu.sampling === 'increment' ? 1 / medianSpacing(imu.timeS) : 1;
  }

  /** Heading relative to the start, rad. */
  get yaw(): number {
    return eulerFromQuat(this.q, this.euler)[2]!;
  }

  /** Heading's rate at the last sample, rad/s. */
  get yawRate(): number {
    return this.dcm[6]! * this.rate[0]! + this.dcm[7]! * this.rate[1]! + this.dcm[8]! * this.rate[2]!;
  }

  /** One sample on. */
  step(): void {
    const { imu, rate, dcm, q, turn } = this;
    this.sample += 1;
    const k = this.sample;
    const dt = imu.timeS[k]! - imu.timeS[k - 1]!;
    for (let i = 0; i < 3; i += 1) rate[i] = imu.gyro[i as 0 | 1 | 2][k]! * this.scale - this.rateOffset[i]!;
    quatFromRotationVector(0.5 * rate[0]! * dt, 0.5 * rate[1]! * dt, 0.5 * rate[2]! * dt, turn);
    quatMultiply(q, turn, q);
    dcmFromQuat(q, dcm);
    for (let i = 0; i < 3; i += 1) this.biasArm[i] = this.biasArm[i]! + dcm[6 + i]! * dt;
    if (k > this.moveFrom) this.move(k, dt);
    quatMultiply(q, turn, q);
    quatNormalise(q);
    dcmFromQuat(q, dcm);
    const { yaw, pointed } = this;
    pointed[0] = pointed[0]! + Math.cos(yaw) * dt;
    pointed[1] = pointed[1]! + Math.sin(yaw) * dt;
    this.largestTurn = Math.max(this.largestTurn, Math.abs(yaw));
  }

  private move(k: number, dt: number): void {
    const { imu, dcm, velocity, way, scale, accelOffset } = this;
    const fx = imu.accel[0][k]! * scale - accelOffset[0];
    const fy = imu.accel[1][k]! * scale - accelOffset[1];
    const fz = imu.accel[2][k]! * scale - accelOffset[2];
    for (let i = 0; i < 3; i += 1) {
      const a = dcm[3 * i]! * fx + dcm[3 * i + 1]! * fy + dcm[3 * i + 2]! * fz + (i === 2 ? this.gravity : 0);
      way[i] = way[i]! + velocity[i]! * dt + 0.5 * a * dt * dt;
      velocity[i] = velocity[i]! + a * dt;
    }
  }
}

/** Detects that a vehicle stands still from the unrest of its own IMU, window by window. */
import type { Parameters } from '@/shared/contracts/parameters';
import { medianSpacing } from '../strapdown/imu-intervals';
import type { ImuColumns } from '../types';

export class StopDetector {
  /** Mean rates of the last complete window, rad/s, and its length, s. */
  readonly meanRate = new Float64Array(3);
  windowS = 0;
  private readonly sums = new Float64Array(6);
  private readonly squares = new Float64Array(6);
  private readonly axes: readonly Float64Array[];
  private readonly scale: number;
  private readonly length: number;
  private count = 0;
  private stillWindows = 0;

  constructor(
    imu: ImuColumns,
    private readonly parameters: Parameters['aids']['stopDetection'],
  ) {
    const nominal = medianSpacing(imu.timeS);
    this.axes = [...imu.gyro, ...imu.accel];
    this.scale = imu.sampling === 'increment' ? 1 / nominal : 1;
    this.length = Math.max(4, Math.round(parameters.windowS / nominal));
    this.windowS = this.length * nominal;
  }

  /**
   * Takes in sample k; true at the end of a window, which `isStill` then speaks of.
   */
  add(k: number): boolean {
    const { axes, sums, squares, scale } = this;
    for (let i = 0; i < 6; i += 1) {
      const x = axes[i]![k]! * scale;
      sums[i] = sums[i]! + x;
      squares[i] = squares[i]! + x * x;
    }
    this.count += 1;
    if (this.count < this.length) return false;
    this.stillWindows = this.wasQuiet() ? this.stillWindows + 1 : 0;
    for (let i = 0; i < 3; i += 1) this.meanRate[i] = sums[i]! / this.count;
    this.clear();
    return true;
  }

  /** The last window was still, and the one before too: the first window of a stop may hold the last of the braking. */
  get isStill(): boolean {
    return this.stillWindows >= 2;
  }

  private wasQuiet(): boolean {
    for (let i = 0; i < 6; i += 1) {
      const mean = this.sums[i]! / this.count;
      const spread = Math.sqrt(Math.max(0, this.squares[i]! / this.count - mean * mean));
      const limit = i < 3 ? this.parameters.gyroSpreadRadPerS : this.parameters.accelSpreadMPerS2;
      if (spread > limit) return false;
    }
    return true;
  }

  private clear(): void {
    for (let i = 0; i < 6; i += 1) {
      this.sums[i] = 0;
      this.squares[i] = 0;
    }
    this.count = 0;
  }

  save(): readonly number[] {
    return [...this.sums, ...this.squares, this.count, this.stillWindows];
  }
  restore(saved: readonly number[]): void {
    for (let i = 0; i < 6; i += 1) {
      this.sums[i] = saved[i]!;
      this.squares[i] = saved[6 + i]!;
    }
    this.count = saved[12]!;
    this.stillWindows = saved[13]!;
  }
}

/** Blows: short specific forces far beyond what the drive has shown so far. */

/** Beyond gravity, and beyond the unrest of the last seconds, m/s² and times. */
const LEAST_FORCE = 35;
const TIMES_UNREST = 9;
/** Unrest is judged over this, s. */
const MEMORY_S = 10;
/** Samples closer together than this belong to one blow, s. */
const APART_S = 0.5;
/** A longer one is a ride, not a blow, s. */
const LONGEST_S = 1;
const MOST_KEPT = 500;

export interface Shock {
  fromS: number;
  toS: number;
  /** Largest departure from the mean specific force, m/s². */
  peak: number;
}

export class ShockFinder {
  private readonly mean = new Float64Array(3);
  private variance = 0;
  private samples = 0;
  private lastS = NaN;
  private open: Shock | null = null;
  private readonly found: Shock[] = [];

  /** Specific force, m/s². */
  add(timeS: number, x: number, y: number, z: number): void {
    const [dx, dy, dz] = [x - this.mean[0]!, y - this.mean[1]!, z - this.mean[2]!];
    const squared = dx * dx + dy * dy + dz * dz;
    const settled = this.samples > 20;
    const limit = Math.max(LEAST_FORCE, TIMES_UNREST * Math.sqrt(this.variance));
    if (settled && squared > limit * limit) this.note(timeS, Math.sqrt(squared));
    else {
      const share = settled ? Math.min(1, (timeS - this.lastS) / MEMORY_S) : 1 / (this.samples + 1);
      this.mean[0]! += share * dx;
      this.mean[1]! += share * dy;
      this.mean[2]! += share * dz;
      // At the start the mean itself is still on its way.
      if (this.samples > 0) this.variance += share * (squared - this.variance);
      this.samples += 1;
    }
    this.lastS = timeS;
  }

  finish(): Shock[] {
    this.close();
    return this.found;
  }

  private note(timeS: number, force: number): void {
    if (this.open && timeS - this.open.toS > APART_S) this.close();
    this.open ??= { fromS: timeS, toS: timeS, peak: 0 };
    this.open.toS = timeS;
    if (force > this.open.peak) this.open.peak = force;
  }

  private close(): void {
    const { open } = this;
    this.open = null;
    if (open && open.toS - open.fromS <= LONGEST_S && this.found.length < MOST_KEPT) this.found.push(open);
  }
}

/** Course and place of a vehicle while its schedule is laid out: keeps the track near where it began. */
import type { RandomSource } from '../../random';
import { wrapAngle } from '../../geodesy';

export class Route {
  t: number;
  course: number;
  private north = 0;
  private east = 0;

  constructor(
    startS: number,
    course: number,
    private readonly random: RandomSource,
    /** Beyond this distance from the start, turns lead back, m. */
    private readonly reachM: number,
  ) {
    this.t = startS;
    this.course = course;
  }

  /** Goes on for `durationS` at a mean speed (m/s), turning by `turn` (rad) on the way. */
  advance(durationS: number, speed: number, turn = 0): void {
    const along = this.course + turn / 2;
    this.north += durationS * speed * Math.cos(along);
    this.east += durationS * speed * Math.sin(along);
    this.course += turn;
    this.t += durationS;
  }

  /** A turn between the two sizes (rad), to either side; homeward when too far away. */
  pickTurn(least: number, most: number): number {
    const size = this.between(least, most);
    if (Math.hypot(this.north, this.east) < this.reachM) return this.random.uniform() < 0.5 ? -size : size;
    const homeward = wrapAngle(Math.atan2(-this.east, -this.north) - this.course);
    return Math.sign(homeward || 1) * Math.min(Math.max(Math.abs(homeward), least), most);
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.random.uniform();
  }

  chance(p: number): boolean {
    return this.random.uniform() < p;
  }
}

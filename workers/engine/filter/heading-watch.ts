/** Counts what corrections turn the heading by: a start that was far off is found by the filter, but never in silence. */
import { degToRad, radToDeg } from '@/shared/units';

/** Reported from 2σ of what was known on, but not below the first nor only above the second, rad. */
const REPORT_MIN = degToRad(20);
const REPORT_MAX = degToRad(45);

export class HeadingWatch {
  private turned = 0;
  private sigma = 0;
  private sinceS = 0;
  private reported = false;

  /** From here on corrections count against what is known of the heading now, 1σ, rad. */
  restart(timeS: number, sigma: number): void {
    this.turned = 0;
    this.sigma = sigma;
    this.sinceS = timeS;
  }

  /** Takes in a correction (rad); the sentence to report when it has become too much, once, else null. */
  add(correction: number): string | null {
    this.turned += correction;
    const turned = Math.abs(this.turned);
    const limit = Math.max(REPORT_MIN, Math.min(2 * this.sigma, REPORT_MAX));
    if (this.reported || turned < limit) return null;
    this.reported = true;
    return `GNSS turned the heading by ${radToDeg(turned).toFixed(0)}° from what was given or found at ${this.sinceS.toFixed(1)} s with ${radToDeg(this.sigma).toFixed(0)}° (1σ): that heading was wrong.`;
  }

  save(): readonly number[] {
    return [this.turned, this.sigma, this.sinceS, this.reported ? 1 : 0];
  }
  restore(saved: readonly number[]): void {
    this.turned = saved[0]!;
    this.sigma = saved[1]!;
    this.sinceS = saved[2]!;
    this.reported = saved[3] === 1;
  }
}

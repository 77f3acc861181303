/**
 * A scalar function of time made of constants joined by smooth ramps: three times continuously differentiable, with its
 * derivatives and its integral in closed form.
 */

export interface ProfilePoint {
  value: number;
  /** First and second derivative. */
  rate: number;
  curve: number;
  /** ∫ from 0 to t. */
  integral: number;
}

export const newProfilePoint = (): ProfilePoint => ({ value: 0, rate: 0, curve: 0, integral: 0 });

/**
 * Peak slope of a ramp of unit height and unit length: 35/16. A ramp of height d that must not exceed a slope m takes
 * |d|·RAMP_SLOPE/m.
 */
export const RAMP_SLOPE = 35 / 16;

export class SmoothProfile {
  private readonly starts: number[] = [];
  private readonly lengths: number[] = [];
  private readonly from: number[] = [];
  private readonly to: number[] = [];
  /** Integral from 0 to each ramp's start. */
  private readonly integrals: number[] = [];
  private cursor = 0;

  constructor(private readonly initial: number) {}

  /** Adds a ramp to `value` over [startS, startS + durationS]; ramps come in order and do not overlap. */
  rampTo(startS: number, durationS: number, value: number): this {
    const last = this.starts.length - 1;
    const endS = last < 0 ? -Infinity : this.starts[last]! + this.lengths[last]!;
    if (startS < endS - 1e-9 || !(durationS > 0))
      throw new RangeError(
        `A ramp at ${startS} s must follow the last one, which ends at ${endS} s, and take time.`,
      );
    const before = last < 0 ? this.initial : this.to[last]!;
    const point = newProfilePoint();
    this.at(startS, point);
    this.starts.push(startS);
    this.lengths.push(durationS);
    this.from.push(before);
    this.to.push(value);
    this.integrals.push(point.integral);
    return this;
  }

  /** End of the last ramp, s; 0 without ramps. */
  get endS(): number {
    const last = this.starts.length - 1;
    return last < 0 ? 0 : this.starts[last]! + this.lengths[last]!;
  }

  /** Value, derivatives and integral at any time; quick when times come in order. */
  at(t: number, out: ProfilePoint): ProfilePoint {
    const i = this.locate(t);
    if (i < 0) return set(out, this.initial, 0, 0, this.initial * t);
    const from = this.from[i]!;
    const step = this.to[i]! - from;
    const length = this.lengths[i]!;
    const since = t - this.starts[i]!;
    const u = since / length;
    if (u >= 1) {
      const ramp = length * (from + step / 2);
      return set(out, this.to[i]!, 0, 0, this.integrals[i]! + ramp + (since - length) * this.to[i]!);
    }
    // The seventh-degree smooth step 35u⁴ − 84u⁵ + 70u⁶ − 20u⁷ and its relatives.
    const u2 = u * u;
    const u4 = u2 * u2;
    const v = 1 - u;
    const value = u4 * (35 + u * (-84 + u * (70 - 20 * u)));
    const rate = 140 * u2 * u * v * v * v;
    const curve = 420 * u2 * v * v * (1 - 2 * u);
    const area = u4 * u * (7 + u * (-14 + u * (10 - 2.5 * u)));
    return set(
      out,
      from + step * value,
      (step * rate) / length,
      (step * curve) / (length * length),
      this.integrals[i]! + since * from + step * length * area,
    );
  }

  /** Index of the last ramp that has begun at t, −1 before the first. */
  private locate(t: number): number {
    const n = this.starts.length;
    let i = Math.min(this.cursor, n - 1);
    if (n > 0 && t < this.starts[i]! && i > 0 && t < this.starts[i - 1]!) i = this.search(t);
    while (i >= 0 && t < this.starts[i]!) i -= 1;
    while (i + 1 < n && t >= this.starts[i + 1]!) i += 1;
    this.cursor = Math.max(i, 0);
    return i;
  }

  private search(t: number): number {
    let low = 0;
    let high = this.starts.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (this.starts[middle]! <= t) low = middle;
      else high = middle - 1;
    }
    return low;
  }
}

function set(out: ProfilePoint, value: number, rate: number, curve: number, integral: number): ProfilePoint {
  out.value = value;
  out.rate = rate;
  out.curve = curve;
  out.integral = integral;
  return out;
}

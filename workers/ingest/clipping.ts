/** Flat tops: stretches where an axis stays at its extreme value, which a sensor at the end of its range does. */

interface Run {
  value: number;
  fromS: number;
  toS: number;
}

/** Equal values in a row that make a flat top. */
const MIN_RUN = 3;
const MAX_KEPT = 4000;

export class FlatTopFinder {
  private largest = 0;
  private runs: Run[] = [];
  private value = NaN;
  private length = 0;
  private fromS = NaN;
  private toS = NaN;

  /** `smallestRange`: no usual sensor clips below it. */
  constructor(private readonly smallestRange: number) {}

  add(timeS: number, value: number): void {
    if (value === this.value) {
      this.length += 1;
      this.toS = timeS;
      return;
    }
    this.close();
    this.value = value;
    this.length = 1;
    this.fromS = timeS;
    this.toS = timeS;
    const size = Math.abs(value);
    if (size > this.largest) this.largest = size;
  }

  /** Largest size of a value. */
  get peak(): number {
    return this.largest;
  }

  /** Stretches at the extreme, in time order. */
  finish(): [number, number][] {
    this.close();
    this.prune();
    return this.runs.map((run) => [run.fromS, run.toS]);
  }

  private close(): void {
    if (this.length < MIN_RUN || Math.abs(this.value) < this.smallestRange) return;
    this.runs.push({ value: this.value, fromS: this.fromS, toS: this.toS });
    if (this.runs.length > MAX_KEPT) this.prune();
  }

  private prune(): void {
    const limit = Math.max(this.smallestRange, this.largest * 0.999);
    this.runs = this.runs.filter((run) => Math.abs(run.value) >= limit).slice(-MAX_KEPT);
  }
}

/** Joins intervals that overlap or lie closer than `gapS`. */
export function mergeIntervals(intervals: readonly [number, number][], gapS: number): [number, number][] {
  const sorted = [...intervals].sort((a, b) => a[0] - b[0]);
  const merged: [number, number][] = [];
  for (const [from, to] of sorted) {
    const last = merged.at(-1);
    if (last && from - last[1] <= gapS) last[1] = Math.max(last[1], to);
    else merged.push([from, to]);
  }
  return merged;
}

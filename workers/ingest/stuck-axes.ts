/** Axes that hold one value while the others of their sensor go on: a stuck register, a broken wire, a repeated packet. */

/** At least this long, s, and this many samples. */
const LEAST_S = 0.4;
const LEAST_SAMPLES = 10;
/** Meanwhile the other axes of the sensor change in at least this share of the samples: at rest a coarse one repeats itself. */
const LEAST_CHANGING = 0.5;
/** Such runs as a sensor of this coarseness gives by chance in the whole log. */
const MOST_BY_CHANCE = 1e-3;
const MOST_KEPT = 500;

export interface StuckStretch {
  /** 0…2 gyro x y z, 3…5 accelerometer x y z. */
  channel: number;
  fromS: number;
  toS: number;
}

interface Candidate extends StuckStretch {
  samples: number;
}

export class StuckFinder {
  private readonly value = new Float64Array(6).fill(NaN);
  private readonly since = new Float64Array(6);
  private readonly samples = new Int32Array(6);
  /** Changes of the two other axes of the sensor since the value is held. */
  private readonly changes = new Int32Array(6);
  /** Samples that repeated the one before, over the whole log. */
  private readonly repeats = new Float64Array(6);
  private readonly changed = new Uint8Array(6);
  private readonly candidates: Candidate[] = [];
  private total = 0;
  private lastS = NaN;

  /** Six values of a sample: gyro x y z, accelerometer x y z, in any unit. */
  add(timeS: number, values: Float64Array): void {
    const { changed } = this;
    for (let i = 0; i < 6; i += 1) changed[i] = values[i] === this.value[i] ? 0 : 1;
    for (let i = 0; i < 6; i += 1) {
      if (changed[i] === 1) {
        this.close(i);
        this.value[i] = values[i]!;
        this.since[i] = timeS;
        this.samples[i] = 1;
        this.changes[i] = 0;
        continue;
      }
      const base = i < 3 ? 0 : 3;
      this.samples[i]! += 1;
      this.repeats[i]! += 1;
      this.changes[i]! += changed[base + ((i - base + 1) % 3)]! + changed[base + ((i - base + 2) % 3)]!;
    }
    this.total += 1;
    this.lastS = timeS;
  }

  finish(): StuckStretch[] {
    for (let i = 0; i < 6; i += 1) this.close(i);
    return this.candidates
      .filter((one) => this.byChance(one) < MOST_BY_CHANCE)
      .map(({ channel, fromS, toS }) => ({ channel, fromS, toS }))
      .sort((one, two) => one.fromS - two.fromS);
  }

  /** How many runs of this length its usual share of repeats would give in the log. */
  private byChance({ channel, samples }: Candidate): number {
    const own = this.candidates
      .filter((one) => one.channel === channel)
      .reduce((sum, one) => sum + one.samples - 1, 0);
    const share = (this.repeats[channel]! - own + 1) / (this.total - own + 1);
    return this.total * share ** (samples - 1);
  }

  private close(i: number): void {
    const samples = this.samples[i]!;
    if (samples < LEAST_SAMPLES || this.lastS - this.since[i]! < LEAST_S) return;
    if (this.changes[i]! < 2 * LEAST_CHANGING * (samples - 1) || this.candidates.length >= MOST_KEPT) return;
    this.candidates.push({ channel: i, fromS: this.since[i]!, toS: this.lastS, samples });
  }
}

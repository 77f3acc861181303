/**
 * The χ² gate of one measurement group: who is let in, who was turned away, and when turning away has gone on for so
 * long that the filter itself must be doubted.
 */
import type { Parameters } from '@/shared/contracts/parameters';
import { aidNameSchema } from '@/shared/contracts/runs';
import { chiSquaredQuantile } from '../statistics/distributions';
import type { AidName, GroupName } from './filter-types';

/** Fewer rejections in a row than this never start a recovery. */
const RECOVERY_MIN_COUNT = 3;

export type Verdict = 'accept' | 'reject' | 'recover';

export class Gate {
  /** Largest NIS that passes, for 1, 2, 3 rows. */
  private readonly limits: readonly number[];
  private readonly recoveryAfterS: number;
  private streakCount = 0;
  private streakStartS = 0;
  private judged = 0;

  constructor(parameters: Parameters['gate']) {
    const limit = (rows: number) =>
      parameters.enabled ? chiSquaredQuantile(parameters.probability, rows) : Infinity;
    this.limits = [0, limit(1), limit(2), limit(3)];
    this.recoveryAfterS = parameters.recoveryAfterS;
  }

  /** Judges a group of `rows` measurements with the given NIS at `timeS`, and remembers. */
  judge(timeS: number, rows: number, nis: number): Verdict {
    this.judged = 1;
    if (nis <= this.limits[rows]!) {
      this.streakCount = 0;
      return 'accept';
    }
    if (this.streakCount === 0) this.streakStartS = timeS;
    this.streakCount += 1;
    return this.isDue(timeS) ? 'recover' : 'reject';
  }

  private isDue(timeS: number): boolean {
    return this.streakCount >= RECOVERY_MIN_COUNT && timeS - this.streakStartS >= this.recoveryAfterS;
  }

  /** Nothing but rejections lately: the group's measurements and the state do not agree. */
  get isRejecting(): boolean {
    return this.streakCount >= RECOVERY_MIN_COUNT;
  }

  /** The group has been measured at all. */
  get hasJudged(): boolean {
    return this.judged > 0;
  }

  /** After a recovery: the count starts afresh. */
  reset(): void {
    this.streakCount = 0;
  }

  save(): readonly number[] {
    return [this.streakCount, this.streakStartS, this.judged];
  }
  restore(saved: readonly number[]): void {
    this.streakCount = saved[0]!;
    this.streakStartS = saved[1]!;
    this.judged = saved[2]!;
  }
}

/** A gate for each measurement group: a joint count would let good positions shut velocity out. */
export function gatesOf(parameters: Parameters['gate']): Readonly<Record<GroupName | AidName, Gate>> {
  const names = ['position', 'velocity', ...aidNameSchema.options] as const;
  const gates = Object.fromEntries(names.map((name) => [name, new Gate(parameters)]));
  return gates as Record<GroupName | AidName, Gate>;
}

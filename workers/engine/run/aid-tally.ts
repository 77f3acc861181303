/** Counts what the aids did. */
import type { AidStatistics } from '@/shared/contracts/runs';
import type { AidName } from '../filter/filter-types';
import type { MeasurementUpdate } from '../filter/measurement-update';

export class AidTally {
  private readonly entries = new Map<
    AidName,
    { used: number; rejected: number; nis: number; rows: number }
  >();

  add(aid: AidName, update: MeasurementUpdate, accepted: boolean): void {
    const entry = this.entries.get(aid) ?? { used: 0, rejected: 0, nis: 0, rows: update.rows };
    this.entries.set(aid, entry);
    if (!accepted) {
      entry.rejected += 1;
      return;
    }
    entry.used += 1;
    entry.nis += update.nis;
  }

  results(): AidStatistics[] {
    return [...this.entries].map(([aid, { used, rejected, nis, rows }]) => ({
      aid,
      dimension: rows,
      used,
      rejected,
      nisMean: used > 0 ? nis / used : null,
    }));
  }
}

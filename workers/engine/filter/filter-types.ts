/** What a filter names, tells and carries. */
import type { AidName } from '@/shared/contracts/runs';
import type { MeasurementUpdate } from './measurement-update';

export type { AidName };
export type GroupName = 'position' | 'velocity';

/** Hears of every measurement group that was judged, before it changes the state. */
export interface FilterListener {
  onInnovation(
    group: GroupName | AidName,
    timeS: number,
    axes: number,
    update: MeasurementUpdate,
    accepted: boolean,
  ): void;
  onWarning(code: string, sentence: string, timeS: number): void;
}

/** All that a filter carries from one sample to the next. */
export interface FilterSnapshot {
  strapdown: readonly Float64Array[];
  p: Float64Array;
  sample: number;
  fix: number;
  clipped: number;
  extraNoise: readonly [number, number];
  heading: readonly number[];
  aids: readonly number[];
  data: readonly number[];
  optional: readonly Float64Array[] | null;
  budget: Float64Array[] | null;
  gates: readonly (readonly number[])[];
}

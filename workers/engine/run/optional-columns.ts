/** Columns and summary of the states behind the fifteen; only where a run carries them. */
import type { OptionalStateResult, RunSummary } from '@/shared/contracts/runs';
import { STATES, type StateLayout } from '../filter/states';
import type { SolutionTable } from '../types';

/** A column of the solution: its state, the place of its value, and what turns it into the column's unit. */
export interface OptionalColumn {
  name: string;
  unit: OptionalStateResult['unit'];
  state: number;
  value: number;
  perUnit: number;
}

const AXES = ['x', 'y', 'z'] as const;

/** In the order of the states; `x`, `y`, `z` are forward, right, down. */
export function optionalColumns(layout: StateLayout): OptionalColumn[] {
  const { gyroScale, accelScale, leverArm, barometerBias } = layout;
  const columns: OptionalColumn[] = [];
  const add = (first: number, names: readonly string[], unit: OptionalColumn['unit'], perUnit: number) => {
    if (first < 0) return;
    names.forEach((name, i) =>
      columns.push({ name, unit, state: first + i, value: first + i - STATES, perUnit }),
    );
  };
  add(gyroScale, AXES.map((axis) => `gyro_scale_${axis}_ppm`), 'ppm', 1e6); // prettier-ignore
  add(accelScale, AXES.map((axis) => `accel_scale_${axis}_ppm`), 'ppm', 1e6); // prettier-ignore
  add(leverArm, AXES.map((axis) => `lever_arm_${axis}_m`), 'm', 1); // prettier-ignore
  add(barometerBias, ['barometer_bias_m'], 'm', 1);
  return columns;
}

/** Their last estimates with σ, as the summary has them; empty where there are none. */
export function optionalResults(
  layout: StateLayout,
  table: SolutionTable,
  count: number,
): Pick<RunSummary, 'optionalStates'> {
  const columns = optionalColumns(layout);
  if (columns.length === 0) return {};
  const optionalStates = columns.map(({ name, unit }) => {
    const sigma = table[`sigma_${name}`]!.subarray(0, count);
    return {
      name,
      unit,
      value: table[name]![count - 1]!,
      sigma: sigma[count - 1]!,
      firstSigma: sigma[0]!,
    };
  });
  return { optionalStates };
}

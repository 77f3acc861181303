/** The tables of a run: columns allocated once at their largest length, filled row by row, cut at the end. */
import { FRAME_TABLES } from '@/shared/contracts/frames';
import { SOLUTION_COLUMNS } from '@/shared/contracts/runs';
import { radToDeg } from '@/shared/units';
import { eulerSigmas } from '../alignment/euler-errors';
import { eulerFromQuat } from '../attitude';
import type { MeasurementUpdate } from '../filter/measurement-update';
import {
  ACCEL_BIAS, GYRO_BIAS, PLAIN_LAYOUT, POSITION, sizeOf, VELOCITY, type StateLayout,
} from '../filter/states'; // prettier-ignore
import { optionalColumns, type OptionalColumn } from './optional-columns';
import { HEIGHT, LAT, LON, NAV_ACCEL_BIAS, NAV_GYRO_BIAS, QUAT, VN } from '../strapdown/navigation-state';
import { MAX_ROWS } from '../filter/measurement-update';
import type { CoastingTable, InnovationTable, SolutionTable } from '../types';

export const COVARIANCE_COLUMN = 'cov_ne_m2';

export class SolutionWriter {
  readonly table: SolutionTable;
  count = 0;
  private readonly columns: readonly Float64Array[];
  private readonly quaternion = new Float64Array(4);
  private readonly euler = new Float64Array(3);
  private readonly sigma = new Float64Array(3);

  private readonly optional: readonly OptionalColumn[];

  /** With states behind the fifteen, their columns come last (optional-columns.ts). */
  constructor(capacity: number, layout: StateLayout = PLAIN_LAYOUT) {
    this.optional = optionalColumns(layout);
    const names = [
      ...SOLUTION_COLUMNS,
      COVARIANCE_COLUMN,
      ...this.optional.map((c) => c.name),
      ...this.optional.map((c) => `sigma_${c.name}`),
    ];
    this.columns = names.map(() => new Float64Array(capacity));
    this.table = Object.fromEntries(names.map((name, i) => [name, this.columns[i]!]));
  }

  /** The next row; `nav` as in navigation-state.ts, P size × size, `values` of the states behind the fifteen. */
  write(timeS: number, nav: Float64Array, p: Float64Array, values?: Float64Array): void {
    this.writeAt(this.count, timeS, nav, p, values);
    this.count += 1;
  }

  /** A row anywhere. Order of columns: SOLUTION_COLUMNS. */
  writeAt(row: number, timeS: number, nav: Float64Array, p: Float64Array, values?: Float64Array): void {
    const { columns, quaternion, euler, sigma } = this;
    const diagonal = sizeOf(p) + 1;
    for (let i = 0; i < 4; i += 1) quaternion[i] = nav[QUAT + i]!;
    eulerFromQuat(quaternion, euler);
    eulerSigmas(p, euler[1]!, euler[2]!, sigma);
    columns[0]![row] = timeS;
    columns[1]![row] = radToDeg(nav[LAT]!);
    columns[2]![row] = radToDeg(nav[LON]!);
    columns[3]![row] = nav[HEIGHT]!;
    for (let i = 0; i < 3; i += 1) {
      columns[4 + i]![row] = nav[VN + i]!;
      columns[7 + i]![row] = radToDeg(euler[i]!);
      columns[10 + i]![row] = nav[NAV_GYRO_BIAS + i]!;
      columns[13 + i]![row] = nav[NAV_ACCEL_BIAS + i]!;
      columns[16 + i]![row] = Math.sqrt(p[(POSITION + i) * diagonal]!);
      columns[19 + i]![row] = Math.sqrt(p[(VELOCITY + i) * diagonal]!);
      columns[22 + i]![row] = radToDeg(sigma[i]!);
      columns[25 + i]![row] = Math.sqrt(p[(GYRO_BIAS + i) * diagonal]!);
      columns[28 + i]![row] = Math.sqrt(p[(ACCEL_BIAS + i) * diagonal]!);
    }
    columns[31]![row] = p[1]!;
    this.optional.forEach(({ state, value, perUnit }, i) => {
      columns[32 + i]![row] = values![value]! * perUnit;
      columns[32 + this.optional.length + i]![row] = Math.sqrt(p[state * diagonal]!) * perUnit;
    });
  }

  finish(): SolutionTable {
    return cut(this.table, this.count);
  }
}

export class InnovationWriter {
  readonly table: InnovationTable;
  count = 0;
  /** Measured rows of each epoch (1…3): the dimension of its NIS. */
  readonly dimension: Uint8Array;
  /** Mean of R ÷ S over an epoch's rows: how much of what is predicted is measurement noise. */
  readonly noiseShare: Float64Array;

  constructor(capacity: number) {
    const three = () =>
      [new Float64Array(capacity), new Float64Array(capacity), new Float64Array(capacity)] as const;
    this.dimension = new Uint8Array(capacity);
    this.noiseShare = new Float64Array(capacity);
    this.table = {
      timeS: new Float64Array(capacity),
      innovation: three(),
      sigma: three(),
      nis: new Float64Array(capacity),
      accepted: new Uint8Array(capacity),
    };
  }

  /** Axes (bits) that were not measured stay NaN. */
  write(timeS: number, axes: number, update: MeasurementUpdate, accepted: boolean): void {
    const { table } = this;
    const row = this.count;
    let m = 0;
    let share = 0;
    for (let axis = 0; axis < 3; axis += 1) {
      const measured = ((axes >> axis) & 1) === 1;
      table.innovation[axis as 0 | 1 | 2][row] = measured ? update.innovation[m]! : NaN;
      table.sigma[axis as 0 | 1 | 2][row] = measured ? Math.sqrt(update.s[m * (MAX_ROWS + 1)]!) : NaN;
      if (!measured) continue;
      share += update.r[m]! / update.s[m * (MAX_ROWS + 1)]!;
      m += 1;
    }
    this.noiseShare[row] = share / m;
    table.timeS[row] = timeS;
    table.nis[row] = update.nis;
    table.accepted[row] = accepted ? 1 : 0;
    this.dimension[row] = update.rows;
    this.count += 1;
  }

  finish(): InnovationTable {
    const n = this.count;
    const three = (columns: InnovationTable['sigma']) =>
      [columns[0].slice(0, n), columns[1].slice(0, n), columns[2].slice(0, n)] as const;
    const { table } = this;
    return {
      timeS: table.timeS.slice(0, n),
      innovation: three(table.innovation),
      sigma: three(table.sigma),
      nis: table.nis.slice(0, n),
      accepted: table.accepted.slice(0, n),
    };
  }
}

export type CoastingRow = Record<(typeof FRAME_TABLES)['coasting'][number], number>;

export class CoastingWriter {
  readonly table: CoastingTable;
  count = 0;

  constructor(capacity: number) {
    this.table = Object.fromEntries(FRAME_TABLES.coasting.map((name) => [name, new Float64Array(capacity)]));
  }

  write(row: CoastingRow): void {
    for (const name of FRAME_TABLES.coasting) this.table[name]![this.count] = row[name];
    this.count += 1;
  }

  finish(): CoastingTable {
    return cut(this.table, this.count);
  }
}

function cut(table: Record<string, Float64Array>, rows: number): Record<string, Float64Array> {
  return Object.fromEntries(Object.entries(table).map(([name, column]) => [name, column.slice(0, rows)]));
}

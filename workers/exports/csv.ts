/** Tables as CSV: numbers in full, so that nothing is lost on the way; empty where a value is missing. */
import { INNOVATION_COLUMNS, SOLUTION_COLUMNS } from '@/shared/contracts/runs';
import type { InnovationTable, SolutionTable } from '../engine/types';
import type { RunTables } from '../recordings/results';

/** Not a state of its own: `cov_ne_m2` is for the ellipses on screen. */
const KNOWN: ReadonlySet<string> = new Set([...SOLUTION_COLUMNS, 'cov_ne_m2']);
const ROWS_A_PIECE = 2000;
const CHANNELS = {
  position: ['position_n_m', 'position_e_m', 'position_d_m'],
  velocity: ['velocity_n_m_s', 'velocity_e_m_s', 'velocity_d_m_s'],
} as const;

/** One row an output epoch: SOLUTION_COLUMNS, then the states that the run had beside them. */
export function* solutionCsv(solution: SolutionTable): Generator<string> {
  const names = [...SOLUTION_COLUMNS, ...Object.keys(solution).filter((name) => !KNOWN.has(name))];
  const columns = names.map((name) => solution[name]!);
  yield `${names.join(',')}\n`;
  yield* pieces(solution.time_s!.length, (row) => columns.map((column) => cell(column[row]!)).join(','));
}

/** Every column as it is kept, its unit in its name. */
export function* tableCsv(columns: Record<string, Float64Array>): Generator<string> {
  const kept = Object.values(columns);
  yield `${Object.keys(columns).join(',')}\n`;
  yield* pieces(kept[0]?.length ?? 0, (row) => kept.map((column) => cell(column[row]!)).join(','));
}

/** Long form in time order: one row a scalar channel; `nis` and `accepted` are its group's. */
export function* innovationsCsv({ position, velocity }: RunTables): Generator<string> {
  yield `${INNOVATION_COLUMNS.join(',')}\n`;
  const order = merged(position.timeS, velocity.timeS);
  yield* pieces(order.length, (i) => {
    const { group, row } = order[i]!;
    return innovationLines(group === 'position' ? position : velocity, row, CHANNELS[group]);
  });
}

function innovationLines(table: InnovationTable, row: number, channels: readonly string[]): string {
  return channels
    .flatMap((channel, axis) => {
      const innovation = table.innovation[axis]![row]!;
      if (Number.isNaN(innovation)) return [];
      const numbers = [innovation, table.sigma[axis]![row]!].map(cell).join(',');
      return [
        `${cell(table.timeS[row]!)},${channel},${numbers},${cell(table.nis[row]!)},${table.accepted[row]!}`,
      ];
    })
    .join('\n');
}

/** Rows of both groups by time, position first where they are equal. */
function merged(position: Float64Array, velocity: Float64Array) {
  const order: { group: 'position' | 'velocity'; row: number }[] = [];
  let [p, v] = [0, 0];
  while (p < position.length || v < velocity.length) {
    const takePosition = v >= velocity.length || (p < position.length && position[p]! <= velocity[v]!);
    order.push(takePosition ? { group: 'position', row: p++ } : { group: 'velocity', row: v++ });
  }
  return order;
}

function* pieces(rows: number, line: (row: number) => string): Generator<string> {
  let lines: string[] = [];
  for (let row = 0; row < rows; row += 1) {
    const text = line(row);
    if (text !== '') lines.push(text);
    if (lines.length >= ROWS_A_PIECE) {
      yield `${lines.join('\n')}\n`;
      lines = [];
    }
  }
  if (lines.length > 0) yield `${lines.join('\n')}\n`;
}

/** The shortest text that reads back as the same number. */
const cell = (value: number) => (Number.isNaN(value) ? '' : String(value));

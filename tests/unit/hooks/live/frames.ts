/** Frames for tests of the live run: few rows, values that say where they come from. */
import { FRAME_TABLES, type Frame, type FrameTable, type FrameTables } from '@/shared/contracts/frames';

/** A frame of run `runId` whose tables hold rows at the given times; every other column reads `value`. */
export function makeFrame(
  runId: string,
  seq: number,
  times: Partial<Record<FrameTable, number[]>>,
  options: { progress?: number; toS?: number; value?: number } = {},
): Frame {
  const tables: FrameTables = {};
  for (const name of Object.keys(times) as FrameTable[]) {
    const rows = times[name]!;
    const columns: Record<string, Float64Array | Float32Array> = {};
    for (const column of FRAME_TABLES[name])
      columns[column] =
        column === 'time_s'
          ? Float64Array.from(rows)
          : new Float32Array(rows.length).fill(options.value ?? seq);
    Object.assign(tables, { [name]: columns });
  }
  const last = Math.max(0, ...Object.values(times).flat());
  return {
    head: {
      runId,
      seq,
      progress: options.progress ?? 0.5,
      toS: options.toS ?? last,
      extentS: [0, 100],
      origin: { latDeg: 47.21, lonDeg: -14.63, heightM: 40 },
    },
    tables,
  };
}

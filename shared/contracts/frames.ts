/**
 * The binary frame of a run: what the worker streams while it computes and what GET /runs/:id/series answers.
 *
 * Layout, little-endian: uint32 length of the JSON head · head, UTF-8, padded with spaces so that the columns start
 * at a multiple of 8 · the columns, back to back. `time_s` columns are Float64, all others Float32, each padded to 8 bytes.
 * Missing values are NaN. A frame holds tables; each table has its own time axis.
 */

/** Tables and their columns. Units are in the names. */
export const FRAME_TABLES = {
  /** The state at thinned epochs; σ are 1σ. */
  state: [
    'time_s', 'north_m', 'east_m', 'down_m', 'vn_m_s', 've_m_s', 'vd_m_s', 'roll_deg', 'pitch_deg', 'yaw_deg',
    'sigma_n_m', 'sigma_e_m', 'sigma_d_m', 'sigma_vn_m_s', 'sigma_ve_m_s', 'sigma_vd_m_s',
    'sigma_roll_deg', 'sigma_pitch_deg', 'sigma_yaw_deg', 'cov_ne_m2',
    'gyro_bias_x_rad_s', 'gyro_bias_y_rad_s', 'gyro_bias_z_rad_s',
    'accel_bias_x_m_s2', 'accel_bias_y_m_s2', 'accel_bias_z_m_s2',
    'sigma_gyro_bias_x_rad_s', 'sigma_gyro_bias_y_rad_s', 'sigma_gyro_bias_z_rad_s',
    'sigma_accel_bias_x_m_s2', 'sigma_accel_bias_y_m_s2', 'sigma_accel_bias_z_m_s2',
  ],
  /** Position innovations (measured − predicted) and their predicted 1σ; `accepted` is 1 or 0. */
  position: ['time_s', 'n_m', 'e_m', 'd_m', 'sigma_n_m', 'sigma_e_m', 'sigma_d_m', 'nis', 'accepted'],
  velocity: ['time_s', 'n_m_s', 'e_m_s', 'd_m_s', 'sigma_n_m_s', 'sigma_e_m_s', 'sigma_d_m_s', 'nis', 'accepted'],
  /** Coasting error against truth or the fully aided solution; `outage` is the window's index. */
  coasting: ['time_s', 'outage', 'horizontal_m', 'vertical_m', 'north_m', 'east_m', 'predicted_horizontal_m', 'predicted_vertical_m'],
  /** The fixed-interval smoother's track and its 1σ; only in GET /runs/:id/series, where the run kept one. */
  smoothed: ['time_s', 'north_m', 'east_m', 'down_m', 'sigma_n_m', 'sigma_e_m', 'sigma_d_m'],
} as const; // prettier-ignore

export type FrameTable = keyof typeof FRAME_TABLES;
export type FrameColumn<T extends FrameTable> = (typeof FRAME_TABLES)[T][number];
/** Columns of one table, each of equal length: `time_s` is a Float64Array, the others Float32Arrays. */
export type TableColumns<T extends FrameTable> = Record<FrameColumn<T>, Float64Array | Float32Array>;
export type FrameTables = { [T in FrameTable]?: TableColumns<T> };

export interface FrameHead {
  runId: string;
  /** 0, 1, 2 … within one run; a gap means that a frame was dropped and the series must be fetched. */
  seq: number;
  /** Share of the recording that the filter has passed, 0…1. */
  progress: number;
  /** Time that the run has reached, s. */
  toS: number;
  /** Whole extent of the run, s. */
  extentS: [number, number];
  /** Origin of north/east/down in `state`, degrees and metres. */
  origin: { latDeg: number; lonDeg: number; heightM: number };
  /** In GET /runs/:id/series: no kept row of the stretch was left out, so that a finer one would show no more. */
  whole?: boolean;
}

export interface Frame {
  head: FrameHead;
  tables: FrameTables;
}

interface WireHead extends FrameHead {
  tables: { name: FrameTable; rows: number }[];
}

const padded = (bytes: number) => (bytes + 7) & ~7;
const bytesPerValue = (column: string) => (column === 'time_s' ? 8 : 4);

/** Serialises a frame; the result owns its buffer. */
export function encodeFrame(frame: Frame): Uint8Array<ArrayBuffer> {
  const names = (Object.keys(FRAME_TABLES) as FrameTable[]).filter((name) => frame.tables[name]);
  const columnsOf = (name: FrameTable) => frame.tables[name] as Record<string, Float64Array | Float32Array>;
  const rowsOf = (name: FrameTable) => columnsOf(name).time_s!.length;
  const wire: WireHead = { ...frame.head, tables: names.map((name) => ({ name, rows: rowsOf(name) })) };
  const text = new TextEncoder().encode(JSON.stringify(wire));
  const headBytes = padded(4 + text.length) - 4;
  let total = 4 + headBytes;
  for (const name of names)
    for (const column of FRAME_TABLES[name]) total += padded(rowsOf(name) * bytesPerValue(column));

  const buffer = new ArrayBuffer(total);
  const bytes = new Uint8Array(buffer);
  new DataView(buffer).setUint32(0, headBytes, true);
  bytes.fill(32, 4, 4 + headBytes);
  bytes.set(text, 4);
  let at = 4 + headBytes;
  for (const name of names) {
    const columns = columnsOf(name);
    const rows = rowsOf(name);
    for (const column of FRAME_TABLES[name]) {
      const target =
        column === 'time_s' ? new Float64Array(buffer, at, rows) : new Float32Array(buffer, at, rows);
      target.set(columns[column]!);
      at += padded(rows * bytesPerValue(column));
    }
  }
  return bytes;
}

/** Reads a frame back. The columns are views on `data` where its alignment allows, copies otherwise. */
export function decodeFrame(data: ArrayBuffer | ArrayBufferView): Frame {
  const given = ArrayBuffer.isView(data)
    ? new Uint8Array(data.buffer, data.byteOffset, data.byteLength)
    : new Uint8Array(data);
  const bytes = given.byteOffset % 8 === 0 ? given : new Uint8Array(given);
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (bytes.length < 4) throw new Error('A frame is at least 4 bytes long.');
  const headBytes = view.getUint32(0, true);
  if (4 + headBytes > bytes.length) throw new Error('The frame is cut short.');
  const wire = JSON.parse(new TextDecoder().decode(bytes.subarray(4, 4 + headBytes))) as WireHead;
  const { tables: shapes, ...head } = wire;
  const tables: Record<string, Record<string, Float64Array | Float32Array>> = {};
  let at = bytes.byteOffset + 4 + headBytes;
  for (const { name, rows } of shapes) {
    const columns: Record<string, Float64Array | Float32Array> = {};
    for (const column of FRAME_TABLES[name]) {
      if (at + rows * bytesPerValue(column) > bytes.byteOffset + bytes.length)
        throw new Error('The frame is cut short.');
      columns[column] =
        column === 'time_s'
          ? new Float64Array(bytes.buffer, at, rows)
          : new Float32Array(bytes.buffer, at, rows);
      at += padded(rows * bytesPerValue(column));
    }
    tables[name] = columns;
  }
  return { head, tables };
}

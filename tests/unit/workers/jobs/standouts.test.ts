import { drawnStates, Standouts } from '@/workers/jobs/standouts';

const ROWS = 144_000;
const STRIDE = 96;
/** Four hours at 10 Hz: a slow wave with one row that leaps, and a curve that stands still. */
const wave = Float64Array.from({ length: ROWS }, (_, i) => Math.sin((2 * Math.PI * i) / ROWS));
wave[70_001] = 1.4;
const still = new Float64Array(ROWS).fill(3);

function thinned(columns: Float64Array[], from: number, to: number, stride: number): number[] {
  const standouts = new Standouts();
  standouts.see(columns, from, to);
  return standouts.rows(columns, from, to, stride, to);
}

test('a row that leaps stays, in its place, beside every n-th one', () => {
  const rows = thinned([wave, still], 0, ROWS, STRIDE);
  expect(rows).toContain(70_001);
  expect(rows.filter((row) => row % STRIDE === 0)).toHaveLength(ROWS / STRIDE);
  expect(rows).toHaveLength(ROWS / STRIDE + 1);
  expect(rows).toEqual([...rows].sort((a, b) => a - b));
});

test('what would hardly be seen does not stay', () => {
  const rough = wave.map((value, i) => value + (i % 2 === 0 ? 1e-2 : -1e-2));
  rough[70_001] = rough[70_003]!;
  expect(thinned([rough], 0, ROWS, STRIDE)).toHaveLength(ROWS / STRIDE);
});

test('of many that stand out the two stay that are furthest by their own ranges', () => {
  const rough = Float64Array.from({ length: 101 }, (_, i) => ({ 20: 5, 40: -9, 60: 7 })[i] ?? 0);
  const others = Float64Array.from({ length: 101 }, (_, i) => (i === 60 ? 7 : 0));
  const third = Float64Array.from({ length: 101 }, (_, i) => (i === 20 ? 5 : i === 90 ? 100 : 0));
  expect(thinned([rough, others, third], 0, 101, 100)).toEqual([0, 60, 90, 100]);
});

test('rows that come in pieces are thinned as they come; a stroke waits for its end', () => {
  const standouts = new Standouts();
  const columns = [Float64Array.from({ length: 30 }, (_, i) => (i === 13 ? 1 : 0))];
  standouts.see(columns, 0, 15);
  const first = standouts.rows(columns, 0, 10, 10, 15);
  standouts.see(columns, 15, 30);
  expect([...first, ...standouts.rows(columns, 10, 30, 10, 30)]).toEqual([0, 10, 13, 20]);
});

test('charts draw σ, biases and the track of the state', () => {
  const table = Object.fromEntries(
    ['time_s', 'lat_deg', 'lon_deg', 'height_m', 'vn_m_s', 'sigma_n_m', 'gyro_bias_x_rad_s'].map(
      (name, i) => [name, Float64Array.of(i)],
    ),
  );
  expect(drawnStates(table).map(([value]) => value)).toEqual([1, 2, 5, 6]);
});

import { bucketFor, extremeRows, strideFor, strideRows } from '@/workers/jobs/thinning';

const random = (seed: number) => () => {
  seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0;
  return seed / 2 ** 32;
};

function innovations(rows: number) {
  const next = random(7);
  const column = () => Float64Array.from({ length: rows }, () => next() + next() + next() - 1.5);
  return {
    timeS: Float64Array.from({ length: rows }, (_, i) => i),
    innovation: [column(), column(), column()] as const,
    sigma: [column(), column(), column()] as const,
    nis: column(),
    accepted: new Uint8Array(rows).fill(1),
  };
}

test('strides keep multiples, wherever the piece begins, and the last row when asked', () => {
  expect(strideRows(0, 10, 4, false)).toEqual([0, 4, 8]);
  expect([...strideRows(0, 6, 4, false), ...strideRows(6, 10, 4, true)]).toEqual([0, 4, 8, 9]);
  expect(strideRows(3, 3, 4, true)).toEqual([]);
  expect(strideFor(12_000, 1500)).toBe(8);
  expect(strideFor(10, 1500)).toBe(1);
});

test('few rows are all kept', () => {
  const table = innovations(100);
  expect(bucketFor(100, 100)).toBe(1);
  expect(extremeRows(table, 0, 100, 1)).toHaveLength(100);
});

test('of many rows the extremes of every bucket stay, in about the number asked for', () => {
  const table = innovations(12_000);
  const bucket = bucketFor(12_000, 1500);
  const rows = extremeRows(table, 0, 12_000, bucket);
  const kept = new Set(rows);
  expect(rows).toEqual([...rows].sort((a, b) => a - b));
  expect(kept.size).toBe(rows.length);
  expect(rows.length).toBeGreaterThan(1200);
  expect(rows.length).toBeLessThan(2200);
  for (let start = 0; start < 12_000; start += bucket) {
    const piece = table.innovation[1].subarray(start, start + bucket);
    expect(kept.has(start + piece.indexOf(Math.max(...piece)))).toBe(true);
    expect(kept.has(start + piece.indexOf(Math.min(...piece)))).toBe(true);
  }
});

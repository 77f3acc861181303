import { splicedRun, splicedSeries } from '@/hooks/finer/splice';
import { RunData } from '@/hooks/live/run-data';
import type { Series } from '@/shared/contracts/recordings';
import { makeFrame } from '../live/frames';

const every = (from: number, to: number, step: number) =>
  Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step);

function coarseRun(): RunData {
  const data = new RunData('a');
  data.append(
    makeFrame('a', 0, { state: every(0, 100, 10), position: every(0, 100, 20) }, { value: 1, toS: 100 }),
  );
  data.finish();
  return data;
}
const piece = (fromS: number, toS: number, times = every(fromS, toS, 1)) => ({
  span: [fromS, toS] as const,
  data: makeFrame('a', 0, { state: times }, { value: 2, toS: 100 }),
});
const column = (data: RunData, table: 'state' | 'position', name: string) =>
  [...data.table(table).columns[name]!].slice(0, data.table(table).length);
const times = (data: RunData) => column(data, 'state', 'time_s');
const sigma = (data: RunData) => column(data, 'state', 'sigma_n_m');

describe('a run with finer pieces', () => {
  it('has their rows in their stretch and its own elsewhere', () => {
    const spliced = splicedRun(coarseRun(), [piece(25, 45)]);
    expect(times(spliced)).toEqual([0, 10, 20, ...every(25, 45, 1), 50, 60, 70, 80, 90, 100]);
    expect(sigma(spliced).filter((value) => value === 2)).toHaveLength(21);
    expect(spliced.complete).toBe(true);
    expect([...spliced.extentS]).toEqual([0, 100]);
  });

  it('takes two neighbours without repeating the row at their border', () => {
    const spliced = splicedRun(coarseRun(), [piece(0, 50), piece(50, 100)]);
    expect(times(spliced)).toEqual(every(0, 100, 1));
  });

  it('takes only the stretch that a longer piece is to serve', () => {
    const long = { ...piece(0, 100), span: [30, 40] as const };
    expect(times(splicedRun(coarseRun(), [long]))).toEqual([
      0, 10, 20, ...every(30, 40, 1), 50, 60, 70, 80, 90, 100,
    ]); // prettier-ignore
  });

  it('shows a spike of one row at its own time', () => {
    const found = piece(20, 60);
    (found.data.tables.state!.sigma_n_m as Float32Array)[13] = 40;
    const spliced = splicedRun(coarseRun(), [found]);
    expect(times(spliced)[sigma(spliced).indexOf(40)]).toBe(33);
  });

  it('leaves a table that the pieces have no rows of empty there, and the coarse run as it was', () => {
    const coarse = coarseRun();
    const spliced = splicedRun(coarse, [piece(25, 45)]);
    expect(column(spliced, 'position', 'time_s')).toEqual([0, 20, 40, 60, 80, 100]);
    expect(times(coarse)).toEqual(every(0, 100, 10));
  });
});

test('channels of a recording are spliced alike, by name', () => {
  const series = (timeS: number[], name = 'gyro_x'): Series => ({
    channels: [{ name, unit: '°/s', timeS, values: timeS.map((time) => (time === 33 ? 500 : 0)) }],
  });
  const { channels } = splicedSeries(series(every(0, 100, 10)), [
    { span: [20, 40], data: series(every(20, 40, 1)) },
    { span: [40, 60], data: series(every(40, 60, 1), 'gyro_y') },
  ]);
  expect(channels[0]!.timeS).toEqual([0, 10, ...every(20, 40, 1), 50, 60, 70, 80, 90, 100]);
  expect(channels[0]!.timeS[channels[0]!.values.indexOf(500)]).toBe(33);
});

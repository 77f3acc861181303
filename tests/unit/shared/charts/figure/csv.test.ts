import Papa from 'papaparse';
import { columnName, csvText } from '@/shared/charts/figure/csv';
import { fileName } from '@/components/charts/save-files';
import { timeColumns, timeTables } from '@/shared/charts/figure/time-tables';
import type { ChartContent } from '@/shared/charts/model/layers';
import { columnSeries } from '@/shared/charts/model/series';
import { ORIGIN } from './document';

const column = (time: number[], values: number[]) =>
  columnSeries(Float64Array.from(time), Float32Array.from(values), time.length);
const content: ChartContent = {
  id: 'test',
  title: 'Test',
  unit: 'm/s²',
  layers: [
    { kind: 'line', id: 'n', tone: 'north', series: () => column([0, 1, 2, 3], [0.1, -2.5, NaN, 4]) },
    {
      kind: 'line',
      id: 'n.before',
      tone: 'north',
      fromS: () => 2,
      series: () => column([0, 1], [9, 9]),
    },
    { kind: 'dots', id: 'd', column: 'three_sigma n', tone: 'ink', series: () => column([1.5, 3], [7, 8]) },
    { kind: 'rules', id: 'bounds', tone: 'pine', values: () => [0.2, 9.3] },
  ],
  windows: () => [],
  domain: () => [0, 1],
  sentence: () => '',
};
const parsed = (text: string) => Papa.parse<string[]>(text, { skipEmptyLines: true }).data;

describe('the figures of a chart', () => {
  it('are a row a time, a column a curve with its unit, and equal the data', () => {
    const [header, ...rows] = parsed(csvText(timeColumns(content, [-Infinity, Infinity])));
    expect(header).toEqual(['time_s', 'n_m_s2', 'three_sigma_n_m_s2', 'bounds_low_m_s2', 'bounds_high_m_s2']);
    expect(rows).toEqual([
      ['0', '0.1', '', '0.2', '9.3'],
      ['1', '-2.5', '', '0.2', '9.3'],
      ['1.5', '', '7', '0.2', '9.3'],
      ['3', '4', '8', '0.2', '9.3'],
    ]);
  });

  it('are those in view, and all', () => {
    const tables = timeTables(content, [1, 2], [0, 3]);
    expect(tables.map(({ part, columns }) => [part, columns[0]!.values])).toEqual([
      ['in-view', [1, 1.5]],
      ['all', [0, 1, 1.5, 3]],
    ]);
    expect(timeTables(content, [0, 3], [0, 3]).map(({ part }) => part)).toEqual(['']);
  });
});

describe('a CSV file', () => {
  it('keeps a millisecond of a long recording and gives no false digits', () => {
    const [, ...rows] = parsed(
      csvText([
        { name: 'time_s', values: [14_399.995, 1e-7] },
        { name: 'a_m', values: [Math.fround(0.3), -1.25e-9] },
      ]),
    );
    expect(rows).toEqual([
      ['14399.995', '0.3'],
      ['1e-7', '-1.25e-9'],
    ]);
  });

  it('makes no formula of a text, and quotes what would break a row', () => {
    const values = ['=1+1', '+a', '-b', '@c', '\td', 'plain', 'a,b', 'say "x"', 'two\nlines'];
    const [, ...rows] = parsed(csvText([{ name: 'source', values }]));
    expect(rows.map(([cell]) => cell)).toEqual([
      "'=1+1",
      "'+a",
      "'-b",
      "'@c",
      "'\td",
      'plain',
      'a,b',
      'say "x"',
      'two\nlines',
    ]);
  });

  it('has names of small letters with the unit last', () => {
    expect(columnName('σ N', 'm/s²')).toBe('sigma_n_m_s2');
    expect(columnName('Allan deviation', '°/h')).toBe('allan_deviation_deg_h');
    expect(columnName('NIS', '')).toBe('nis');
  });

  it('is named by recording, chart and run', () => {
    expect(fileName(ORIGIN, 'Position σ', 'in-view', 'csv')).toBe(
      'breakwater-loop-return_position-sigma_run-4f0c8a52_in-view.csv',
    );
    expect(fileName({ ...ORIGIN, run: null }, 'Gyro', '', 'svg')).toBe('breakwater-loop-return_gyro.svg');
  });
});

import {
  allanSave,
  budgetSave,
  correlationSave,
  driftGrowthSave,
  histogramSave,
} from '@/components/charts/quiet/quiet-saves';
import { palettes } from '@/constants/theme';
import { documentOf, pathPoints } from './document';

const words = { title: 'Chart', aside: '', sentence: 'In words.' };
const { paper } = palettes;

test('an Allan curve runs straight where the deviation falls as 1/√τ, on both logarithms', () => {
  const taus = [0.1, 1, 10, 100];
  const save = allanSave(
    {
      curves: [
        {
          axis: 'x',
          points: taus.map((tauS) => {
            const deviation = 3 / Math.sqrt(tauS);
            return { tauS, deviation, low: deviation * 0.9, high: deviation * 1.1, model: deviation };
          }),
        },
      ],
      expected: null,
      unit: '°/h',
    },
    words,
  );
  const { nodes, sheet } = documentOf(save.figure());
  const legend = nodes.filter(({ name }) => name === 'text').map(({ text }) => text);
  expect(legend).toEqual(expect.arrayContaining(['x', 'fit', 'averaging time τ, s', 'Allan deviation, °/h']));
  const paths = nodes
    .filter(({ attributes }) => attributes.stroke === paper.north && attributes['stroke-width'] === '1.75')
    .map(({ attributes }) => pathPoints(attributes.d!))
    .sort((a, b) => b.length - a.length);
  const [[x0, y0], , , [x3, y3]] = paths[0] as [[number, number], unknown, unknown, [number, number]];
  expect(x0).toBeCloseTo(sheet.clip.left, 0);
  expect(x3).toBeCloseTo(sheet.clip.right, 0);
  // Three decades of τ on the axis, and one and a half of the deviation: 9.49 down to 0.3 on an axis of 0.1 … 100.
  const decade = (sheet.clip.bottom - sheet.clip.top) / 3;
  expect(y3 - y0).toBeCloseTo(1.5 * decade, 0);
  const [table] = save.tables();
  expect(table!.columns.map(({ name }) => name)).toEqual([
    'axis', 'tau_s', 'deviation_deg_h', 'low_deg_h', 'high_deg_h', 'fit_deg_h',
  ]); // prettier-ignore
  expect(table!.columns[1]!.values).toEqual(taus);
});

test('a histogram’s bars reach their densities', () => {
  const save = histogramSave(
    {
      bins: [
        { from: -1, to: 0, density: 0.25 },
        { from: 0, to: 1, density: 0.5 },
      ],
      expected: [{ x: 0, density: 0.4 }],
      xLabel: 'innovation ÷ σ',
    },
    words,
  );
  const { nodes, sheet } = documentOf(save.figure());
  const { top, bottom } = sheet.clip;
  const bars = nodes.find(({ attributes }) => attributes['fill-opacity'] === '0.45')!;
  const heights = [...bars.attributes.d!.matchAll(/V(-?[\d.]+)H/g)].map((match) => Number(match[1]));
  expect(heights[0]).toBeCloseTo(bottom - (0.25 / 0.54) * (bottom - top), 0);
  expect(heights[1]).toBeCloseTo(bottom - (0.5 / 0.54) * (bottom - top), 0);
});

test('drift growth draws the 95 % that were predicted, and each window', () => {
  const save = driftGrowthSave(
    {
      windows: [
        [
          { afterS: 0, errorM: 0 },
          { afterS: 60, errorM: 10 },
        ],
      ],
      predicted: [
        { afterS: 0, sigmaM: 0, p95M: 0 },
        { afterS: 60, sigmaM: 12, p95M: 20 },
      ],
      longestS: 60,
    },
    words,
  );
  const { nodes, sheet } = documentOf(save.figure());
  const { top, bottom, right } = sheet.clip;
  const yOf = (metres: number) => bottom - (metres / 21.6) * (bottom - top);
  const drawn = nodes
    .filter(({ attributes }) => attributes.stroke === paper.ink)
    .flatMap(({ attributes }) => pathPoints(attributes.d!));
  expect(drawn).toContainEqual([right, expect.closeTo(yOf(10), 0)]);
  const band = nodes.find(({ attributes }) => attributes['fill-opacity'] === '0.12')!;
  expect(pathPoints(band.attributes.d!)).toContainEqual([right, expect.closeTo(yOf(20), 0)]);
});

test('an autocorrelation has its band and a stem a lag', () => {
  const data = {
    axes: [{ label: 'N', tone: 'north' as const, values: [0.5, -0.1] }],
    band: 0.2,
    lags: 2,
  };
  const save = correlationSave(data, words);
  const { nodes } = documentOf(save.figure());
  const stems = nodes.find(({ name, attributes }) => name === 'path' && attributes.stroke === paper.north)!
    .attributes.d!;
  expect(stems.match(/M/g)).toHaveLength(2);
  expect(save.tables()[0]!.columns).toEqual([
    { name: 'lag_fixes', values: [1, 2] },
    { name: 'correlation_n', values: [0.5, -0.1] },
    { name: 'band_95', values: [0.2, 0.2] },
  ]);
});

test('an error budget stacks its shares to the full height', () => {
  const save = budgetSave(
    { sources: ['gyro bias', 'GNSS noise'], columns: [{ afterS: 60, totalM: 5, shares: [0.64, 0.36] }] },
    words,
  );
  const { nodes, sheet } = documentOf(save.figure());
  const { top, bottom } = sheet.clip;
  const heights = nodes
    .filter(({ name, attributes }) => name === 'rect' && attributes.stroke === paper.sheet)
    .map(({ attributes }) => Number(attributes.height))
    .filter((height) => height > 20);
  expect(heights[0]).toBeCloseTo(0.64 * (bottom - top - 16), 0);
  expect(heights[1]).toBeCloseTo(0.36 * (bottom - top - 16), 0);
  expect(save.tables()[0]!.columns.map(({ name }) => name)).toEqual([
    'after_s', 'total_1sigma_m', 'share_gyro_bias', 'share_gnss_noise',
  ]); // prettier-ignore
});

import { emptyWords } from '@/shared/charts/model/empty';
import type { ChartContent, Layer } from '@/shared/charts/model/layers';
import { columnSeries } from '@/shared/charts/model/series';

const content = (layers: Layer[], empty?: () => string): ChartContent => ({
  id: 'c',
  title: 'Velocity innovation',
  unit: 'm/s',
  layers,
  windows: () => [],
  domain: () => [0, 1],
  sentence: () => '',
  empty,
});
const line = (values: number[]): Layer => ({
  kind: 'line',
  id: 'l',
  tone: 'ink',
  series: () => columnSeries(values.map((_, i) => i), values, values.length), // prettier-ignore
});
const rules: Layer = { kind: 'rules', id: 'r', tone: 'pine', values: () => [1, 2] };

test('a chart that has a value says nothing', () => {
  expect(emptyWords(content([line([NaN, 3])], () => 'why'))).toBe('');
});

test('a chart without one says why, whatever bounds are ruled', () => {
  expect(emptyWords(content([line([]), rules], () => 'The recording has no velocity.'))).toBe(
    'The recording has no velocity.',
  );
  expect(emptyWords(content([line([NaN, NaN])]))).toBe('Nothing to draw yet.');
  const gone: Layer = { kind: 'dots', id: 'd', tone: 'ink', series: () => null };
  expect(emptyWords(content([gone]))).toBe('Nothing to draw yet.');
});

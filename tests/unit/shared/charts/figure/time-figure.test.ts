import { originLine } from '@/shared/charts/figure/sheet';
import { timeFigure } from '@/shared/charts/figure/time-figure';
import type { ChartContent } from '@/shared/charts/model/layers';
import { columnSeries, type TimeSeries } from '@/shared/charts/model/series';
import { palettes } from '@/constants/theme';
import { documentOf, ORIGIN, pathPoints } from './document';

const series = (points: [number, number][]): TimeSeries =>
  columnSeries(
    Float64Array.from(points.map(([time]) => time)),
    Float64Array.from(points.map(([, value]) => value)),
    points.length,
  );

const spike = Array.from({ length: 4001 }, (_, i): [number, number] => [
  i / 40,
  i === 1000 ? 8 : Math.sin(i / 7),
]);
const content: ChartContent = {
  id: 'innovation.position',
  title: 'Position innovation',
  unit: 'm',
  layers: [
    { kind: 'band', id: 'sigma', tone: 'north', label: '±3σ', series: () => series([[0, 6], [100, 3]]) }, // prettier-ignore
    { kind: 'rules', id: 'bounds', tone: 'pine', label: 'bounds', values: () => [5] },
    { kind: 'line', id: 'n', tone: 'north', label: 'N', series: () => series(spike) },
  ],
  windows: () => [{ startS: 40, endS: 60 }],
  domain: () => [-10, 10],
  sentence: () => 'North 1.02 times the predicted σ.',
};

describe('a chart over time, saved', () => {
  const { nodes, sheet, svg } = documentOf(timeFigure(content, [0, 100]));
  const { left, top, right, bottom } = sheet.clip;
  const yOf = (value: number) => top + ((10 - value) / 20) * (bottom - top);
  const xOf = (timeS: number) => left + (timeS / 100) * (right - left);
  const strokes = (colour: string) =>
    nodes.filter(({ name, attributes }) => name === 'path' && attributes.stroke === colour);
  const words = nodes.filter(({ name }) => name === 'text').map(({ text }) => text);

  it('draws the curve with the extremes of its data at their pixels', () => {
    const [longest] = strokes(palettes.paper.north).sort(
      (a, b) => b.attributes.d!.length - a.attributes.d!.length,
    );
    const drawn = pathPoints(longest!.attributes.d!);
    const peak = drawn.reduce((best, point) => (point[1] < best[1] ? point : best));
    expect(peak[0]).toBeCloseTo(xOf(25), 0);
    expect(peak[1]).toBeCloseTo(yOf(8), 0);
    expect(Math.max(...drawn.map(([, y]) => y))).toBeCloseTo(yOf(-1), 0);
  });

  it('lays the σ band, the bounds and the window at their values', () => {
    const [band] = nodes.filter(
      ({ attributes }) => attributes.fill === palettes.paper.north && attributes['fill-opacity'] === '0.06',
    );
    const drawn = pathPoints(band!.attributes.d!);
    expect(drawn[0]).toEqual([xOf(0), expect.closeTo(yOf(6), 0)]);
    expect(drawn.at(-1)).toEqual([xOf(0), expect.closeTo(yOf(-6), 0)]);
    const rule = strokes(palettes.paper.pine).find(({ attributes }) => !attributes.transform);
    expect(Number(/^M[\d.]+ ([\d.]+)/.exec(rule!.attributes.d!)![1])).toBeCloseTo(yOf(5), 0);
    const tint = nodes.find(({ attributes }) => attributes['fill-opacity'] === '0.08')!;
    expect(Number(/^M([\d.]+)/.exec(tint.attributes.d!)![1])).toBeCloseTo(xOf(40), 0);
    expect(Number(/H([\d.]+)/.exec(tint.attributes.d!)![1])).toBeCloseTo(xOf(60), 0);
  });

  it('says title, axes with units, legend, and whence it comes', () => {
    for (const text of ['Position innovation', 'Position innovation, m', 'time, min:s', 'N', '±3σ', 'bounds'])
      expect(words).toContain(text);
    expect(words.at(-1)).toBe(originLine(ORIGIN));
    expect(originLine(ORIGIN)).toBe(
      'Breakwater <loop> & "return" · run 4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e01 · engine 1.4.0',
    );
    expect(nodes.find(({ name }) => name === 'desc')!.text).toBe('North 1.02 times the predicted σ.');
  });

  it('stands by itself: nothing is fetched, every font has others behind it', () => {
    expect(svg).not.toMatch(/href|url\((?!#plot)|<style|<script/);
    for (const { name, attributes } of nodes)
      if (name === 'text') expect(attributes['font-family']).toMatch(/, (sans-serif|monospace)$/);
  });

  it('shows the stretch in view alone', () => {
    const zoomed = documentOf(timeFigure(content, [20, 30]));
    const words = zoomed.nodes.filter(({ name }) => name === 'text').map(({ text }) => text);
    expect(words.some((text) => text.includes('0:20'))).toBe(true);
    expect(words).not.toContain('1:40');
  });

  it('leaves out characters that XML does not know', () => {
    expect(documentOf({ ...timeFigure(content, [0, 100]), title: 'a\u0007b' }).nodes[1]!.text).toBe('ab');
  });
});

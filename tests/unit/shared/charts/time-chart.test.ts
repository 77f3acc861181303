import { chartBuffers, coastingGround, drawChart, type PlotBox } from '@/shared/charts/model/time-chart';
import type { ChartContent, Layer } from '@/shared/charts/model/layers';
import { linearScale } from '@/shared/charts/model/scale';
import { columnSeries, type TimeSeries } from '@/shared/charts/model/series';

const box: PlotBox = { left: 40, top: 10, right: 240, bottom: 110 };
/** Domain −10…10 over 100 px, 0…100 s over 200 px: 5 px a unit, 2 px a second. */
const yOf = (value: number) => 60 - 5 * value;
const xOf = (t: number) => 40 + 2 * t;

const series = (points: [number, number][]): TimeSeries =>
  columnSeries(
    Float64Array.from(points.map(([t]) => t)),
    Float64Array.from(points.map(([, value]) => value)),
    points.length,
  );

function content(layers: Layer[], windows: { startS: number; endS: number }[] = []): ChartContent {
  return {
    id: 'test',
    title: 'Test',
    unit: 'm',
    layers,
    windows: () => windows,
    domain: () => [-10, 10],
    sentence: () => '',
  };
}
const draw = (
  layers: Layer[],
  windows?: { startS: number; endS: number }[],
  view: [number, number] = [0, 100],
) => drawChart(content(layers, windows), view, box, chartBuffers());
const numbers = (path: string) => [...path.matchAll(/-?[\d.]+/g)].map(Number);
const points = (path: string) =>
  [...path.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)].map((match) => [Number(match[1]), Number(match[2])]);

describe('a line', () => {
  const spike = Array.from({ length: 5001 }, (_, i): [number, number] => [
    i / 50,
    i === 2500 ? 8 : Math.sin(i),
  ]);

  it('has the extremes of its data at their pixels, among five thousand points', () => {
    const { layers } = draw([
      { kind: 'line', id: 'l', tone: 'ink', label: 'l', series: () => series(spike) },
    ]);
    const drawn = points(layers.l!.stroke);
    const top = Math.min(...drawn.map(([, y]) => y!));
    expect(top).toBeCloseTo(yOf(8), 1);
    expect(drawn.find(([, y]) => y === top)![0]).toBeCloseTo(xOf(50), 1);
    expect(Math.max(...drawn.map(([, y]) => y!))).toBeCloseTo(yOf(-1), 1);
    expect(layers.l!.dense).toBe(true);
  });

  it('begins where it is told to: what a newer run has not reached yet', () => {
    const flat = series([0, 20, 40, 60, 80, 100].map((t) => [t, 1]));
    const { layers } = draw([{ kind: 'line', id: 'l', tone: 'ink', fromS: () => 50, series: () => flat }]);
    expect(points(layers.l!.stroke)).toEqual([
      [xOf(60), yOf(1)],
      [xOf(80), yOf(1)],
      [xOf(100), yOf(1)],
    ]);
  });

  it('does not cross an outage window when it must not', () => {
    const dotted = series([0, 20, 40, 60, 80].map((t) => [t, 0]));
    const layer: Layer = { kind: 'line', id: 'l', tone: 'ink', breaks: true, series: () => dotted };
    const { layers } = draw([layer], [{ startS: 25, endS: 55 }]);
    expect(layers.l!.stroke).toBe(`M40 60L80 60M120 60h0M160 60L200 60`);
  });

  it('is counted where it leaves the scale, and the largest is told', () => {
    const wild = series([
      [10, 3],
      [20, 42],
      [30, -95],
    ]);
    expect(draw([{ kind: 'line', id: 'l', tone: 'ink', label: 'l', series: () => wild }]).beyond).toEqual({
      count: 2,
      largest: -95,
    });
  });
});

describe('grounds', () => {
  it('a σ band lies between −kσ and +kσ', () => {
    const three = series([
      [0, 6],
      [100, 3],
    ]);
    const { layers } = draw([{ kind: 'band', id: 'b', tone: 'north', series: () => three }]);
    expect(layers.b!.fill).toBe(`M40 ${yOf(6)}L240 ${yOf(3)}L240 ${yOf(-3)}L40 ${yOf(-6)}Z`);
    expect(layers.b!.stroke).toBe(`M40 ${yOf(6)}L240 ${yOf(3)}M40 ${yOf(-6)}L240 ${yOf(-3)}`);
  });

  it('a band about an estimate follows it', () => {
    const [half, centre] = [
      series([
        [0, 1],
        [100, 2],
      ]),
      series([
        [0, 4],
        [100, -4],
      ]),
    ];
    const { layers } = draw([
      { kind: 'band', id: 'b', tone: 'north', series: () => half, centre: () => centre },
    ]);
    expect(layers.b!.fill).toBe(`M40 ${yOf(5)}L240 ${yOf(-2)}L240 ${yOf(-6)}L40 ${yOf(3)}Z`);
  });

  it('an area stands on zero', () => {
    const grown = series([
      [50, 0],
      [100, 8],
    ]);
    const { layers } = draw([{ kind: 'area', id: 'a', tone: 'vermilion', series: () => grown }]);
    expect(layers.a!.fill).toBe(`M140 ${yOf(0)}L140 ${yOf(0)}L240 ${yOf(8)}L240 ${yOf(0)}Z`);
  });
});

describe('rules and marks', () => {
  it('bounds are ruled at their values, those off the scale are left out', () => {
    const { layers } = draw([{ kind: 'rules', id: 'r', tone: 'pine', values: () => [2.5, -7.5, 30] }]);
    expect(layers.r!.stroke).toBe(`M40 ${yOf(2.5)}H240M40 ${yOf(-7.5)}H240`);
  });

  it('a rejected fix is a diamond at its value, or at the edge when beyond the scale', () => {
    const rejected = series([
      [25, 4],
      [75, 99],
    ]);
    const { layers } = draw([{ kind: 'diamonds', id: 'd', tone: 'vermilion', series: () => rejected }]);
    expect(layers.d!.stroke.match(/M/g)).toHaveLength(2);
    expect(numbers(layers.d!.stroke.split('Z')[0]!).slice(0, 2)).toEqual([xOf(25), yOf(4) - 4.5]);
    expect(points(layers.d!.stroke)[1]).toEqual([xOf(75), 10 + 7 - 4.5]);
  });

  it('marks outside the view are not drawn', () => {
    const spread = series([0, 20, 50, 80, 100].map((t) => [t, 1]));
    const { layers } = draw([{ kind: 'dots', id: 'd', tone: 'ink', series: () => spread }], [], [40, 60]);
    expect(layers.d!.stroke).toBe(`M140 ${yOf(1)}h0`);
  });
});

describe('coasting ground', () => {
  it('lies exactly over its window, cut to the plot', () => {
    const x = linearScale([0, 100], [40, 240]);
    const { tint, edges } = coastingGround(
      [
        { startS: 20, endS: 30 },
        { startS: 95, endS: 130 },
        { startS: 200, endS: 210 },
      ],
      x,
      box,
    );
    expect(tint).toBe('M80 10H100V110H80ZM230 10H240V110H230Z');
    expect(edges).toBe('M80 10V110M100 10V110M230 10V110');
  });
});

describe('axes', () => {
  it('labels lie at their values', () => {
    const { valueTicks, timeTicks } = draw([]);
    expect(valueTicks).toEqual([
      { at: yOf(-10), label: '−10' },
      { at: yOf(0), label: '0' },
      { at: yOf(10), label: '10' },
    ]);
    expect(timeTicks[0]).toEqual({ at: xOf(0), label: '0:00' });
  });

  it('draws something sensible of a domain that is empty or not finite', () => {
    const chart = { ...content([]), domain: (): [number, number] => [NaN, Infinity] };
    expect(drawChart(chart, [0, 100], box, chartBuffers()).y.domain).toEqual([0, 1]);
    const flat = { ...content([]), domain: (): [number, number] => [5, 5] };
    const { domain } = drawChart(flat, [0, 100], box, chartBuffers()).y;
    expect(domain[0]).toBeLessThan(5);
    expect(domain[1]).toBeGreaterThan(5);
  });
});

describe('annotations', () => {
  const noted = (notes: { timeS: number; value: number; text: string }[]) =>
    drawChart(
      { ...content([]), annotations: () => notes.map((note) => ({ ...note, tone: 'ink' as const })) },
      [0, 100],
      box,
      chartBuffers(),
    ).annotations;

  it('stand right of their point, or left where there is no room', () => {
    expect(noted([{ timeS: 20, value: 0, text: '14.6 m' }])[0]).toMatchObject({
      anchor: 'start',
      x: xOf(20) + 6,
    });
    expect(noted([{ timeS: 98, value: 0, text: '14.6 m' }])[0]).toMatchObject({
      anchor: 'end',
      x: xOf(98) - 6,
    });
  });

  it('do not lie on each other', () => {
    const [first, second] = noted([
      { timeS: 20, value: 1, text: '14.6 m' },
      { timeS: 20, value: 1.2, text: '95 % predicted' },
    ]);
    expect(Math.abs(first!.y - second!.y)).toBeGreaterThanOrEqual(15);
  });

  it('are left out with the stretch of time that is out of view', () => {
    expect(noted([{ timeS: 120, value: 1, text: 'late' }])).toEqual([]);
  });
});

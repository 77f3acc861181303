import { coastingChart, axisRatio, sigmaChart } from '@/components/bench/state-charts';
import { innovationChart, nisChart } from '@/components/bench/innovation-charts';
import { driftGrowth, innovationDistribution } from '@/components/bench/quiet-data';
import type { Curves, CurvesSource } from '@/components/bench/curves';
import { chartBuffers, drawChart, type PlotBox } from '@/shared/charts/model/time-chart';
import type { ChartContent } from '@/shared/charts/model/layers';
import { tableRows } from '@/components/charts/table-rows';
import { RunData } from '@/hooks/live/run-data';
import { FRAME_TABLES, type FrameTable } from '@/shared/contracts/frames';
import { makeFrame } from '../../hooks/live/frames';
import { driftPoint, makeSummary, outage } from './summary';

const box: PlotBox = { left: 0, top: 0, right: 1000, bottom: 100 };
const window = { startS: 40, endS: 60 };

/** A run of `count` rows a table, a second apart; `values` gives named columns, others read 0. */
function runOf(
  runId: string,
  tables: Partial<Record<FrameTable, { times: number[]; values: Record<string, (t: number) => number> }>>,
): RunData {
  const frame = makeFrame(
    runId,
    0,
    Object.fromEntries(Object.entries(tables).map(([name, { times }]) => [name, times])),
    { value: 0, toS: 100 },
  );
  for (const [name, { times, values }] of Object.entries(tables)) {
    const columns = frame.tables[name as FrameTable] as Record<string, Float32Array>;
    for (const [column, at] of Object.entries(values)) {
      expect(FRAME_TABLES[name as FrameTable] as readonly string[]).toContain(column);
      columns[column] = Float32Array.from(times, at);
    }
  }
  const data = new RunData(runId);
  data.append(frame);
  return data;
}
const seconds = (from: number, to: number) => Array.from({ length: to - from + 1 }, (_, i) => from + i);
const source = (curves: Partial<Curves>, summary = makeSummary()): CurvesSource => ({
  curves: () => ({ current: null, previous: null, ghost: null, ...curves }),
  summary: () => summary,
});
const draw = (content: ChartContent) => drawChart(content, [0, 100], box, chartBuffers());
const points = (path: string) =>
  [...path.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)].map(
    (match) => [Number(match[1]), Number(match[2])] as const,
  );

describe('innovations', () => {
  const times = [...seconds(0, 39), ...seconds(60, 100)];
  const run = runOf('a', {
    position: {
      times,
      values: {
        n_m: (t) => (t === 10 ? 40 : Math.sin(t)),
        sigma_n_m: () => 1,
        sigma_e_m: () => 1,
        sigma_d_m: () => 1,
        nis: (t) => (t === 10 ? 1600 : 3),
        accepted: (t) => (t === 10 ? 0 : 1),
      },
    },
  });
  const chart = innovationChart(source({ current: run }), 'position', () => [window]);
  const drawing = draw(chart);

  it('has ±3σ at three times the predicted σ', () => {
    const heights = new Set(points(drawing.layers['sigma.n']!.stroke).map(([, y]) => y));
    const expected = [drawing.y(3), drawing.y(-3)].map((y) => Math.round(y * 10) / 10);
    expect([...heights].sort((a, b) => a - b)).toEqual(expected.sort((a, b) => a - b));
  });

  it('does not draw through the outage', () => {
    const drawn = points(drawing.layers.n!.stroke).map(([x]) => x);
    expect(drawn.filter((x) => x > drawing.x(39.5) && x < drawing.x(59.5))).toEqual([]);
    expect(drawing.layers.n!.stroke.match(/M/g)!.length).toBeGreaterThan(1);
  });

  it('shows a rejected fix as a diamond and not in the line, and does not let it flatten the scale', () => {
    expect(drawing.layers.rejected!.stroke.match(/M/g)).toHaveLength(1);
    expect(points(drawing.layers.n!.stroke).map(([x]) => x)).not.toContain(drawing.x(10));
    expect(drawing.y.domain[1]).toBeLessThanOrEqual(10);
    expect(drawing.beyond).toEqual({ count: 1, largest: 40 });
  });

  it('NIS has its 95 % bounds at 0.216 and 9.35', () => {
    const nis = draw(nisChart(source({ current: run }), 'position', () => [window]));
    const at = (value: number) => Math.round(nis.y(value) * 10) / 10;
    expect(nis.layers.bounds!.stroke).toBe(`M0 ${at(0.215795)}H1000M0 ${at(9.3484)}H1000`);
    expect(nis.layers.mean!.stroke).toBe(`M0 ${at(3)}H1000`);
  });
});

describe('a newer run over an older one', () => {
  const all = (id: string, value: number, to: number) =>
    runOf(id, { state: { times: seconds(0, to), values: { sigma_n_m: () => value } } });
  const current = all('b', 2, 30);
  current.toS = 30;
  const chart = sigmaChart(
    source({ current, previous: all('a', 5, 100), ghost: all('g', 9, 100) }),
    'position',
    () => [],
  );
  const drawing = draw(chart);

  it('draws the older one only where the newer has not come, and the ghost whole', () => {
    expect(Math.max(...points(drawing.layers['sigma.n']!.stroke).map(([x]) => x))).toBe(300);
    expect(Math.min(...points(drawing.layers['sigma.n.before']!.stroke).map(([x]) => x))).toBe(300);
    const ghost = points(drawing.layers['sigma.n.ghost']!.stroke).map(([x]) => x);
    expect([Math.min(...ghost), Math.max(...ghost)]).toEqual([0, 1000]);
  });

  it('says that the grey curves are the baseline', () => expect(chart.remark!()).toBe('1σ · grey: baseline'));
});

describe('coasting', () => {
  const times = seconds(40, 60);
  const run = runOf('a', {
    state: {
      times: seconds(0, 100),
      values: { sigma_n_m: () => 3, sigma_e_m: () => 3, cov_ne_m2: () => 0 },
    },
    coasting: {
      times,
      values: {
        horizontal_m: (t) => (t - 40) ** 2 / 40,
        predicted_horizontal_m: (t) => (t - 40) / 2,
      },
    },
  });
  const summary = makeSummary({ outages: [outage(40, [driftPoint(20, 10, 10)])] });
  const chart = coastingChart(source({ current: run }, summary), 'horizontal', () => [window]);
  const drawing = draw(chart);

  it('draws error and 95 % of the prediction at their values', () => {
    const last = points(drawing.layers.error!.stroke).at(-1)!;
    expect(last[0]).toBe(600);
    expect(last[1]).toBeCloseTo(drawing.y(10), 1);
    // Circular: 2.45 σ an axis is 1.73 times the root of both variances.
    const edge = points(drawing.layers.predicted!.stroke).at(-1)!;
    expect(edge[1]).toBeCloseTo(drawing.y(17.33), 1);
  });

  it('writes the error at the end of the window', () => {
    expect(drawing.annotations.map((note) => note.text)).toEqual(['10.0 m', '95 % predicted']);
  });

  it('reads as a table', () => {
    const rows = tableRows(chart, [0, 100], 50);
    expect(rows.find((row) => row.name === 'error')!.figures).toEqual(['0 m', '10.0 m', '9.02 m', '2.50 m']);
  });

  it('grows from the start of each window', () => {
    const growth = driftGrowth(run)!;
    expect(growth.longestS).toBe(20);
    expect(growth.windows[0]![0]).toMatchObject({ afterS: 0, errorM: 0 });
    expect(growth.windows[0]!.at(-1)).toMatchObject({ afterS: 20, errorM: 10 });
    expect(growth.predicted.at(-1)!.sigmaM).toBeCloseTo(10, 6);
    expect(growth.predicted[30]!.sigmaM).toBeCloseTo(5, 2);
  });
});

it('axisRatio finds the flattening of a turned ellipse', () => {
  expect(axisRatio(3, 3, 0)).toBeCloseTo(1, 9);
  expect(axisRatio(1, 3, 0)).toBeCloseTo(1 / 3, 9);
  // Axes 3 and 1 turned by 45°: both variances 5, covariance 4.
  expect(axisRatio(Math.sqrt(5), Math.sqrt(5), 4)).toBeCloseTo(1 / 3, 9);
});

describe('the distribution of innovations', () => {
  const run = runOf('a', {
    position: {
      times: seconds(0, 99),
      values: {
        n_m: (t) => (t === 5 ? 100 : 1.1),
        e_m: () => -2.2,
        d_m: () => 9,
        sigma_n_m: () => 2,
        sigma_e_m: () => 2,
        sigma_d_m: () => 2,
        accepted: (t) => (t === 5 ? 0 : 1),
      },
    },
  });
  const groups = (used: number, rejected: number) =>
    makeSummary({
      groups: [
        { group: 'position', dimension: 3, used, rejected, nisMean: 3, nisBounds: null, insideShare: null },
      ],
    });

  it('has an area of one, less what lies beyond its ends', () => {
    const found = innovationDistribution(run, 'position', groups(99, 1))!;
    expect(found.count).toBe(297);
    expect(found.beyond).toBe(99);
    const area = found.bins.reduce((sum, bin) => sum + bin.density * (bin.to - bin.from), 0);
    expect(area).toBeCloseTo(2 / 3, 9);
    expect(found.bins.find((bin) => bin.from === 0.5)!.density).toBeCloseTo(99 / 297 / 0.25, 9);
  });

  it('is not shown of thinned curves: extremes alone would lie', () => {
    expect(innovationDistribution(run, 'position', groups(5000, 1))).toBeNull();
  });
});

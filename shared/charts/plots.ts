/** The quiet charts as plots. Pure. */
import { axisDash } from '@/shared/tokens';
import { formatNumber } from '@/shared/format';
import { linearAxis, type PlotAxis, type PlotMark, type PlotModel } from './model/plot';

export interface AllanData {
  curves: readonly {
    axis: 'x' | 'y' | 'z';
    points: readonly { tauS: number; deviation: number; low: number; high: number; model: number }[];
  }[];
  /** Of the datasheet. */
  expected: readonly { tauS: number; deviation: number }[] | null;
  unit: string;
}
export interface HistogramData {
  bins: readonly { from: number; to: number; density: number }[];
  /** What the density should be. */
  expected: readonly { x: number; density: number }[];
  xLabel: string;
}
export interface DriftGrowthData {
  windows: readonly (readonly { afterS: number; errorM: number }[])[];
  predicted: readonly { afterS: number; sigmaM: number; p95M: number }[];
  longestS: number;
}

const TONES = { x: 'north', y: 'east', z: 'down' } as const;

/** Deviation over averaging time, both logarithmic, a decade a grid line. */
export function allanPlot({ curves, expected, unit }: AllanData): PlotModel {
  const all = curves.flatMap(({ points }) => points);
  const deviations = [
    ...all.flatMap(({ low, high }) => [low, high]),
    ...(expected ?? []).map(({ deviation }) => deviation),
  ];
  const datasheet: PlotMark[] = expected
    ? [
        {
          kind: 'line',
          id: 'datasheet',
          label: 'datasheet',
          tone: 'ghost',
          width: 3,
          points: expected.map(({ tauS, deviation }) => ({ x: tauS, y: deviation })),
        },
      ]
    : [];
  return {
    x: decadeAxis(
      'averaging time τ, s',
      all.map(({ tauS }) => tauS),
    ),
    y: decadeAxis(`Allan deviation, ${unit}`, deviations),
    marks: [
      ...datasheet,
      ...curves.map(({ axis, points }): PlotMark => ({
        kind: 'whiskers',
        id: `spread-${axis}`,
        tone: TONES[axis],
        points: points.map(({ tauS, deviation, low, high }) => ({ x: tauS, y: deviation, low, high })),
      })),
      ...curves.map(({ axis, points }): PlotMark => ({
        kind: 'line',
        id: `fit-${axis}`,
        label: axis === 'x' ? 'fit' : undefined,
        tone: TONES[axis],
        width: 0.75,
        points: points.filter(({ model }) => model > 0).map(({ tauS, model }) => ({ x: tauS, y: model })),
      })),
      ...curves.map(({ axis, points }): PlotMark => ({
        kind: 'line',
        id: axis,
        label: axis,
        tone: TONES[axis],
        width: 1.75,
        dash: axisDash[TONES[axis]],
        points: points.map(({ tauS, deviation }) => ({ x: tauS, y: deviation })),
      })),
    ],
  };
}

/** A distribution as bars, and the curve that it should follow. */
export function histogramPlot({ bins, expected, xLabel }: HistogramData): PlotModel {
  const [low, high] = [bins[0]?.from ?? 0, bins[bins.length - 1]?.to ?? 1];
  const top = Math.max(...bins.map((bin) => bin.density), ...expected.map((point) => point.density), 1e-3);
  return {
    x: linearAxis(xLabel, [low, high], 8),
    y: linearAxis('density', [0, top * 1.08], 4),
    marks: [
      {
        kind: 'bars',
        id: 'density',
        label: 'accepted fixes',
        tone: 'profile',
        bars: bins.map(({ from, to, density }) => ({ from, to, value: density })),
      },
      {
        kind: 'line',
        id: 'expected',
        label: 'unit normal',
        tone: 'pine',
        width: 1.75,
        points: expected.map(({ x, density }) => ({ x, y: density })),
      },
    ],
  };
}

/** Horizontal error of every window over the time since GNSS was lost, above what the filter predicted. */
export function driftGrowthPlot({ windows, predicted, longestS }: DriftGrowthData): PlotModel {
  const top = Math.max(
    ...predicted.map((point) => point.p95M),
    ...windows.flatMap((window) => window.map((point) => point.errorM)),
    1e-3,
  );
  const last = predicted[predicted.length - 1];
  const along = (value: 'sigmaM' | 'p95M') =>
    predicted.map((point) => ({ x: point.afterS, y: point[value] }));
  return {
    x: linearAxis('s without GNSS', [0, longestS || 1], 6),
    y: linearAxis('m', [0, top * 1.08], 4),
    marks: [
      { kind: 'area', id: 'p95', label: '95 % predicted', tone: 'vermilion', points: along('p95M') },
      {
        kind: 'line',
        id: 'sigma',
        label: '1σ predicted',
        tone: 'vermilion',
        width: 1.25,
        dash: '5 3',
        points: along('sigmaM'),
      },
      ...windows.map((window, i): PlotMark => ({
        kind: 'line',
        id: `window-${i + 1}`,
        label: i === 0 ? 'error of each window' : undefined,
        tone: 'ink',
        width: 1.75,
        points: window.map(({ afterS, errorM }) => ({ x: afterS, y: errorM })),
      })),
      ...(last
        ? [
            {
              kind: 'words',
              id: 'p95-words',
              tone: 'vermilion',
              at: { x: last.afterS, y: last.p95M },
              text: '95 % predicted',
            } as const,
          ]
        : []),
    ],
  };
}

function decadeAxis(title: string, values: readonly number[]): PlotAxis {
  const ticks = decades(values);
  return {
    title,
    domain: [ticks[0]!, ticks[ticks.length - 1]!],
    ticks,
    log: true,
    written: (value) => formatNumber(value, 1),
  };
}

/** Powers of ten that hold the positive ones of `values`, at least two. */
function decades(values: readonly number[]): number[] {
  const positive = values.filter((value) => value > 0);
  if (positive.length === 0) return [0.1, 1];
  const low = Math.floor(Math.log10(Math.min(...positive)));
  const high = Math.max(low + 1, Math.ceil(Math.log10(Math.max(...positive))));
  return Array.from({ length: high - low + 1 }, (_, i) => 10 ** (low + i));
}

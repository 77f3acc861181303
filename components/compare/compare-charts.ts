/** Charts of a comparison: one quantity each, one line an entry. */
import { fromZero, around } from '@/components/bench/chart-parts';
import { derivedSeries, filtered, seriesOf } from '@/components/bench/curves';
import type { ChartContent, ChartTone, LineLayer, TimeWindow } from '@/shared/charts/model/layers';
import type { TimeSeries } from '@/shared/charts/model/series';
import type { RunData } from '@/hooks/live/run-data';
import { QUANTITIES } from '@/shared/units';

export type CompareView = 'coasting' | 'sigma' | 'position' | 'velocity' | 'gyro' | 'accel';
export const COMPARE_VIEWS: readonly { id: CompareView; label: string }[] = [
  { id: 'coasting', label: 'Coasting' },
  { id: 'sigma', label: 'σ' },
  { id: 'position', label: 'Position innovation' },
  { id: 'velocity', label: 'Velocity innovation' },
  { id: 'gyro', label: 'Gyro bias' },
  { id: 'accel', label: 'Accelerometer bias' },
];

/** How the entries are told apart, in their order: by colour and by dash. */
export const ENTRY_LOOKS: readonly { tone: ChartTone; dash?: string }[] = [
  { tone: 'ink' },
  { tone: 'north', dash: '7 3' },
  { tone: 'east', dash: '2 3' },
  { tone: 'down', dash: '9 3 2 3' },
];

/** A line of a chart: whose it is, and its curves as far as they have come. */
export interface ComparedRun {
  key: string;
  name: string;
  data: () => RunData | null;
}

interface Quantity {
  id: string;
  title: string;
  unit: string;
  series: (data: RunData | null) => TimeSeries | null;
  /** Nothing below zero. */
  positive?: boolean;
  breaks?: boolean;
}

/** Charts of a view, top to bottom. */
export const compareCharts = (
  view: CompareView,
  runs: readonly ComparedRun[],
  windows: () => readonly TimeWindow[],
): ChartContent[] => QUANTITIES_OF[view].map((quantity) => chartOf(quantity, runs, windows));

function chartOf(
  { id, title, unit, series, positive, breaks }: Quantity,
  runs: readonly ComparedRun[],
  windows: () => readonly TimeWindow[],
): ChartContent {
  const layers = runs.map(({ key, name, data }, i): LineLayer => {
    const { tone, dash } = ENTRY_LOOKS[i % ENTRY_LOOKS.length]!;
    return {
      kind: 'line',
      id: `${id}.${i}`,
      column: key,
      label: name,
      tone,
      dash,
      breaks,
      series: () => series(data()),
    };
  });
  const all = () => layers.map((layer) => layer.series());
  return {
    id: `compare.${id}`,
    title,
    unit,
    // Dashes over the first one's whole line: where they agree, both are seen.
    layers,
    windows,
    domain: (fromS, toS) => (positive ? fromZero : around)(all(), fromS, toS),
    sentence: () => `${runs.map(({ name }) => name).join(', ')} over the same time.`,
  };
}

const coasting = (direction: 'horizontal' | 'vertical'): Quantity => ({
  id: `coasting.${direction}`,
  title: `Coasting error, ${direction}`,
  unit: 'm',
  positive: true,
  breaks: true,
  series: (data) =>
    derivedSeries(data, 'coasting', (run) => {
      const values = run.column('coasting', `${direction}_m`);
      return (row) => Math.abs(values[row]!);
    }),
});

const accepted = (data: RunData | null, table: 'position' | 'velocity', series: TimeSeries | null) => {
  if (!data || !series) return null;
  const was = data.column(table, 'accepted');
  return filtered(series, (row) => was[row] === 1);
};

const AXES = [
  ['n', 'north'],
  ['e', 'east'],
  ['d', 'down'],
] as const;
const BODY_AXES = ['x', 'y', 'z'] as const;
const GYRO_UNIT = QUANTITIES.gyroBias[0];
const ACCEL_UNIT = QUANTITIES.accelBias[0];

const QUANTITIES_OF: Record<CompareView, readonly Quantity[]> = {
  coasting: [coasting('horizontal'), coasting('vertical')],
  sigma: [
    {
      id: 'sigma.horizontal',
      title: 'Horizontal σ',
      unit: 'm',
      positive: true,
      series: (data) =>
        derivedSeries(data, 'state', (run) => {
          const [n, e] = [run.column('state', 'sigma_n_m'), run.column('state', 'sigma_e_m')];
          return (row) => Math.hypot(n[row]!, e[row]!);
        }),
    },
    {
      id: 'sigma.vertical',
      title: 'Vertical σ',
      unit: 'm',
      positive: true,
      series: (data) => seriesOf(data, 'state', 'sigma_d_m'),
    },
    {
      id: 'sigma.yaw',
      title: 'Yaw σ',
      unit: '°',
      positive: true,
      series: (data) => seriesOf(data, 'state', 'sigma_yaw_deg'),
    },
  ],
  position: AXES.map(([axis, name]) => ({
    id: `position.${axis}`,
    title: `Position innovation, ${name}`,
    unit: 'm',
    breaks: true,
    series: (data) => accepted(data, 'position', seriesOf(data, 'position', `${axis}_m`)),
  })),
  velocity: AXES.map(([axis, name]) => ({
    id: `velocity.${axis}`,
    title: `Velocity innovation, ${name}`,
    unit: 'm/s',
    breaks: true,
    series: (data) => accepted(data, 'velocity', seriesOf(data, 'velocity', `${axis}_m_s`)),
  })),
  gyro: BODY_AXES.map((axis) => ({
    id: `gyro.${axis}`,
    title: `Gyro bias, ${axis}`,
    unit: GYRO_UNIT.symbol,
    series: (data) => seriesOf(data, 'state', `gyro_bias_${axis}_rad_s`, 1 / GYRO_UNIT.toSi),
  })),
  accel: BODY_AXES.map((axis) => ({
    id: `accel.${axis}`,
    title: `Accelerometer bias, ${axis}`,
    unit: ACCEL_UNIT.symbol,
    series: (data) => seriesOf(data, 'state', `accel_bias_${axis}_m_s2`, 1 / ACCEL_UNIT.toSi),
  })),
};

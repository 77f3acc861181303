/** What the plots of a recording's channels draw: three axes of one sensor a chart. */
import { lowerBound, type TimeSeries } from '@/shared/charts/model/series';
import type { ChartContent, ChartTone } from '@/shared/charts/model/layers';
import { niceExtent } from '@/shared/charts/model/nice';
import type { Extent } from '@/shared/charts/model/scale';
import { axisDash } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import type { Series, SeriesChannel } from '@/shared/contracts/recordings';

interface Axis {
  channel: SeriesChannel;
  label: string;
  tone: ChartTone;
  dash: string | undefined;
}
export interface ChannelChart {
  id: string;
  title: string;
  unit: string;
  axes: readonly Axis[];
}

const axes = (
  channels: readonly [SeriesChannel, SeriesChannel, SeriesChannel],
  labels: readonly string[],
): Axis[] =>
  channels.map((channel, i) => ({
    channel,
    label: labels[i]!,
    tone: (['north', 'east', 'down'] as const)[i]!,
    dash: [axisDash.north, axisDash.east, axisDash.down][i],
  }));

export const CHANNEL_CHARTS: readonly ChannelChart[] = [
  { id: 'gyro', title: 'Gyro', unit: '°/s', axes: axes(['gyro_x', 'gyro_y', 'gyro_z'], ['x', 'y', 'z']) },
  {
    id: 'accel',
    title: 'Accelerometer',
    unit: 'm/s²',
    axes: axes(['accel_x', 'accel_y', 'accel_z'], ['x', 'y', 'z']),
  },
  {
    id: 'velocity',
    title: 'GNSS velocity',
    unit: 'm/s',
    axes: axes(['gnss_vn', 'gnss_ve', 'gnss_vd'], ['N', 'E', 'D']),
  },
  {
    id: 'position',
    title: 'GNSS position from the first fix',
    unit: 'm',
    axes: [
      { channel: 'gnss_north', label: 'N', tone: 'north', dash: axisDash.north },
      { channel: 'gnss_east', label: 'E', tone: 'east', dash: axisDash.east },
    ],
  },
];
export const ALL_CHANNELS: readonly SeriesChannel[] = CHANNEL_CHARTS.flatMap((chart) =>
  chart.axes.map((axis) => axis.channel),
);

/** One chart over `series` (gaps in it marked by withGaps); channels that it lacks are left out. */
export function channelContent(chart: ChannelChart, series: Series | undefined): ChartContent {
  const found = new Map(series?.channels.map((item) => [item.name, timeSeries(item)]));
  const of = (channel: SeriesChannel): TimeSeries | null => found.get(channel) ?? null;
  return {
    id: `channel-${chart.id}`,
    title: chart.title,
    unit: chart.unit,
    layers: chart.axes.map((axis) => ({
      kind: 'line',
      id: axis.channel,
      tone: axis.tone,
      dash: axis.dash,
      width: 1,
      label: axis.label,
      series: () => of(axis.channel),
    })),
    windows: () => [],
    domain: (fromS, toS) =>
      valueExtent(
        chart.axes.map((axis) => of(axis.channel)),
        fromS,
        toS,
      ),
    sentence: () => {
      const whole = valueExtent(
        chart.axes.map((axis) => of(axis.channel)),
        -Infinity,
        Infinity,
      );
      return `Between ${formatNumber(whole[0])} and ${formatNumber(whole[1])} ${chart.unit}.`;
    },
  };
}

/** How many usual steps without a value make a gap. */
const GAP_STEPS = 5;

type Channel = Series['channels'][number];

/** A line that stops where values are missing for long: a straight stroke across would claim what was not measured. */
export const brokenAtGaps = (channel: Pick<Channel, 'timeS' | 'values'>): TimeSeries =>
  timeSeries(gapped(channel));

/** `series` with a point without value in each gap; pieces of unlike spacing are marked each by itself. */
export const withGaps = (series: Series): Series => ({
  channels: series.channels.map((channel) => ({ ...channel, ...gapped(channel) })),
});

function gapped({ timeS, values }: Pick<Channel, 'timeS' | 'values'>): Pick<Channel, 'timeS' | 'values'> {
  const steps = timeS.slice(1).map((time, i) => time - timeS[i]!);
  const usual = [...steps].sort((a, b) => a - b)[Math.floor((steps.length - 1) * 0.75)] ?? 0;
  const time: number[] = [];
  const value: (number | null)[] = [];
  timeS.forEach((at, i) => {
    const step = steps[i - 1] ?? 0;
    if (usual > 0 && step > GAP_STEPS * usual) {
      time.push(at - step / 2);
      value.push(null);
    }
    time.push(at);
    value.push(values[i] ?? null);
  });
  return { timeS: time, values: value };
}

const timeSeries = ({ timeS, values }: Pick<Channel, 'timeS' | 'values'>): TimeSeries => ({
  length: timeS.length,
  time: timeS,
  at: (i) => values[i] ?? Number.NaN,
});

function valueExtent(all: readonly (TimeSeries | null)[], fromS: number, toS: number): Extent {
  let [low, high] = [Infinity, -Infinity];
  for (const series of all) {
    if (!series) continue;
    for (let i = lowerBound(series.time, series.length, fromS); i < series.length; i++) {
      if (series.time[i]! > toS) break;
      const value = series.at(i);
      if (value < low) low = value;
      if (value > high) high = value;
    }
  }
  if (low > high) return [-1, 1];
  return low === high ? [low - 1, high + 1] : niceExtent([low, high]);
}

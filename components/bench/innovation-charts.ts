/** Innovations with ±3σ and NIS with its χ² bounds, for position and velocity. */
import { axisDash } from '@/constants/theme';
import type { FrameColumn } from '@/shared/contracts/frames';
import { scaleOf, type DisplayUnits } from '@/shared/display-units';
import { formatNumber } from '@/shared/format';
import type { ChartContent, Layer, TimeWindow } from '@/shared/charts/model/layers';
import { nisBounds95 } from '@/shared/charts/model/chi-square';
import type { RunData } from '@/hooks/live/run-data';
import { derivedSeries, filtered, seriesOf, type CurvesSource } from './curves';
import { NED, curveLayers, largestQuantile, sigmaBand, type AxisSpec, type CurveSpec } from './chart-parts';

export type InnovationGroup = 'position' | 'velocity';
const UNIT = { position: 'm', velocity: 'm/s' } as const;
const SUFFIX = { position: '_m', velocity: '_m_s' } as const;

const wasAccepted = (data: RunData, group: InnovationGroup) => {
  const accepted = data.column(group, 'accepted');
  return (row: number) => accepted[row] === 1;
};
const column = (group: InnovationGroup, name: string) =>
  `${name}${SUFFIX[group]}` as FrameColumn<InnovationGroup>;

/** Measured − predicted of each axis over time, with three times its predicted σ. */
export function innovationChart(
  source: CurvesSource,
  group: InnovationGroup,
  windows: () => readonly TimeWindow[],
  chosen: DisplayUnits = {},
): ChartContent {
  const { symbol, factor } = scaleOf(group === 'position' ? 'length' : 'speed', chosen);
  const innovation = (axis: AxisSpec) => (data: RunData | null) =>
    data && filtered(seriesOf(data, group, column(group, axis.key), factor), wasAccepted(data, group));
  const sigma = (axis: AxisSpec) => (data: RunData | null) =>
    seriesOf(data, group, column(group, `sigma_${axis.key}`), 3 * factor);
  const curves: CurveSpec[] = NED.map((axis) => ({
    id: axis.key,
    label: axis.label,
    tone: axis.tone,
    dash: axisDash[axis.tone],
    width: 1.25,
    breaks: true,
    ghost: false,
    series: innovation(axis),
  }));
  const bands = NED.map((axis) =>
    sigmaBand(source, `sigma.${axis.key}`, axis.tone, sigma(axis), {
      breaks: true,
      column: `three_sigma ${axis.key}`,
      label: axis.key === 'n' ? '±3σ' : undefined,
    }),
  );
  // North on top: down scatters most and would cover the others.
  const lines = curves.map((spec) => curveLayers(source, spec)).reverse();
  const rejected: Layer = {
    kind: 'diamonds',
    id: 'rejected',
    tone: 'vermilion',
    label: 'rejected',
    series: () =>
      derivedSeries(source.curves().current, group, (data) => {
        const accepted = wasAccepted(data, group);
        const axes = NED.map((axis) => [
          data.column(group, column(group, axis.key)),
          data.column(group, column(group, `sigma_${axis.key}`)),
        ]);
        // The axis that failed worst says best why.
        return (row) =>
          accepted(row)
            ? NaN
            : axes.reduce(
                (worst, [value, width]) => {
                  const size = Math.abs(value![row]! / width![row]!);
                  return size > worst.size ? { size, value: factor * value![row]! } : worst;
                },
                { size: 0, value: NaN },
              ).value;
      }),
  };
  return {
    id: `innovation.${group}`,
    title: group === 'position' ? 'Position innovation' : 'Velocity innovation',
    unit: symbol,
    layers: [...bands, ...lines.flatMap((line) => line.under), ...lines.map((line) => line.over), rejected],
    windows,
    domain: (fromS, toS) => {
      const { current, previous } = source.curves();
      const runs = [current, previous];
      const three = largestQuantile(
        NED.flatMap((axis) => runs.map(sigma(axis))),
        fromS,
        toS,
        0.9,
      );
      const most = largestQuantile(
        NED.flatMap((axis) => runs.map(innovation(axis))),
        fromS,
        toS,
        0.998,
      );
      // A first fix after an outage may be tens of metres off: it must not flatten all others.
      const height = Math.max((three ?? 1) * 1.2, Math.min((most ?? 0) * 1.1, (three ?? 1) * 3));
      return [-height, height];
    },
    empty: () => emptyInnovations(source, group),
    sentence: () => innovationSentence(source, group),
  };
}

/** NIS of each epoch, with the 95 % bounds of one value and the mean it should have. */
export function nisChart(
  source: CurvesSource,
  group: InnovationGroup,
  windows: () => readonly TimeWindow[],
): ChartContent {
  const dimension = () => source.summary()?.groups.find((one) => one.group === group)?.dimension ?? 3;
  const nis = (accepted: boolean) => (data: RunData | null) => {
    if (!data) return null;
    const was = wasAccepted(data, group);
    return filtered(seriesOf(data, group, 'nis'), (row) => was(row) === accepted);
  };
  const bounds = () => nisBounds95(dimension());
  return {
    id: `nis.${group}`,
    title: group === 'position' ? 'NIS, position' : 'NIS, velocity',
    unit: '',
    remark: () => `no unit, mean ${dimension()} expected`,
    layers: [
      {
        kind: 'rules',
        id: 'mean',
        column: 'mean_expected',
        tone: 'pine',
        dash: '3 3',
        width: 1,
        values: () => [dimension()],
      },
      {
        kind: 'rules',
        id: 'bounds',
        column: 'bounds_95',
        tone: 'pine',
        label: '95 % of single values',
        values: bounds,
      },
      {
        kind: 'dots',
        id: 'before',
        tone: 'profile',
        opacity: 0.3,
        fromS: () => source.curves().current?.toS ?? -Infinity,
        series: () => nis(true)(source.curves().previous),
      },
      {
        kind: 'dots',
        id: 'accepted',
        column: 'nis',
        tone: 'profile',
        label: 'NIS',
        series: () => nis(true)(source.curves().current),
      },
      {
        kind: 'diamonds',
        id: 'rejected',
        tone: 'vermilion',
        label: 'rejected',
        series: () => nis(false)(source.curves().current),
      },
    ],
    windows,
    domain: (fromS, toS) => {
      const { current, previous } = source.curves();
      const most = largestQuantile([nis(true)(current), nis(true)(previous)], fromS, toS, 0.995);
      const high = bounds()[1];
      return [0, Math.min(high * 4, Math.max(high * 1.3, (most ?? 0) * 1.05))];
    },
    empty: () => emptyInnovations(source, group),
    sentence: () => nisSentence(source, group),
  };
}

/** Why a finished run has no innovations of a group. */
function emptyInnovations(source: CurvesSource, group: InnovationGroup): string {
  const summary = source.summary();
  if (!summary) return 'No figures yet.';
  const found = summary.groups.find((one) => one.group === group);
  if (found && found.used + found.rejected > 0) return 'No fix in this stretch of time.';
  return group === 'velocity'
    ? 'No GNSS velocity was used: the recording has none, or all of it is withheld.'
    : 'No GNSS position was used: the recording has none, or all of it is withheld.';
}

function innovationSentence(source: CurvesSource, group: InnovationGroup): string {
  const channels = source.summary()?.channels.filter((channel) => channel.unit === UNIT[group]) ?? [];
  if (channels.length === 0) return 'No figures yet.';
  const parts = channels.map(({ channel, sigmaRatio, rejected }) => {
    const ratio = sigmaRatio === null ? 'no' : formatNumber(sigmaRatio);
    return `${channel}: ${ratio} times the predicted σ, ${rejected} rejected`;
  });
  return `${parts.join('; ')}.`;
}

function nisSentence(source: CurvesSource, group: InnovationGroup): string {
  const found = source.summary()?.groups.find((one) => one.group === group);
  if (!found || found.nisMean === null) return 'No figures yet.';
  const bounds = found.nisBounds
    ? `, ${formatNumber(found.nisBounds[0])} to ${formatNumber(found.nisBounds[1])} expected`
    : '';
  const inside =
    found.insideShare === null ? '' : ` ${formatNumber(found.insideShare * 100)} % lie inside their bounds.`;
  return `Mean ${formatNumber(found.nisMean)} of ${found.dimension}${bounds}; ${found.rejected} of ${
    found.used + found.rejected
  } rejected.${inside}`;
}

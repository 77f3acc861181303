/** The headline figures of a run and what changed against the baseline. Pure. */
import type { GroupStatistics, OutageResult, RunSummary } from '@/shared/contracts/runs';
import { scaleOf, type DisplayUnits } from '@/shared/display-units';
import { formatChange, formatNumber } from '@/shared/format';
import { lengthLabel } from '@/components/strip/labels';

export type Verdict = 'good' | 'attention' | 'bad' | 'plain';

export interface HeadlineFigure {
  key: 'drift' | 'ratio' | 'nis-position' | 'nis-velocity' | 'rejected' | 'lag1';
  label: string;
  /** null: not known (yet). */
  value: number | null;
  unit: string;
  digits: number;
  verdict: Verdict;
  /** Change against the baseline, with its unit; null when there is nothing to compare. */
  change: string | null;
  /** What it should be. */
  remark: string;
}

/** Drift is read here where windows are long enough, s. */
const DRIFT_AT_S = 60;

/** Figures of `summary`; `baseline` is the baseline's over the same windows. */
export function headlineFigures(
  summary: RunSummary | null,
  baseline: RunSummary | null,
  chosen: DisplayUnits = {},
): HeadlineFigure[] {
  const { symbol, factor } = scaleOf('length', chosen);
  const [drift, before] = [driftOf(summary), driftOf(baseline)];
  return [
    {
      key: 'drift',
      label: drift ? `Drift after ${lengthLabel(drift.afterS)}` : 'Drift',
      value: drift && drift.actual * factor,
      unit: symbol,
      digits: 3,
      verdict: 'plain',
      change: changeOf(
        drift && drift.actual * factor,
        before && before.afterS === drift?.afterS ? before.actual * factor : null,
        ` ${symbol}`,
      ),
      remark: drift
        ? drift.windows === 1
          ? '1 window'
          : `RMS of ${drift.windows} windows`
        : summary
          ? 'draw an outage on the strip'
          : '',
    },
    ratioFigure(drift, before),
    nisFigure('position', summary, baseline),
    nisFigure('velocity', summary, baseline),
    rejectedFigure(summary, baseline),
    lagFigure(summary, baseline),
  ];
}

/** RMS of horizontal drift over the windows at 60 s, or at the end of the longest when none lasts that long. */
export function driftOf(
  summary: RunSummary | null,
): { afterS: number; actual: number; ratio: number; windows: number } | null {
  const outages = summary?.outages.filter((outage) => outage.points.length > 0) ?? [];
  if (outages.length === 0) return null;
  const at = (outage: OutageResult, afterS: number) =>
    outage.points.find((point) => Math.abs(point.afterS - afterS) < 0.25);
  const longest = Math.max(...outages.map((outage) => outage.points[outage.points.length - 1]!.afterS));
  const afterS = longest >= DRIFT_AT_S ? DRIFT_AT_S : longest;
  const points = outages.flatMap((outage) => at(outage, afterS) ?? []);
  if (points.length === 0) return null;
  const rms = (values: number[]) =>
    Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
  const actual = rms(points.map((point) => point.horizontalM));
  const predicted = rms(points.map((point) => point.predictedHorizontalM));
  return { afterS, actual, ratio: actual / predicted, windows: points.length };
}

type Drift = NonNullable<ReturnType<typeof driftOf>>;

function ratioFigure(drift: Drift | null, before: Drift | null): HeadlineFigure {
  const bounds = drift ? ratioBounds95(drift.windows) : null;
  const outside = drift !== null && bounds !== null && (drift.ratio < bounds[0] || drift.ratio > bounds[1]);
  return {
    key: 'ratio',
    label: 'Actual ÷ predicted',
    value: drift?.ratio ?? null,
    unit: '',
    digits: 3,
    verdict: !drift ? 'plain' : outside ? 'bad' : 'good',
    change: changeOf(drift?.ratio, before?.ratio, ''),
    remark: bounds ? `95 % band ${formatNumber(bounds[0], 2)} to ${formatNumber(bounds[1], 3)}` : '',
  };
}

/**
 * Where the ratio of a filter that tells the truth lies in 95 of 100 cases: its square is χ² with two degrees of freedom a
 * window, divided by them. Few windows prove little, and the band says so. Quantiles after Wilson and Hilferty (1931).
 */
export function ratioBounds95(windows: number): [number, number] {
  const degrees = 2 * windows;
  const quantile = (z: number) => Math.max(0, 1 - 2 / (9 * degrees) + z * Math.sqrt(2 / (9 * degrees))) ** 3;
  return [Math.sqrt(quantile(-1.96)), Math.sqrt(quantile(1.96))];
}

function nisFigure(
  group: GroupStatistics['group'],
  summary: RunSummary | null,
  baseline: RunSummary | null,
): HeadlineFigure {
  const find = (from: RunSummary | null) => from?.groups.find((one) => one.group === group) ?? null;
  const [now, before] = [find(summary), find(baseline)];
  const [mean, bounds] = [now?.nisMean ?? null, now?.nisBounds ?? null];
  const outside = mean !== null && bounds !== null && (mean < bounds[0] || mean > bounds[1]);
  return {
    key: `nis-${group}`,
    label: `NIS ${group}`,
    value: mean,
    unit: now ? `of ${now.dimension}` : '',
    digits: 3,
    verdict: mean === null || bounds === null ? 'plain' : outside ? 'bad' : 'good',
    change: changeOf(mean, before?.nisMean, ''),
    remark: bounds
      ? `${outside ? (mean < bounds[0] ? 'too low, ' : 'too high, ') : ''}bounds ${formatNumber(bounds[0])} to ${formatNumber(bounds[1])}`
      : summary
        ? 'not used'
        : '',
  };
}

function rejectedFigure(summary: RunSummary | null, baseline: RunSummary | null): HeadlineFigure {
  const share = (from: RunSummary | null) => {
    const rejected = from?.groups.reduce((sum, group) => sum + group.rejected, 0) ?? 0;
    const all = from?.groups.reduce((sum, group) => sum + group.used + group.rejected, 0) ?? 0;
    return all > 0 ? (100 * rejected) / all : null;
  };
  const now = share(summary);
  const count = summary?.groups.reduce((sum, group) => sum + group.rejected, 0) ?? 0;
  return {
    key: 'rejected',
    label: 'Rejected',
    value: now,
    unit: '%',
    digits: 2,
    verdict: now === null ? 'plain' : now > 5 ? 'bad' : now > 1 ? 'attention' : 'plain',
    change: changeOf(now, share(baseline), ' %'),
    remark: now === null ? '' : `${count} fixes`,
  };
}

function lagFigure(summary: RunSummary | null, baseline: RunSummary | null): HeadlineFigure {
  const worst = (from: RunSummary | null) =>
    from?.channels
      .filter((channel) => channel.lag1 !== null)
      .reduce<{ lag1: number; band: number | null; channel: string } | null>(
        (most, { lag1, lag1Band, channel }) =>
          !most || Math.abs(lag1!) > Math.abs(most.lag1) ? { lag1: lag1!, band: lag1Band, channel } : most,
        null,
      ) ?? null;
  const [now, before] = [worst(summary), worst(baseline)];
  const outside = now !== null && now.band !== null && Math.abs(now.lag1) > now.band;
  return {
    key: 'lag1',
    label: 'Innovation lag 1',
    value: now?.lag1 ?? null,
    unit: '',
    digits: 2,
    verdict: now === null || now.band === null ? 'plain' : outside ? 'attention' : 'good',
    change: changeOf(now?.lag1, before?.lag1, ''),
    remark: now ? `${now.channel}${now.band === null ? '' : `, band ±${formatNumber(now.band, 2)}`}` : '',
  };
}

function changeOf(
  now: number | null | undefined,
  before: number | null | undefined,
  unit: string,
): string | null {
  if (now == null || before == null) return null;
  const change = now - before;
  // Below what is shown of the value itself there is no change to speak of.
  if (Math.abs(change) < 5e-4 * Math.max(Math.abs(now), Math.abs(before))) return '±0';
  return formatChange(change, Math.abs(change) < Math.abs(now) / 10 ? 2 : 3) + unit;
}

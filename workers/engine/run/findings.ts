/**
 * What the figures of a run mean, in plain words, each with the number that supports it and the change it suggests.
 * Silent where the sample is too small to prove anything.
 */
import type { ChannelStatistics, RunFinding, RunSummary } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { meanVarianceFactor } from '../statistics/correlation';
import { chiSquaredQuantile } from '../statistics/distributions';
import { percentile } from '../statistics/descriptive';
import { aidFindings } from './aid-findings';
import { coastingFindings } from './coasting-findings';
import type { Run } from './run';
import type { InnovationWriter } from './tables';

/** Fewer epochs than this support no finding about a group. */
const MIN_EPOCHS = 60;
/** Sizes of innovation within this share of the predicted are as good as right. */
const RATIO_TOLERANCE = 0.12;
/** Correlation at lag 1 that matters, beyond its 95 % band. */
const LAG_TOLERANCE = 0.12;
/** An inflation of this share of what the correlation asks for is left alone. */
const ENOUGH = 0.6;
/** Mean innovations below this share of their σ do no harm. */
const MEAN_TOLERANCE = 0.15;

type Figures = Omit<RunSummary, 'findings'>;
type GroupName = 'position' | 'velocity';

export function findings(summary: Figures, run: Run): RunFinding[] {
  const all = (['position', 'velocity'] as const).flatMap((group) => groupFindings(summary, run, group));
  all.push(...coastingFindings(summary, run), ...aidFindings(summary, run));
  const order = { stop: 0, warn: 1, info: 2, good: 3 };
  return all.sort((a, b) => order[a.severity] - order[b.severity]);
}

function groupFindings(summary: Figures, run: Run, group: GroupName): RunFinding[] {
  const writer = run[group];
  if (writer.count < MIN_EPOCHS) return [];
  const channels = summary.channels.filter((c) => c.channel.startsWith(group) && c.used >= MIN_EPOCHS / 2);
  if (channels.length === 0) return [rejectedAll(group, writer.count)];
  const size = typicalSize(writer);
  const lag = Math.max(...channels.map((c) => Math.abs(c.lag1 ?? 0))) * Math.sign(strongestLag(channels));
  const band = LAG_TOLERANCE + (channels[0]!.lag1Band ?? 0);
  const found: RunFinding[] = [];
  const isSized = Math.abs(size - 1) <= RATIO_TOLERANCE;
  // Inflated on purpose, innovations are smaller than predicted.
  const meant = size < 1 && inflationOf(run, group) > 1;
  if (Math.abs(lag) <= band && !isSized && !meant) found.push(noiseScale(run, group, size));
  if (lag > band) found.push(correlated(run, group, size, lag, channels));
  if (lag < -band) found.push(overActive(group, lag));
  found.push(...rejections(summary, run, group));
  // Correlated innovations wander: a mean proves nothing then.
  if (lag <= band) found.push(...meanInnovations(channels, writer));
  if (found.length === 0) found.push(consistent(summary, group));
  return found;
}

/** Size of innovations against prediction, by the median of the NIS of all epochs: outliers and the gate do not bend it. */
function typicalSize(writer: InnovationWriter): number {
  const { table, dimension, count } = writer;
  const normal = [1, 2, 3].map((n) => chiSquaredQuantile(0.5, n));
  const ratios = new Float64Array(count);
  for (let i = 0; i < count; i += 1) ratios[i] = table.nis[i]! / normal[dimension[i]! - 1]!;
  return Math.sqrt(percentile(ratios, 0.5));
}

function strongestLag(channels: readonly ChannelStatistics[]): number {
  return channels.reduce((most, c) => (Math.abs(c.lag1 ?? 0) > Math.abs(most) ? c.lag1! : most), 0);
}

const times = (factor: number) => `${formatNumber(factor, 2)}×`;
const named = (group: GroupName) => (group === 'position' ? 'Position' : 'Velocity');

/** White innovations of the wrong size: R is off. S = HPHᵀ + R has to change by size², and R alone is to do it. */
function noiseScale(run: Run, group: GroupName, size: number): RunFinding {
  const { noiseShare, count } = run[group];
  const share = percentile(noiseShare.subarray(0, count), 0.5);
  const factor = Math.max(0.01, 1 + (size * size - 1) / share);
  const smaller = size < 1;
  const scale = run.request.parameters.gnss[`${group}Scale`];
  const value = Math.min(100, Math.max(0.01, scale * Math.sqrt(factor)));
  const off = times(smaller ? 1 / factor : factor);
  return {
    code: `${group}-r-${smaller ? 'large' : 'small'}`,
    severity: 'warn',
    title: `R for ${group} is too ${smaller ? 'large' : 'small'}`,
    sentence: `${named(group)} innovations are ${times(smaller ? 1 / size : size)} ${smaller ? 'smaller' : 'larger'} than R says: R for ${group} is about ${off} too ${smaller ? 'large' : 'small'}.`,
    suggestion: {
      path: `gnss.${group}Scale`,
      value: rounded(value),
      label: `${named(group)} σ × ${formatNumber(value, 3)}`,
    },
    intervalS: null,
  };
}

/** Three digits: a suggestion is no more exact. */
const rounded = (value: number) => Number(value.toPrecision(3));

function correlated(
  run: Run,
  group: GroupName,
  size: number,
  lag: number,
  channels: readonly ChannelStatistics[],
): RunFinding {
  const band = formatNumber(channels[0]!.lag1Band ?? 0, 2);
  const evidence = `${named(group)} innovations hang together from fix to fix (correlation ${formatNumber(lag, 2)} at lag 1, 95 % band ±${band})`;
  const base = { code: `${group}-correlated`, severity: 'warn' as const, intervalS: null };
  if (size > 1 + RATIO_TOLERANCE / 2 && group === 'velocity')
    return { ...base, ...processNoiseTooSmall(run, size, evidence, channels) };
  const factor = meanVarianceFactor(Math.min(0.98, lag));
  const inflation = inflationOf(run, group);
  if (inflation >= ENOUGH * factor) return accountedFor(group, evidence, inflation, factor);
  const now = inflation > 1 ? `, ${times(inflation)} as now is not enough` : '';
  return {
    ...base,
    title: `${named(group)} fixes err alike for a while`,
    sentence: `${evidence}: their errors are not white, so that the filter trusts an average of them too much and NIS cannot show it. R inflated by ${times(factor)} accounts for it${now}; time-correlated multipath, a wrong latency or lever arm also look like this.`,
    suggestion: {
      path: `gnss.${group}Inflation`,
      value: rounded(factor),
      label: `${named(group)} R × ${formatNumber(factor, 3)}`,
    },
  };
}

const inflationOf = (run: Run, group: GroupName) => run.request.parameters.gnss[`${group}Inflation`];

/** Correlation stays in the innovations; R has been inflated for it. */
function accountedFor(group: GroupName, evidence: string, inflation: number, factor: number): RunFinding {
  return {
    code: `${group}-inflated`,
    severity: 'info',
    title: `Correlated ${group} errors are accounted for`,
    sentence: `${evidence}; R is inflated by ${times(inflation)} for it, of which ${times(factor)} would do. NIS lies below its dimension then, and does not test R.`,
    suggestion: null,
    intervalS: null,
  };
}

/** Innovations too large and correlated: the solution lags behind. What stays clean tells which sensor it is. */
function processNoiseTooSmall(
  run: Run,
  size: number,
  evidence: string,
  channels: readonly ChannelStatistics[],
): Pick<RunFinding, 'title' | 'sentence' | 'suggestion'> {
  const ratio = (axis: string) => channels.find((c) => c.channel.endsWith(axis))?.sigmaRatio ?? 1;
  const horizontal = Math.max(ratio('north'), ratio('east'));
  const isGyro = ratio('down') - 1 < (horizontal - 1) / 3;
  const { gyro, accel } = run.request.parameters;
  const factor = Math.max(1.5, size * size);
  const sensor = isGyro ? 'gyro' : 'accelerometer';
  const now = isGyro ? gyro.whiteNoiseRadPerSqrtS : accel.whiteNoiseMPerSPerSqrtS;
  return {
    title: `Q for the ${sensor} is too small`,
    sentence: `${evidence} and are ${times(size)} larger than predicted${isGyro ? ', north and east but not down' : ''}: the solution follows too slowly. ${isGyro ? 'Gyro' : 'Accelerometer'} noise or bias wander is set too low, or a latency, lever arm or scale factor is missing.`,
    suggestion: {
      path: isGyro ? 'gyro.whiteNoiseRadPerSqrtS' : 'accel.whiteNoiseMPerSPerSqrtS',
      value: rounded(Math.min(isGyro ? 1 : 10, now * factor)),
      label: `${isGyro ? 'Gyro' : 'Accelerometer'} white noise × ${formatNumber(factor, 2)}`,
    },
  };
}

function overActive(group: GroupName, lag: number): RunFinding {
  return {
    code: `${group}-overactive`,
    severity: 'info',
    title: `The filter follows each ${group} fix too far`,
    sentence: `${named(group)} innovations alternate (correlation ${formatNumber(lag, 2)} at lag 1): each fix pulls further than it should. Q is set too high for this sensor, or R too low.`,
    suggestion: null,
    intervalS: null,
  };
}

function rejectedAll(group: GroupName, count: number): RunFinding {
  return {
    code: `${group}-all-rejected`,
    severity: 'stop',
    title: `Hardly any ${group} fix was accepted`,
    sentence: `Of ${count} ${group} fixes hardly any passed the gate: check the clocks of both files, the lever arm, the axes and the initial state.`,
    suggestion: null,
    intervalS: null,
  };
}

function rejections(summary: Figures, run: Run, group: GroupName): RunFinding[] {
  const { used, rejected } = summary.groups.find((g) => g.group === group)!;
  const { enabled, probability } = run.request.parameters.gate;
  const total = used + rejected;
  const expected = (1 - probability) * total;
  if (!enabled || rejected <= expected + 4 * Math.sqrt(expected) + 3) return [];
  const share = formatNumber((100 * rejected) / total, 2);
  const due = formatNumber(100 * (1 - probability), 2);
  return [
    {
      code: `${group}-rejected`,
      severity: rejected > 0.1 * total ? 'warn' : 'info',
      title: `More ${group} fixes rejected than the gate's own rate`,
      sentence: `${rejected} of ${total} ${group} fixes were rejected (${share} %; good fixes would be at ${due} %): outliers, or R is too small.`,
      suggestion: null,
      intervalS: null,
    },
  ];
}

/** Innovations that lean to one side. */
function meanInnovations(channels: readonly ChannelStatistics[], writer: InnovationWriter): RunFinding[] {
  return channels.flatMap((c) => {
    const lean = Math.abs(
      meanNormalised(writer, ['north', 'east', 'down'].indexOf(c.channel.split(' ')[1]!)),
    );
    const spread = Math.sqrt(meanVarianceFactor(Math.max(0, Math.min(0.98, c.lag1 ?? 0))) / c.used);
    if (lean < MEAN_TOLERANCE || lean < 4 * spread * c.sigmaRatio!) return [];
    return [
      {
        code: 'mean-innovation',
        severity: 'info' as const,
        title: `${c.channel} leans to one side`,
        sentence: `The mean innovation of ${c.channel} is ${formatNumber(c.mean!, 2)} ${c.unit}, ${formatNumber(lean, 2)} of its σ: look for a lever arm, latency, height reference or axis that is off.`,
        suggestion: null,
        intervalS: null,
      },
    ];
  });
}

/** Mean of innovation ÷ predicted σ over the accepted epochs. */
function meanNormalised({ table, count }: InnovationWriter, axis: number): number {
  const innovation = table.innovation[axis as 0 | 1 | 2];
  const sigma = table.sigma[axis as 0 | 1 | 2];
  let sum = 0;
  let used = 0;
  for (let i = 0; i < count; i += 1) {
    if (table.accepted[i] === 0 || Number.isNaN(innovation[i]!)) continue;
    sum += innovation[i]! / sigma[i]!;
    used += 1;
  }
  return used > 0 ? sum / used : 0;
}

function consistent(summary: Figures, group: GroupName): RunFinding {
  const { nisMean, nisBounds, used, dimension } = summary.groups.find((g) => g.group === group)!;
  return {
    code: `${group}-consistent`,
    severity: 'good',
    title: `${named(group)} innovations are what R and Q predict`,
    sentence: `Mean NIS ${formatNumber(nisMean ?? NaN, 3)} for ${dimension} channels over ${used} fixes (95 % bounds ${nisBounds?.map((b) => formatNumber(b, 3)).join(' to ') ?? '–'}), no correlation from fix to fix.`,
    suggestion: null,
    intervalS: null,
  };
}

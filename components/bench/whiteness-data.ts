/** Autocorrelation of a group's innovations and what the portmanteau test says of it. Pure. */
import type { RunSummary } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import type { InnovationGroup } from './innovation-charts';

export interface WhitenessAxis {
  /** N, E, D. */
  label: string;
  tone: 'north' | 'east' | 'down';
  /** At lags 1, 2 … */
  values: number[];
  /** Probability of so much correlation in white innovations; null: not known. */
  p: number | null;
  /** Lags outside the band. */
  outside: number;
}

export interface Whiteness {
  axes: WhitenessAxis[];
  /** Half-width of the 95 % band of white innovations. */
  band: number;
  lags: number;
}

const AXES = [
  { name: 'north', label: 'N', tone: 'north' },
  { name: 'east', label: 'E', tone: 'east' },
  { name: 'down', label: 'D', tone: 'down' },
] as const;

/** Null where the group was not used or the sample is too small. */
export function whiteness(summary: RunSummary | null, group: InnovationGroup): Whiteness | null {
  const axes: WhitenessAxis[] = [];
  let band = 0;
  for (const { name, label, tone } of AXES) {
    const channel = summary?.channels.find((one) => one.channel === `${group} ${name}`);
    if (!channel?.autocorrelation || channel.lag1Band === null) continue;
    const half = channel.lag1Band;
    band = Math.max(band, half);
    axes.push({
      label,
      tone,
      values: channel.autocorrelation,
      p: channel.whitenessP ?? null,
      outside: channel.autocorrelation.filter((value) => Math.abs(value) > half).length,
    });
  }
  return axes.length > 0 ? { axes, band, lags: Math.max(...axes.map(({ values }) => values.length)) } : null;
}

/** "N p 0.43", "E p < 0.001": small where the innovations are not white. */
export const axisWords = ({ label, p }: WhitenessAxis): string => `${label} ${probability(p)}`;

/** The chart in a sentence. */
export function whitenessSentence({ axes, band, lags }: Whiteness): string {
  const each = axes.map(
    ({ label, outside, p }) => `${label}: ${outside} of ${lags} lags outside, Ljung–Box ${probability(p)}`,
  );
  return `95 % band ±${formatNumber(band, 2)}. ${each.join('; ')}.`;
}

const probability = (p: number | null): string =>
  p === null ? 'p not known' : p < 0.001 ? 'p < 0.001' : `p ${formatNumber(p, 2)}`;

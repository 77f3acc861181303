/** What the first rows say at a glance: is gravity where it should be, do the turns agree with GNSS. */
import { formatNumber } from '@/shared/format';
import type { HealthFinding, MapPreview, Series } from '@/shared/contracts/recordings';

export interface Check {
  tone: 'pine' | 'ochre' | 'vermilion' | 'soft';
  words: string;
}

/** Length and direction of the mean specific force, against gravity. Null without plots. */
export function gravityCheck({ series }: MapPreview): Check | null {
  const force = ['accel_x', 'accel_y', 'accel_z'].map((name) => trimmedMean(valuesOf(series, name)));
  const size = Math.hypot(...force);
  if (!Number.isFinite(size)) return null;
  const figure = `${formatNumber(size)} m/s²`;
  const share = size / GRAVITY;
  if (share < 0.5 || share > 1.5)
    return { tone: 'vermilion', words: `${figure} instead of about 9.81: not the unit` };
  const axis = force.reduce((most, value, i) => (Math.abs(value) > Math.abs(force[most]!) ? i : most), 0);
  const along = force[axis]! < 0 ? DIRECTIONS[axis]![0] : DIRECTIONS[axis]![1];
  if (along !== 'down' || Math.abs(force[axis]!) < 0.9 * size)
    return { tone: 'ochre', words: `${figure} along ${along} instead of down: not the axes or the sign` };
  if (Math.abs(share - 1) > 0.05)
    return { tone: 'ochre', words: `${figure} along down, instead of about 9.81` };
  return { tone: 'pine', words: `${figure} along down: right` };
}

/** What the findings say of the turns; without one, whether there was any turn to tell by. Null without plots. */
export function turnCheck({ series, health }: MapPreview): Check | null {
  if (!series) return null;
  const against = health?.findings.find(({ code }) => TURN_CODES.has(code));
  if (against) return { tone: toneOf(against.severity), words: TURN_WORDS };
  const rates = valuesOf(series, 'gyro_z');
  if (rates.length === 0) return null;
  const [low, high] = [Math.min(...rates), Math.max(...rates)];
  const range = `${formatNumber(low, 2)} to ${formatNumber(high, 2)} °/s about down`;
  return high - low < LEAST_TURN_DEG_PER_S
    ? { tone: 'soft', words: `${range}: too little turning to tell` }
    : { tone: 'pine', words: `${range}: nothing against the course of GNSS` };
}

/** Those that ask for a decision; what is merely good to know waits for the health report. */
export const openFindings = ({ health }: MapPreview): HealthFinding[] =>
  (health?.findings ?? []).filter(({ severity }) => severity !== 'info');

const GRAVITY = 9.80665;
const LEAST_TURN_DEG_PER_S = 4;
/** Where gravity points when the mean specific force along this axis is negative, and when it is positive. */
const DIRECTIONS = [
  ['forward', 'back'],
  ['right', 'left'],
  ['down', 'up'],
] as const;
const TURN_CODES: ReadonlySet<string> = new Set([
  'turn-sense', 'gyro-unit', 'gyro-axes', 'gyro-scale', 'gyro-offset', 'stray-axes',
]); // prettier-ignore
const TURN_WORDS = 'something is against them: see below';

const toneOf = (severity: HealthFinding['severity']) => (severity === 'stop' ? 'vermilion' : 'ochre');

const valuesOf = (series: Series | null, name: string): number[] =>
  (series?.channels.find((channel) => channel.name === name)?.values ?? []).filter((value) => value !== null);

/** Mean without the lowest and the highest tenth: a blow or two do not count. */
function trimmedMean(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const cut = Math.floor(sorted.length / 10);
  const kept = sorted.slice(cut, sorted.length - cut);
  return kept.reduce((sum, value) => sum + value, 0) / kept.length;
}

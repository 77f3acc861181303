/** Whether a run meets a requirement. Pure: the same run and requirement give the same verdict, wherever it is asked. */
import type { Comparison, Metric } from '../contracts/requirements';
import type { DriftPoint, RunSummary } from '../contracts/runs';
import { percentile } from '../math/percentile';
import type { BiasSigma } from './bias-sigma';
import { firstTimeBelow } from './bias-sigma';

export interface Judged {
  verdict: 'pass' | 'fail' | 'not-applicable';
  /** In the metric's unit; null where there is none. */
  value: number | null;
  /** What the value had to lie between, for `inside-bounds`. */
  bounds: readonly [number, number] | null;
  /** Why it does not apply, or has no value; null: nothing to add. */
  reason: string | null;
}

/** What a run gives to judge by. */
export interface RunFigures {
  summary: RunSummary;
  biasSigma: BiasSigma;
}

type Found =
  | { value: number; bounds?: readonly [number, number]; note?: string }
  | { missing: string }
  | { never: string };

/** Times are compared to within this, s. */
const SAME_S = 1e-6;

export function judge(
  metric: Metric,
  comparison: Comparison,
  limit: number | null,
  figures: RunFigures,
): Judged {
  const found = valueOf(metric, figures);
  if ('missing' in found)
    return { verdict: 'not-applicable', value: null, bounds: null, reason: found.missing };
  if ('never' in found) return { verdict: 'fail', value: null, bounds: null, reason: found.never };
  const { value, bounds = null, note = null } = found;
  if (comparison === 'inside-bounds') {
    if (!bounds) return { verdict: 'not-applicable', value, bounds, reason: 'The metric has no bounds.' };
    const inside = value >= bounds[0] && value <= bounds[1];
    return { verdict: inside ? 'pass' : 'fail', value, bounds, reason: note };
  }
  const holds = limit !== null && (comparison === 'at-most' ? value <= limit : value >= limit);
  return { verdict: holds ? 'pass' : 'fail', value, bounds: null, reason: note };
}

function valueOf(metric: Metric, { summary, biasSigma }: RunFigures): Found {
  switch (metric.kind) {
    case 'drift':
      return drift(metric, summary);
    case 'nis-mean':
    case 'nis-inside-share':
    case 'rejected-share':
      return ofGroup(metric, summary);
    case 'attitude-sigma':
      return attitude(metric, summary);
    case 'bias-convergence':
      return convergence(metric, biasSigma);
    case 'rmse':
      return rmse(metric.quantity, summary);
  }
}

const DRIFT_FIELDS = {
  horizontal: 'horizontalM',
  vertical: 'verticalM',
  velocity: 'velocityMPerS',
  heading: 'headingDeg',
} as const satisfies Record<string, keyof DriftPoint>;

const SHARES = { median: 0.5, p95: 0.95, maximum: 1 } as const;

function drift(metric: Extract<Metric, { kind: 'drift' }>, { outages }: RunSummary): Found {
  const { afterS, quantity, statistic } = metric;
  const values = outages.flatMap(({ points }) =>
    points
      .filter((point) => Math.abs(point.afterS - afterS) < SAME_S)
      .map((point) => point[DRIFT_FIELDS[quantity]]),
  );
  if (values.length === 0) {
    return {
      missing: `No outage window of the recording reaches ${afterS} s of coasting: it is too short for the schedule.`,
    };
  }
  const note = `over ${values.length} ${values.length === 1 ? 'window' : 'windows'}`;
  return { value: percentile(values, SHARES[statistic]), note };
}

function ofGroup({ kind, group }: Extract<Metric, { group: string }>, { groups }: RunSummary): Found {
  const of = groups.find((one) => one.group === group);
  const seen = of ? of.used + of.rejected : 0;
  if (!of || seen === 0) return { missing: `The run used no ${group} measurements.` };
  if (kind === 'rejected-share') return { value: of.rejected / seen };
  if (kind === 'nis-inside-share') {
    return of.insideShare === null ? { missing: TOO_FEW } : { value: of.insideShare };
  }
  if (of.nisMean === null || of.nisBounds === null) return { missing: TOO_FEW };
  return { value: of.nisMean, bounds: of.nisBounds };
}

const TOO_FEW = 'There are too few measurements for a statistic.';
const AXES = { roll: 0, pitch: 1, yaw: 2 } as const;

function attitude(
  { axis, when }: Extract<Metric, { kind: 'attitude-sigma' }>,
  { finalSigma, meanSigma }: RunSummary,
): Found {
  const { attitudeDeg } = when === 'end' ? finalSigma : meanSigma;
  return { value: axis === 'largest' ? Math.max(...attitudeDeg) : attitudeDeg[AXES[axis]] };
}

function convergence(
  { sensor, sigma }: Extract<Metric, { kind: 'bias-convergence' }>,
  biasSigma: BiasSigma,
): Found {
  const afterS = firstTimeBelow(biasSigma, sensor, sigma);
  return afterS === null
    ? { never: 'The σ of some axis does not stay below the threshold within the recording.' }
    : { value: afterS };
}

function rmse(quantity: Extract<Metric, { kind: 'rmse' }>['quantity'], { truth }: RunSummary): Found {
  if (!truth) return { missing: 'The recording has no reference trajectory to compare with.' };
  switch (quantity) {
    case 'horizontal':
      return { value: truth.horizontalRmseM };
    case 'vertical':
      return { value: truth.verticalRmseM };
    case 'position':
      return { value: truth.positionRmseM };
    case 'velocity':
      return truth.velocityRmseMPerS === null
        ? { missing: 'The reference trajectory has no velocity.' }
        : { value: truth.velocityRmseMPerS };
    default:
      return truth.attitudeRmseDeg === null
        ? { missing: 'The reference trajectory has no attitude.' }
        : { value: truth.attitudeRmseDeg[quantity] };
  }
}

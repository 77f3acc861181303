/** What the aids' and the optional states' own figures say; silent where the sample is too small. */
import type { AidStatistics, OptionalStateResult, RunFinding, RunSummary } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { averageBounds } from '../statistics/consistency';
import type { Run } from './run';

/** Fewer readings than this support no finding. */
const MIN_READINGS = 60;
/** More refused than this share: the sensor, its clock or its axes do not fit. */
const MAX_REFUSED = 0.1;
/** A mean NIS within this factor of its dimension does no harm. */
const NIS_TOLERANCE = 1.3;
/** σ that shrank less than this: the recording does not show the state. */
const NOT_SEEN = 0.9;

const SENSORS = ['barometer', 'heading', 'odometer', 'attitude'] as const;
const NAMES = {
  barometer: 'barometer',
  heading: 'heading aid',
  odometer: 'odometer',
  attitude: 'attitude aid',
} as const;

type Figures = Omit<RunSummary, 'findings'>;

export function aidFindings({ aids = [], optionalStates = [] }: Figures, run: Run): RunFinding[] {
  const sensors = SENSORS.flatMap((name) => {
    const aid = aids.find((a) => a.aid === name);
    return aid && aid.used + aid.rejected >= MIN_READINGS ? sensorFindings(name, aid, run) : [];
  });
  return [...sensors, ...unseen(optionalStates)];
}

function sensorFindings(name: (typeof SENSORS)[number], aid: AidStatistics, run: Run): RunFinding[] {
  const base = { severity: 'warn' as const, intervalS: null };
  const total = aid.used + aid.rejected;
  if (aid.rejected > MAX_REFUSED * total)
    return [
      {
        ...base,
        code: `${name}-rejected`,
        title: `Many readings of the ${NAMES[name]} were refused`,
        sentence: `${aid.rejected} of ${total} readings of the ${NAMES[name]} did not pass the gate: check its clock, units and mounting, or its σ is too small.`,
        suggestion: null,
      },
    ];
  const ratio = (aid.nisMean ?? aid.dimension) / aid.dimension;
  const [low, high] = averageBounds(aid.used, aid.dimension, 0.999).map((b) => b / aid.dimension);
  if (ratio < Math.max(NIS_TOLERANCE, high!) && ratio > Math.min(1 / NIS_TOLERANCE, low!)) return [];
  const scale = run.request.parameters.aids[name].sigmaScale * Math.sqrt(ratio);
  const value = Number(Math.min(100, Math.max(0.01, scale)).toPrecision(3));
  const large = ratio < 1;
  return [
    {
      ...base,
      code: `${name}-sigma-${large ? 'large' : 'small'}`,
      title: `σ of the ${NAMES[name]} is too ${large ? 'large' : 'small'}`,
      sentence: `Mean NIS of the ${NAMES[name]} is ${formatNumber(aid.nisMean ?? NaN, 3)} for dimension ${aid.dimension} over ${aid.used} readings: its σ is about ${formatNumber(large ? 1 / Math.sqrt(ratio) : Math.sqrt(ratio), 2)}× too ${large ? 'large' : 'small'}.`,
      suggestion: {
        path: `aids.${name}.sigmaScale`,
        value,
        label: `σ of the ${NAMES[name]} × ${formatNumber(value, 3)}`,
      },
    },
  ];
}

/** One finding for all states that stayed as uncertain as they were at the start. */
function unseen(states: readonly OptionalStateResult[]): RunFinding[] {
  const names = states.filter((s) => s.sigma > NOT_SEEN * s.firstSigma).map((s) => s.name);
  if (names.length === 0) return [];
  return [
    {
      code: 'state-not-seen',
      severity: 'info',
      title: 'The recording does not show every optional state',
      sentence: `σ of ${names.join(', ')} ends at more than ${100 * NOT_SEEN} % of where it began: the motion does not tell ${names.length > 1 ? 'them' : 'it'}; what is reported is the start value. Turns, climbs and changes of speed would.`,
      suggestion: null,
      intervalS: null,
    },
  ];
}

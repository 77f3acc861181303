/** What a run found besides the headline: aids, the truth, further states. Pure. */
import type {
  AidStatistics,
  OptionalStateResult,
  RunSummary,
  TruthStatistics,
} from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { scaleOf, type DisplayUnits } from '@/shared/display-units';
import { RAD_PER_DEG } from '@/shared/units';
import type { FigureRow } from './FigureRows';

/** How often each aid was used and rejected, and its mean NIS. */
export const aidRows = (summary: RunSummary | null): FigureRow[] =>
  (summary?.aids ?? []).map((aid) => ({
    key: aid.aid,
    label: aidName(aid.aid),
    note: `${count(aid.used)} used, ${count(aid.rejected)} rejected`,
    alarming: aid.rejected > aid.used,
    of: 'mean NIS',
    value: aid.nisMean === null ? null : formatNumber(aid.nisMean),
    unit: `of ${aid.dimension}`,
  }));

/** "Zero velocity", "Non-holonomic". */
export const aidName = (aid: AidStatistics['aid']): string =>
  aid === 'non-holonomic' ? 'Non-holonomic' : aid[0]!.toUpperCase() + aid.slice(1).replaceAll('-', ' ');

/** RMS errors against the truth where the recording has one; the smoothed ones beside them. */
export function truthRows(summary: RunSummary | null, chosen: DisplayUnits = {}): FigureRow[] {
  const truth = summary?.truth;
  if (!truth) return [];
  const smoothed = summary.smoothedTruth ?? null;
  const row = (
    key: string,
    label: string,
    { symbol, factor }: ReturnType<typeof scaleOf>,
    of: (one: TruthStatistics) => number | null | undefined,
  ) => {
    const [filtered, after] = [of(truth), smoothed ? of(smoothed) : null];
    if (filtered == null) return [];
    const note =
      after == null ? 'RMS of the filter' : `RMS, smoothed ${formatNumber(after * factor)} ${symbol}`;
    return [{ key, label, note, value: formatNumber(filtered * factor), unit: symbol }];
  };
  const length = scaleOf('length', chosen);
  return [
    ...row('horizontal', 'Horizontal', length, (one) => one.horizontalRmseM),
    ...row('vertical', 'Vertical', length, (one) => one.verticalRmseM),
    ...row('velocity', 'Velocity', scaleOf('speed', chosen), (one) => one.velocityRmseMPerS),
    ...row('yaw', 'Yaw', scaleOf('angle', chosen, RAD_PER_DEG), (one) => one.attitudeRmseDeg?.yaw),
  ];
}

/** Estimates of the states behind the fifteen, and whether the recording shows them. */
export const stateRows = (summary: RunSummary | null): FigureRow[] =>
  (summary?.optionalStates ?? []).map((state) => {
    const seen = state.sigma < SEEN_SHARE * state.firstSigma;
    return {
      key: state.name,
      label: stateName(state),
      note: seen
        ? `±${formatNumber(state.sigma)} ${state.unit} (1σ)`
        : `±${formatNumber(state.sigma)} ${state.unit} (1σ): this recording hardly shows it`,
      alarming: !seen,
      value: formatNumber(state.value),
      unit: state.unit,
    };
  });

/** σ that has not fallen below this share of the start's says that nothing was learnt. */
const SEEN_SHARE = 0.9;

/** "gyro_scale_x_ppm" as "Gyro scale x". */
function stateName({ name, unit }: OptionalStateResult): string {
  const words = name.replace(new RegExp(`_${unit}$`), '').replaceAll('_', ' ');
  return words[0]!.toUpperCase() + words.slice(1);
}

/** Whole, with thin spaces between thousands. */
const count = (value: number) => formatNumber(value, Math.max(1, String(value).length));

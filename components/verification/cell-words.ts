/** What a cell of the verification matrix says. Pure. */
import type { Tone } from '@/components/ui/Text';
import type { Metric } from '@/shared/contracts/requirements';
import type { VerificationCell } from '@/shared/contracts/verification';
import { formatNumber } from '@/shared/format';
import { metricValue } from '@/shared/requirements/metric-words';

export interface CellWords {
  /** "passes", "fails", "computing 40 %". */
  verdict: string;
  tone: Tone;
  /** "12.3 m"; null: there is none. */
  value: string | null;
  /** Why it stands so, and what it had to lie between; '' for nothing. */
  detail: string;
}

export function cellWords(cell: VerificationCell, metric: Metric): CellWords {
  const value = cell.value === null ? null : metricValue(metric, cell.value);
  const bounds = cell.bounds
    ? `bounds ${formatNumber(cell.bounds[0])} to ${formatNumber(cell.bounds[1])}`
    : '';
  const stale = cell.outOfDate.length > 0 ? `out of date because ${cell.outOfDate.join(' and ')}` : '';
  const detail = [bounds, cell.reason ?? '', stale].filter(Boolean).join('; ');
  return { ...verdictOf(cell), value, detail };
}

function verdictOf({
  state,
  progress,
  verdict,
  outOfDate,
  waiver,
}: VerificationCell): Pick<CellWords, 'verdict' | 'tone'> {
  if (state === 'waiting') return { verdict: 'waiting', tone: 'soft' };
  if (state === 'running') return { verdict: `computing ${Math.round(progress * 100)} %`, tone: 'petrol' };
  if (state === 'not-verified' || verdict === null) return { verdict: 'not verified', tone: 'soft' };
  if (waiver) return { verdict: 'waived', tone: 'ochre' };
  if (outOfDate.length > 0) return { verdict: `${WORDS[verdict].verdict}, out of date`, tone: 'ochre' };
  return WORDS[verdict];
}

const WORDS = {
  pass: { verdict: 'passes', tone: 'pine' },
  fail: { verdict: 'fails', tone: 'vermilion' },
  'not-applicable': { verdict: 'not applicable', tone: 'ochre' },
  failed: { verdict: 'run failed', tone: 'vermilion' },
} as const satisfies Record<NonNullable<VerificationCell['verdict']>, Pick<CellWords, 'verdict' | 'tone'>>;

/** "9 of 12 pass, 2 fail, 1 out of date". */
export function countWords(counts: {
  cells: number;
  pass: number;
  fail: number;
  notApplicable: number;
  failed: number;
  going: number;
  notVerified: number;
  outOfDate: number;
  waived: number;
}): string {
  if (counts.cells === 0) return 'No requirement applies.';
  const parts = [
    `${counts.pass} of ${counts.cells} pass`,
    counts.fail > 0 ? `${counts.fail} fail` : '',
    counts.notApplicable > 0 ? `${counts.notApplicable} not applicable` : '',
    counts.failed > 0 ? `${counts.failed} could not be run` : '',
    counts.going > 0 ? `${counts.going} under way` : '',
    counts.notVerified > 0 ? `${counts.notVerified} not verified` : '',
    counts.outOfDate > 0 ? `${counts.outOfDate} out of date` : '',
    counts.waived > 0 ? `${counts.waived} waived` : '',
  ];
  return parts.filter(Boolean).join(', ');
}

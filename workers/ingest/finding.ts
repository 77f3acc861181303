/** One finding of the intake, its empty parts filled in. */
import type { HealthFinding, Severity } from '@/shared/contracts/recordings';

type Interval = [number, number];

export interface FindingParts {
  figure?: { value: number; unit: string };
  intervals?: readonly Interval[];
  remedy?: string;
  fix?: HealthFinding['fix'];
}

export const finding = (
  code: string,
  severity: Severity,
  sentence: string,
  { figure, intervals, remedy, fix }: FindingParts = {},
): HealthFinding => ({
  code,
  severity,
  sentence,
  figure: figure ?? null,
  intervalsS: [...(intervals ?? [])],
  remedy: remedy ?? null,
  ...(fix ? { fix } : {}),
});

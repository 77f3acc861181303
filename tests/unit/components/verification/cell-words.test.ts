import { cellWords, countWords } from '@/components/verification/cell-words';
import type { Metric } from '@/shared/contracts/requirements';
import type { VerificationCell } from '@/shared/contracts/verification';

const DRIFT: Metric = { kind: 'drift', quantity: 'horizontal', afterS: 60, statistic: 'p95' };
const cell = (more: Partial<VerificationCell>): VerificationCell => ({
  requirementId: 'r',
  recordingId: 'q',
  state: 'done',
  progress: 1,
  verdict: 'pass',
  value: 12.3,
  bounds: null,
  reason: null,
  outOfDate: [],
  runId: null,
  judgedAt: null,
  waiver: null,
  settled: true,
  ...more,
});

test.each<[Partial<VerificationCell>, string, string]>([
  [{}, 'passes', 'pine'],
  [{ verdict: 'fail' }, 'fails', 'vermilion'],
  [{ verdict: 'not-applicable', value: null }, 'not applicable', 'ochre'],
  [{ verdict: 'failed', value: null }, 'run failed', 'vermilion'],
  [{ state: 'waiting', verdict: null }, 'waiting', 'soft'],
  [{ state: 'running', progress: 0.4, verdict: null }, 'computing 40 %', 'petrol'],
  [{ state: 'not-verified', verdict: null }, 'not verified', 'soft'],
  [{ outOfDate: ['the engine is another one'] }, 'passes, out of date', 'ochre'],
  [{ verdict: 'fail', waiver: { id: 'w', text: 'Known.', createdAt: '', createdBy: '' } }, 'waived', 'ochre'],
])('%j reads “%s”', (more, verdict, tone) => {
  expect(cellWords(cell(more), DRIFT)).toMatchObject({ verdict, tone });
});

test('values carry their unit, shares are in percent, bounds and reasons stand behind', () => {
  expect(cellWords(cell({}), DRIFT).value).toBe('12.3 m');
  expect(cellWords(cell({ value: 0.0123 }), { kind: 'rejected-share', group: 'position' }).value).toBe(
    '1.23 %',
  );
  expect(
    cellWords(cell({ bounds: [2.9, 3.1], reason: 'too few fixes' }), { kind: 'nis-mean', group: 'position' })
      .detail,
  ).toBe('bounds 2.90 to 3.10; too few fixes');
});

test('counts name only what there is', () => {
  const none = {
    cells: 0,
    pass: 0,
    fail: 0,
    notApplicable: 0,
    failed: 0,
    going: 0,
    notVerified: 0,
    outOfDate: 0,
    waived: 0,
  };
  expect(countWords(none)).toBe('No requirement applies.');
  expect(countWords({ ...none, cells: 4, pass: 3, fail: 1, waived: 1 })).toBe(
    '3 of 4 pass, 1 fail, 1 waived',
  );
});

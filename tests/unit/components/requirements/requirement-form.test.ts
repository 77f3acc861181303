import {
  fieldOf,
  fromRequirement,
  NEW_REQUIREMENT,
  readSpans,
  toInput,
  type RequirementForm,
} from '@/components/requirements/requirement-form';
import type { Requirement } from '@/shared/contracts/requirements';

const REC = 'aaaaaaaa-0000-4000-8000-000000000001';
const form = (more: Partial<RequirementForm>): RequirementForm => ({
  ...NEW_REQUIREMENT,
  name: 'Drift after a minute',
  recordingIds: [REC],
  limit: 15,
  ...more,
});
const faultsOf = (value: RequirementForm) => {
  const made = toInput(value);
  return 'faults' in made ? made.faults.map(({ field }) => field) : [];
};
const inputOf = (value: RequirementForm) => {
  const made = toInput(value);
  if ('faults' in made) throw new Error(JSON.stringify(made.faults));
  return made.input;
};

test.each<[string, Partial<RequirementForm>]>([
  ['drift in repeated outages', {}],
  ['drift in windows', { schedule: 'windows', windows: '600–660, 900–960', afterS: 60 }],
  [
    'mean NIS inside its bounds',
    { kind: 'nis-mean', comparison: 'inside-bounds', limit: undefined, schedule: 'none' },
  ],
  ['a share in percent', { kind: 'rejected-share', limit: 1.5, schedule: 'none' }],
  ['attitude', { kind: 'attitude-sigma', axis: 'largest', when: 'mean', limit: 0.5, schedule: 'none' }],
  ['bias', { kind: 'bias-convergence', sensor: 'accel', sigma: 2e-3, limit: 120, schedule: 'none' }],
  ['error', { kind: 'rmse', rmseQuantity: 'yaw', limit: 1, schedule: 'none' }],
])('%s goes to the contract and comes back as it was', (_, more) => {
  const value = form(more);
  const input = inputOf(value);
  const back = fromRequirement({ ...input, id: 'x' } as unknown as Requirement);
  expect(inputOf(back)).toEqual(input);
});

test('shares are typed in percent and sent from 0 to 1', () => {
  expect(inputOf(form({ kind: 'rejected-share', limit: 1.5, schedule: 'none' })).limit).toBeCloseTo(
    0.015,
    12,
  );
});

test.each<[string, Partial<RequirementForm>, (keyof RequirementForm)[]]>([
  ['no name', { name: ' ' }, ['name']],
  ['no limit', { limit: undefined }, ['limit']],
  ['no recording', { recordingIds: [] }, ['recordingIds']],
  ['drift without outages', { schedule: 'none' }, ['schedule']],
  ['drift at a time that is not reported', { afterS: 45 }, ['afterS']],
  ['windows that nobody can read', { schedule: 'windows', windows: 'in the morning' }, ['windows']],
  ['windows that overlap', { schedule: 'windows', windows: '600–660, 630–700' }, ['windows']],
  ['the next outage before the last has ended', { everyS: 30, forS: 60 }, ['everyS']],
])('%s is told beside its field', (_, more, fields) => {
  expect(faultsOf(form(more))).toEqual(fields);
});

test('bounds are for the mean NIS alone: another metric falls back to a limit', () => {
  expect(inputOf(form({ comparison: 'inside-bounds' })).comparison).toBe('at-most');
});

test('windows are read with any dash', () => {
  expect(readSpans('600–660; 900 - 960.5 s, 1000 to 1010')).toEqual([
    { startS: 600, endS: 660 },
    { startS: 900, endS: 960.5 },
    { startS: 1000, endS: 1010 },
  ]);
  expect(readSpans('')).toBeNull();
});

test('a path of the contract finds its field', () => {
  expect(fieldOf('recordingIds.0')).toBe('recordingIds');
  expect(fieldOf('schedule.windows.1.endS')).toBe('windows');
  expect(fieldOf('somewhere')).toBeNull();
});

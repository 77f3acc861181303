import { waitingFor, type WaitingInput } from '@/components/today/waiting';
import type { ParameterSet } from '@/shared/contracts/parameter-sets';
import type { RunListItem } from '@/shared/contracts/runs';
import { recordingOf } from '../recordings/fixtures';

const NOW = new Date('2026-11-20T12:00:00Z');
const setOf = (overrides: Partial<ParameterSet>): ParameterSet => ({
  id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e50',
  name: 'Harbour set',
  vehicleId: null,
  vehicleName: null,
  createdAt: '2026-11-03T08:00:00Z',
  createdBy: 'Maren Holt',
  latest: { number: 2, state: 'in-review', note: '', createdAt: '2026-11-03T08:00:00Z', createdBy: 'Maren Holt' },
  versionCount: 2,
  releasedNumber: null,
  inReviewNumbers: [2],
  ...overrides,
}); // prettier-ignore
const runOf = (id: string, recordingId: string, createdAt: string) =>
  ({ id, recordingId, recordingName: `Drive ${recordingId}`, failure: null, createdAt }) as RunListItem;
const found = (input: Partial<WaitingInput>) =>
  waitingFor({
    recordings: [], sets: [], runs: [], person: { name: 'Tobin', role: 'approver' }, now: NOW, ...input,
  }); // prettier-ignore

test('what is under way comes first, then what needs a hand, then what failed; each leads on', () => {
  const one = (id: string, status: 'decoding' | 'needs-mapping' | 'rejected' | 'ready') =>
    recordingOf({ id, status, progress: 0.4 });
  const recordings = [
    one('a', 'rejected'),
    one('b', 'ready'),
    one('c', 'needs-mapping'),
    one('d', 'decoding'),
  ];
  expect(found({ recordings }).map(({ key, progress, href }) => [key, progress, href])).toEqual([
    ['d', 0.4, { pathname: '/recordings/[id]', params: { id: 'd' } }],
    ['c', null, { pathname: '/recordings/[id]/mapping', params: { id: 'c' } }],
    ['a', null, { pathname: '/recordings/[id]', params: { id: 'a' } }],
  ]);
});

test('a version waits for an approver who did not write it, and everybody else waits for them', () => {
  const sets = [setOf({})];
  expect(found({ sets })[0]).toMatchObject({
    name: 'Harbour set, version 2',
    tone: 'ochre',
    sentence: 'Waits for your review',
    href: { params: { version: '2' } },
  });
  for (const person of [
    { name: 'Maren Holt', role: 'approver' },
    { name: 'Ilsa', role: 'engineer' },
  ] as const)
    // prettier-ignore
    expect(found({ sets, person })[0]!.sentence).toMatch(/Waits for an approver/);
  const person = { name: 'Ilsa', role: 'engineer' } as const;
  const all = found({ sets, person, recordings: [recordingOf({ status: 'rejected' })] });
  expect(all.map(({ word }) => word)).toEqual(['rejected', 'in review']);
});

test('a returned version says whose it is', () => {
  const latest = { ...setOf({}).latest, state: 'returned' as const };
  expect(found({ sets: [setOf({ latest, inReviewNumbers: [] })] })[0]!.sentence).toMatch(/to Maren Holt/);
});

test('of failed runs only the latest of a recording, while it is news', () => {
  const runs = [
    runOf('3', 'x', '2026-11-20T11:00:00Z'),
    runOf('2', 'x', '2026-11-20T10:00:00Z'),
    runOf('1', 'y', '2026-11-01T10:00:00Z'),
  ];
  expect(found({ runs }).map(({ key, word }) => [key, word])).toEqual([['3', 'run failed']]);
});

test('a reader sees what is under way only', () => {
  const recordings = [recordingOf({ status: 'decoding' }), recordingOf({ status: 'rejected' })];
  const person = { name: 'Oren', role: 'viewer' } as const;
  expect(found({ recordings, sets: [setOf({})], person })).toHaveLength(1);
});

import {
  compareHref,
  readCompareQuery,
  type CompareLink,
  type CompareQuery,
} from '@/components/compare/compare-link';

const queryOf = (href: string) =>
  Object.fromEntries(new URLSearchParams(href.split('?')[1])) as Partial<CompareQuery>;

test('a comparison comes back from its address as it was', () => {
  const link: CompareLink = {
    recordingId: 'rec-1',
    entries: [{ set: 'set-1', version: 3 }, { run: 'run-9' }, 'start'],
    windows: [
      { startS: 600, endS: 660.5, withhold: 'gnss' },
      { startS: 700, endS: 730, withhold: 'velocity' },
    ],
  };
  expect(readCompareQuery(queryOf(compareHref(link)))).toEqual(link);
});

test('no windows of its own is not the same as none', () => {
  const entries = ['start'] as const;
  const own = compareHref({ recordingId: 'r', entries, windows: [] });
  expect(readCompareQuery(queryOf(own))?.windows).toEqual([]);
  expect(readCompareQuery(queryOf(compareHref({ recordingId: 'r', entries })))?.windows).toBeUndefined();
});

test('what cannot be read is left out, what is named twice or beyond four too', () => {
  const read = readCompareQuery({
    on: 'r',
    of: 'run~1,run~1,set~2,set~2~0,set~2~x,set~2~1,start,nonsense,run~3,run~4,run~5',
    w: 'yesterday',
  });
  expect(read?.entries).toEqual([{ run: '1' }, { set: '2', version: 1 }, 'start', { run: '3' }]);
  expect(read?.windows).toBeUndefined();
  expect(readCompareQuery({ of: 'start' })).toBeNull();
});

import { recordingQuery } from '@/components/recordings/recording-filter';
import { setQuery } from '@/components/sets/set-filter';

const VEHICLE = '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e30';

test('an address becomes the query of the API', () => {
  const values = { q: 'loop', vehicle: VEHICLE, status: 'ready', sort: '-name' };
  expect(recordingQuery(values)).toEqual({
    search: 'loop', vehicleId: VEHICLE, status: ['ready'], since: undefined, sort: '-name',
  }); // prettier-ignore
  expect(setQuery({ state: 'released' })).toMatchObject({ state: 'released', sort: undefined });
});

test('a span of days begins at midnight, so that the query of a day stays the same', () => {
  const at = (hour: number) => recordingQuery({ since: 'week' }, new Date(2026, 10, 20, hour)).since;
  expect(at(9)).toBe(at(17));
  expect(at(9)).toBe(new Date(2026, 10, 13).toISOString());
});

test('what an address says wrongly is left out instead of refused', () => {
  const values = { vehicle: 'Crawler', status: 'lost', since: 'ever', sort: 'colour', q: 'x'.repeat(300) };
  const query = recordingQuery(values);
  expect(query).toEqual({ search: 'x'.repeat(120) });
  expect(setQuery({ state: 'lost', vehicle: '1' })).toEqual({});
});

import { nextPath, signInPath } from '@/components/layout/next-path';

test('the way back survives signing in', () => {
  const from = '/recordings/1?view=2&x=a b';
  const query = new URLSearchParams(signInPath(from).split('?')[1]);
  expect(nextPath(query.get('next') ?? '')).toBe(from);
});

test('the first page needs no way back', () => {
  expect(signInPath('/')).toBe('/sign-in');
});

test.each([
  undefined,
  '',
  'https://elsewhere.test/',
  '//elsewhere.test',
  '/\\elsewhere.test',
  '/sign-in?next=/',
])('never leads off the site or in a circle (%s)', (next) => {
  expect(nextPath(next)).toBe('/');
});

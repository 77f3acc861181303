import { ApiProblem, api, apiUrl, NetworkProblem, setApiWorkspace, setSignedOutHandler } from '@/hooks/api';

type Fetch = typeof fetch;
const answer = (status: number, body: string) =>
  jest.fn<ReturnType<Fetch>, Parameters<Fetch>>(() =>
    Promise.resolve(new Response(status === 204 ? null : body, { status })),
  );
function withFetch(fake: jest.Mock<ReturnType<Fetch>, Parameters<Fetch>>) {
  globalThis.fetch = fake as Fetch;
  return fake;
}
const original = globalThis.fetch;
afterEach(() => {
  globalThis.fetch = original;
  setApiWorkspace(null);
  setSignedOutHandler(() => undefined);
});
const problem = (status: number) =>
  JSON.stringify({ type: 'urn:driftwright:problem:x', title: 'No', status, detail: 'Said why.', errors: [] });

test('a refusal carries what the server said', async () => {
  withFetch(answer(422, problem(422)));
  const error: unknown = await api('/x').catch((reason: unknown) => reason);
  expect(error).toBeInstanceOf(ApiProblem);
  expect(error).toMatchObject({ status: 422, message: 'Said why.', type: 'urn:driftwright:problem:x' });
});

test('an answer that is no problem document still says something', async () => {
  withFetch(answer(502, '<html>'));
  await expect(api('/x')).rejects.toThrow(/answered 502/);
});

test('no answer at all is its own kind of failure', async () => {
  withFetch(jest.fn<ReturnType<Fetch>, Parameters<Fetch>>(() => Promise.reject(new TypeError('failed'))));
  await expect(api('/x')).rejects.toBeInstanceOf(NetworkProblem);
});

test('every request names the workspace; those that change something prove that the page sent them', async () => {
  const fake = withFetch(answer(204, ''));
  setApiWorkspace('w1');
  await api('/x');
  await api('/x', { method: 'POST', body: { a: 1 } });
  const headers = fake.mock.calls.map(([, init]) => new Headers(init?.headers));
  expect(headers.map((h) => h.get('X-Workspace'))).toEqual(['w1', 'w1']);
  expect(headers.map((h) => h.has('X-Driftwright'))).toEqual([false, true]);
});

test('a 401 ends the session, but not where one only asks who is there', async () => {
  const ended = jest.fn();
  setSignedOutHandler(ended);
  withFetch(answer(401, problem(401)));
  await api('/me', { anonymous: true }).catch(() => undefined);
  expect(ended).not.toHaveBeenCalled();
  await api('/recordings').catch(() => undefined);
  expect(ended).toHaveBeenCalledTimes(1);
});

test('an address leaves out what is not given', () => {
  expect(apiUrl('/recordings', { search: '', cursor: undefined, limit: 30 })).toBe(
    '/api/v1/recordings?limit=30',
  );
});

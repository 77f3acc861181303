import { showProblem } from '@/components/forms/problem';
import { ApiProblem, NetworkProblem } from '@/hooks/api';

const refusal = (errors: { path: string; message: string }[]) =>
  new ApiProblem({
    type: 'urn:driftwright:problem:invalid',
    title: 'Not valid',
    status: 422,
    detail: 'Some of it is not valid.',
    errors,
  });

function shown(error: unknown) {
  const set = jest.fn<void, [string, { message?: string }]>();
  showProblem<{ name: string }>(error, ['name'], set);
  return Object.fromEntries(set.mock.calls.map(([path, { message }]) => [path, message]));
}

test('a field’s fault stands beside its field', () => {
  expect(shown(refusal([{ path: 'name', message: 'The name is taken.' }]))).toEqual({
    name: 'The name is taken.',
  });
});

test('a fault of no field is told for the whole form, with what the server said', () => {
  expect(shown(refusal([{ path: 'axes', message: 'Mirrored.' }]))).toEqual({
    root: 'Some of it is not valid. Mirrored.',
  });
});

test('a silent server is told in words', () => {
  expect(shown(new NetworkProblem()).root).toMatch(/does not answer/);
});

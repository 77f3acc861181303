import { fireEvent, screen } from '@testing-library/react-native';
import { SignInForm } from '@/components/auth/SignInForm';
import { ApiProblem } from '@/hooks/api';
import { renderAs } from '../render';

const fill = (label: string, text: string) => fireEvent.changeText(screen.getByLabelText(label), text);
const submit = () => fireEvent.press(screen.getByRole('button', { name: 'Sign in' }));

test('names what is missing and sends nothing', async () => {
  const send = jest.fn();
  renderAs(<SignInForm onSubmit={send} />);
  submit();
  expect(await screen.findByText('Write an e-mail address like name@example.org.')).toBeOnTheScreen();
  expect(screen.getByText('Enter the password.')).toBeOnTheScreen();
  expect(send).not.toHaveBeenCalled();
});

test('sends the address as the server keeps it', async () => {
  const send = jest.fn(() => Promise.resolve());
  renderAs(<SignInForm onSubmit={send} />);
  fill('E-mail', '  Maren@Kelmar.test ');
  fill('Password', 'correct horse');
  submit();
  await screen.findByRole('button', { name: 'Sign in' });
  expect(send).toHaveBeenCalledWith({ email: 'maren@kelmar.test', password: 'correct horse' });
});

test('a refusal is told and what was typed stays', async () => {
  const problem = new ApiProblem({
    type: 'urn:driftwright:problem:wrong-password',
    title: 'Not signed in',
    status: 401,
    detail: 'Address and password do not belong together.',
  });
  renderAs(<SignInForm onSubmit={() => Promise.reject(problem)} />);
  fill('E-mail', 'maren@kelmar.test');
  fill('Password', 'wrong');
  submit();
  expect(await screen.findByText('Address and password do not belong together.')).toBeOnTheScreen();
  expect(screen.getByLabelText('E-mail')).toHaveDisplayValue('maren@kelmar.test');
});

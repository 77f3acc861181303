import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { MailChoices } from '@/components/team/MailChoices';
import { renderAs } from '../render';

const usualFetch = globalThis.fetch;
afterEach(() => {
  globalThis.fetch = usualFetch;
});

const answering = (status: number, body: object) => {
  const sent: unknown[] = [];
  globalThis.fetch = jest.fn((_: string, init: RequestInit) => {
    sent.push(JSON.parse(String(init.body)));
    return Promise.resolve({ ok: status < 400, status, json: () => Promise.resolve(body) });
  }) as unknown as typeof fetch;
  return sent;
};
const isOn = (name: string) => screen.queryByRole('switch', { name, checked: true }) !== null;

test('shows the usual letters, and what was chosen otherwise', () => {
  renderAs(<MailChoices />, 'engineer', { letters: { returned: false } });
  const names = ['Review asked', 'Returned', 'Released', 'Every release', 'Verification failed'];
  expect(names.map(isOn)).toEqual([true, false, true, false, true]);
});

test('sends a choice with the others', async () => {
  const sent = answering(200, { units: {}, letters: {}, hintsSeen: [] });
  renderAs(<MailChoices />, 'engineer', { letters: { returned: false } });
  fireEvent.press(screen.getByRole('switch', { name: 'Every release' }));
  await waitFor(() => expect(sent).toEqual([{ letters: { returned: false, anyReleased: true } }]));
});

test('says that nothing has changed where the server refuses', async () => {
  answering(503, { title: 'Away', status: 503, detail: 'The database is away.', type: 'about:blank' });
  renderAs(<MailChoices />);
  fireEvent.press(screen.getByRole('switch', { name: 'Released' }));
  expect(await screen.findByText(/Your letters are as before/)).toBeOnTheScreen();
});

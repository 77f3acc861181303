import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { MailQueue } from '@/components/team/MailQueue';
import type { QueuedLetter } from '@/shared/contracts/accounts';
import { renderAs } from '../render';

const usualFetch = globalThis.fetch;
afterEach(() => {
  globalThis.fetch = usualFetch;
});

const letter: QueuedLetter = {
  id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e11',
  to: 'tobin@kelmar.test',
  subject: 'Review asked: “Harbour”, version 1',
  state: 'waiting',
  attempts: 1,
  lastError: 'connect ECONNREFUSED 127.0.0.1:25',
  nextTryAt: '2026-03-04T10:20:00.000Z',
  writtenAt: '2026-03-04T10:00:00.000Z',
};

test('says to whom, how often, why, and when next; a letter is tried again', async () => {
  const sent: unknown[] = [];
  const given = { ...letter, id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e12', state: 'failed', attempts: 40, nextTryAt: null }; // prettier-ignore
  globalThis.fetch = jest.fn((_: string, init: RequestInit) => {
    if (init.method === 'POST') sent.push(JSON.parse(String(init.body)));
    const body = { items: [letter, given], nextCursor: null };
    return Promise.resolve({ ok: true, status: 200, json: () => Promise.resolve(body) });
  }) as unknown as typeof fetch;
  renderAs(<MailQueue />, 'admin');
  expect(await screen.findByText(/to tobin@kelmar\.test · 1 try · next try 4 Mar 2026/)).toBeOnTheScreen();
  expect(screen.getByText(/40 tries · given up after three days/)).toBeOnTheScreen();
  expect(screen.getAllByText('Last error: connect ECONNREFUSED 127.0.0.1:25')).toHaveLength(2);
  fireEvent.press(screen.getAllByText('Try again now')[0]!);
  await waitFor(() => expect(sent).toEqual([{ id: letter.id }]));
  fireEvent.press(screen.getByText('Try all again now'));
  await waitFor(() => expect(sent[1]).toEqual({}));
});

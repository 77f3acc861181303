import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { FirstHint } from '@/components/layout/FirstHint';
import { renderAs } from '../render';

const usualFetch = globalThis.fetch;
afterEach(() => {
  globalThis.fetch = usualFetch;
});

test('a hint that was seen stays away', () => {
  renderAs(<FirstHint hint="bench" />, 'viewer', { hintsSeen: ['bench'] });
  expect(screen.queryByRole('button', { name: 'Got it' })).toBeNull();
});

test('“Got it” keeps with the person that it was seen, beside those seen before', async () => {
  const sent: unknown[] = [];
  globalThis.fetch = jest.fn((address: string, init: RequestInit) => {
    sent.push([address, JSON.parse(String(init.body))]);
    return Promise.resolve({
      ok: true,
      status: 200,
      json: () => Promise.resolve({ units: {}, hintsSeen: [] }),
    });
  }) as unknown as typeof fetch;
  renderAs(<FirstHint hint="bench" />, 'viewer', { hintsSeen: ['sets'] });
  expect(screen.getByText(/withhold GNSS/)).toBeOnTheScreen();
  fireEvent.press(screen.getByRole('button', { name: 'Got it' }));
  await waitFor(() => expect(sent).toEqual([['/api/v1/me/preferences', { hintsSeen: ['sets', 'bench'] }]]));
});

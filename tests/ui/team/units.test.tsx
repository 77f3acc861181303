import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { TermsCard } from '@/components/noise/TermsCard';
import { UnitsCard } from '@/components/team/UnitsCard';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import { RAD_PER_DEG } from '@/shared/units';
import { renderAs } from '../render';

const usualFetch = globalThis.fetch;
afterEach(() => {
  globalThis.fetch = usualFetch;
});

/** Keeps what was sent; answers it as the server does. */
function listening(): object[] {
  const sent: object[] = [];
  globalThis.fetch = jest.fn((_: string, init: RequestInit) => {
    const body = JSON.parse(String(init.body)) as object;
    sent.push(body);
    return Promise.resolve({
      ok: true,
      status: 200,
      json: () => Promise.resolve({ units: {}, hintsSeen: [], ...body }),
    });
  }) as unknown as typeof fetch;
  return sent;
}

test('a choice is sent with the others; the usual unit is no choice', async () => {
  const sent = listening();
  renderAs(<UnitsCard />, 'viewer', { units: { speed: 'kn', gyroBias: '°/s' } });
  expect(screen.getByLabelText('Speeds').props.value).toBe('kn');
  fireEvent(screen.getByLabelText('Lengths'), 'change', { target: { value: 'ft' } });
  await waitFor(() => expect(sent).toEqual([{ units: { speed: 'kn', gyroBias: '°/s', length: 'ft' } }]));
  fireEvent(screen.getByLabelText('Speeds'), 'change', { target: { value: 'm/s' } });
  await waitFor(() => expect(sent[1]).toEqual({ units: { gyroBias: '°/s' } }));
  fireEvent.press(screen.getByRole('button', { name: 'Back to the usual units' }));
  await waitFor(() => expect(sent[2]).toEqual({ units: {} }));
});

test('the terms of a sensor are shown in the units that were chosen', () => {
  const none = { value: null, sigma: null };
  const terms = { quantisation: none, biasInstability: none, rateRandomWalk: none, ramp: none };
  const white = { value: 0.3 * (RAD_PER_DEG / 60), sigma: null };
  const analysis = {
    axes: [{ channel: 'gyro_x', unit: 'rad/s', points: [], terms: { ...terms, white } }],
  } as unknown as NoiseAnalysis;
  renderAs(<TermsCard sensor="gyro" analysis={analysis} datasheet={null} />, 'viewer', {
    units: { angleRandomWalk: '°/s/√Hz' },
  });
  // 0.3 °/√h is 0.005 °/s/√Hz.
  expect(screen.getByText(/0\.00500/)).toHaveTextContent(/°\/s\/√Hz/);
});

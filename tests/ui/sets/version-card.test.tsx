import { screen } from '@testing-library/react-native';
import { VersionCard } from '@/components/sets/VersionCard';
import { defaultParameters } from '@/shared/contracts/parameters';
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import { recordingOf } from '../recordings/fixtures';
import { renderAs } from '../render';

const recording = recordingOf();
const at = '2026-11-03T08:00:00Z';
const latest = {
  number: 1,
  state: 'draft',
  note: 'First values.',
  createdAt: at,
  createdBy: 'Maren Holt',
} as const;
const set = (recordingId: string | null): ParameterSetDetail => ({
  id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e40',
  name: 'Harbour',
  vehicleId: null,
  vehicleName: null,
  createdAt: at,
  createdBy: 'Maren Holt',
  latest,
  versionCount: 1,
  releasedNumber: null,
  inReviewNumbers: [],
  versions: [
    {
      ...latest,
      id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e41',
      createdById: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e02',
      parameters: defaultParameters(),
      outages: [],
      recordingId,
      runId: null,
      parentNumber: null,
      submittedAt: null,
      submittedBy: null,
      reviewComment: null,
      reviewedBy: null,
      reviewedAt: null,
    },
  ],
});
const show = (shown: ParameterSetDetail) =>
  renderAs(<VersionCard set={shown} version={shown.versions[0]!} />);
const bench = () => screen.getByRole('button', { name: /Open on the bench/ });

const original = globalThis.fetch;
afterEach(() => {
  globalThis.fetch = original;
});

test('the bench is held until its recording is known, then opens on it', async () => {
  let answer: (response: Response) => void = () => undefined;
  // What else the card asks for (its history, its comments) stays on its way.
  globalThis.fetch = (input) =>
    new Promise((resolve) => {
      if (String(input).includes('/recordings/')) answer = resolve;
    });
  show(set(recording.id));
  expect(bench()).toBeDisabled();
  expect(screen.getByRole('button', { name: 'On another recording' })).toBeEnabled();
  answer(new Response(JSON.stringify(recording), { status: 200 }));
  expect(await screen.findByText(/Tuned on Breakwater loop 3/)).toBeOnTheScreen();
  expect(bench()).toBeEnabled();
});

test('a version that was tuned on nothing asks which recording at once', () => {
  show(set(null));
  expect(bench()).toBeEnabled();
  expect(screen.queryByRole('button', { name: 'On another recording' })).toBeNull();
});

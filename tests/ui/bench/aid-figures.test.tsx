import { act, screen } from '@testing-library/react-native';
import { AidFigures } from '@/components/bench/AidFigures';
import { defaultParameters } from '@/shared/contracts/parameters';
import type { Run, RunSummary } from '@/shared/contracts/runs';
import { makeSummary } from '../../unit/components/bench/summary';
import { renderAs } from '../render';
import { BenchStand, type BenchSeen } from './stand';

let seen: BenchSeen;
const finished = (summary: RunSummary): Run => ({
  id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e30',
  recordingId: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e20',
  recordingName: 'Breakwater loop 3',
  state: 'done',
  progress: 1,
  failure: null,
  parameters: defaultParameters(),
  outages: [],
  outputRateHz: 10,
  smooth: false,
  errorBudget: false,
  createdAt: '2026-11-03T08:00:00Z',
  createdBy: 'Maren Holt',
  finishedAt: '2026-11-03T08:00:01Z',
  hasSeries: false,
  summary,
  provenance: null,
});
async function show(summary: RunSummary) {
  renderAs(
    <BenchStand onBench={(bench) => (seen = bench)}>{(bench) => <AidFigures bench={bench} />}</BenchStand>,
  );
  await act(() => seen.live.show(finished(summary)));
}

test('each aid with how often it was used, rejected, and its mean NIS', async () => {
  await show(
    makeSummary({
      aids: [
        { aid: 'zero-velocity', dimension: 3, used: 12_350, rejected: 38, nisMean: 1.234 },
        { aid: 'non-holonomic', dimension: 2, used: 0, rejected: 0, nisMean: null },
      ],
    }),
  );
  expect(screen.getByText('Zero velocity')).toBeOnTheScreen();
  expect(screen.getByText('12\u2009350 used, 38 rejected')).toBeOnTheScreen();
  expect(screen.getByText(/^1\.23 of 3$/)).toBeOnTheScreen();
  expect(screen.getByText('0 used, 0 rejected')).toBeOnTheScreen();
  expect(screen.getAllByText('mean NIS')).toHaveLength(1);
});

test('nothing where no aid was on', async () => {
  await show(makeSummary({ aids: [] }));
  expect(screen.queryByText('AIDS')).toBeNull();
});

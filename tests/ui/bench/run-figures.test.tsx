import { act, screen } from '@testing-library/react-native';
import { RunFigures } from '@/components/bench/RunFigures';
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
    <BenchStand onBench={(bench) => (seen = bench)}>{(bench) => <RunFigures bench={bench} />}</BenchStand>,
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

test('further states with their σ, and a word where the recording does not show them', async () => {
  await show(
    makeSummary({
      optionalStates: [
        { name: 'gyro_scale_x_ppm', unit: 'ppm', value: -812, sigma: 2950, firstSigma: 3000 },
        { name: 'lever_arm_z_m', unit: 'm', value: -0.91, sigma: 0.02, firstSigma: 0.2 },
      ],
    }),
  );
  expect(screen.getByText('Gyro scale x')).toBeOnTheScreen();
  expect(screen.getByText('±2950 ppm (1σ): this recording hardly shows it')).toBeOnTheScreen();
  expect(screen.getByText('Lever arm z')).toBeOnTheScreen();
  expect(screen.getByText('±0.0200 m (1σ)')).toBeOnTheScreen();
});

test('errors against truth, the smoothed ones beside them', async () => {
  const truth = {
    positionRmseM: 0.9,
    horizontalRmseM: 0.62,
    verticalRmseM: 0.65,
    velocityRmseMPerS: null,
    attitudeRmseDeg: null,
    aneesPosition: 3,
    aneesVelocity: null,
    aneesAttitude: null,
    epochs: 1000,
  };
  await show(makeSummary({ truth, smoothedTruth: { ...truth, horizontalRmseM: 0.31 } }));
  expect(screen.getByText('RMS, smoothed 0.310 m')).toBeOnTheScreen();
  expect(screen.getByText(/^0\.620 m$/)).toBeOnTheScreen();
  expect(screen.queryByText('Velocity')).toBeNull();
});

test('nothing where nothing besides was asked for', async () => {
  await show(makeSummary({ aids: [] }));
  expect(screen.queryAllByRole('heading')).toEqual([]);
});

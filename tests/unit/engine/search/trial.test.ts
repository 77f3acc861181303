import type { ParametersInput } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import { Trial } from '@/workers/engine/search/trial';
import type { RecordingColumns } from '@/workers/engine/types';
import { matchedParameters, simulateCase } from '../support/monte-carlo';

jest.setTimeout(30_000);

const drive = simulateCase(
  { motion: 'road', durationS: 160, imuRateHz: 25, gnssRateHz: 2, staticStartS: 20, seed: 6, imuGrade: 'consumer' },
  {},
  { aids: { odometer: { rateHz: 5, sigmaMPerS: 0.05 } } },
); // prettier-ignore

const WINDOWS = [
  [60, 90],
  [110, 140],
] as const;
const odometer = { aids: { odometer: { enabled: true } } };

/** RMS of the drift at the windows' ends, m. */
function drift(
  aids: ParametersInput,
  withhold: readonly Outage['withhold'][],
  recording: RecordingColumns = drive.recording,
): number {
  // One window is one channel's: two of the same times withhold two.
  const outages = WINDOWS.flatMap(([startS, endS]) =>
    withhold.map((name) => ({ startS, endS, withhold: name })),
  );
  const source = { recording, leverArmM: drive.scenario.leverArmM, trainingS: [[0, 161]] as const, heldOutS: [], outages }; // prettier-ignore
  const trial = new Trial(source, matchedParameters(drive.scenario, aids), {
    outlierShare: 0.01,
    wideSigma: { position: 50, velocity: 5 },
    scoredFromS: null,
    untilS: 161,
  });
  while (!trial.isDone) trial.advance(1000);
  expect(trial.training.windows).toBe(outages.length);
  return Math.sqrt(trial.training.driftSquares / trial.training.windows);
}

test('other sensors of the recording are taken in while coasting, where they are switched on', () => {
  const plain = drift({}, ['gnss']);
  expect(drift(odometer, ['gnss'])).toBeLessThan(0.9 * plain);
  expect(drift(odometer, ['gnss'], { ...drive.recording, aids: null })).toBe(plain);
});

test('a window that names an aid withholds it', () => {
  const withheld = drift(odometer, ['odometer']);
  // Not logged: the same as a window that takes away what is not there.
  expect(withheld).not.toBe(drift(odometer, ['heading']));
  expect(withheld).toBeLessThan(drift(odometer, ['gnss']));
});

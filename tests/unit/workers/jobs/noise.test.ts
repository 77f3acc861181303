import type { NoiseAnalysis } from '@/shared/contracts/noise';
import { scenarioSchema, type ScenarioInput } from '@/shared/contracts/scenarios';
import { radToDeg } from '@/shared/units';
import { simulateScenario } from '@/workers/engine/simulator/scenario';
import { noise } from '@/workers/jobs/noise';
import type { NoiseJob } from '@/workers/protocol';
import { writeTable } from '@/workers/recordings/arrow-file';
import { GNSS_COLUMNS, IMU_COLUMNS, writeDecodedNote } from '@/workers/recordings/files';
import { storeKeys } from '@/workers/store/types';
import { testHelpers, testStore, type TestStore } from '../support';

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(async () => {
  at = testStore();
  await record('rest', { motion: 'static', durationS: 900, seed: 5 });
  await record('drive', { motion: 'road', durationS: 120, staticStartS: 40, seed: 5 });
  await record('moving', { motion: 'road', durationS: 60, staticStartS: 0, seed: 5 });
  await record('gapped', { motion: 'static', durationS: 120, seed: 6 }, (row) => row < 7000 || row > 7100);
});
afterAll(() => at.remove());

async function record(id: string, input: ScenarioInput, keeps: (row: number) => boolean = () => true) {
  const { imu, gnss } = simulateScenario(scenarioSchema.parse(input));
  const imuColumns = [imu.timeS, ...imu.gyro, ...imu.accel].map((c) => c.filter((_, row) => keeps(row)));
  const place = [gnss.latRad.map(radToDeg), gnss.lonRad.map(radToDeg), gnss.heightM];
  const gnssColumns = [
    gnss.timeS,
    ...place,
    ...gnss.velocityNed,
    ...gnss.positionSigma,
    ...gnss.velocitySigma,
  ];
  const table = (names: readonly string[], columns: readonly Float64Array[]) =>
    Object.fromEntries(names.map((name, i) => [name, columns[i]!]));
  await writeTable(at.store, storeKeys.imu(id), table(IMU_COLUMNS, imuColumns));
  await writeTable(at.store, storeKeys.gnss(id), table(GNSS_COLUMNS, gnssColumns));
  await writeDecodedNote(at.store, id, { sha256: id, hasReference: false });
}

const analyse = (recordingId: string, spanS: NoiseJob['spanS'] = null): Promise<NoiseAnalysis> =>
  noise({ kind: 'noise', recordingId, spanS }, testHelpers(at.store));

test('a log at rest gives the white noise that it was made with, and no number for what it cannot tell', async () => {
  const found = await analyse('rest');
  expect(found.toS - found.fromS).toBeGreaterThan(890);
  expect(found.axes.map((axis) => axis.unit)).toEqual(['rad/s', 'rad/s', 'rad/s', 'm/s²', 'm/s²', 'm/s²']);
  // The industrial grade of the generator: 8.7e-5 rad/√s and 1e-3 m/s/√s.
  for (const axis of found.axes.slice(0, 3)) expect(axis.terms.white.value! / 8.7e-5).toBeCloseTo(1, 1);
  for (const axis of found.axes.slice(3)) expect(axis.terms.white.value! / 1e-3).toBeCloseTo(1, 1);
  expect(found.figures.gyro.whiteNoiseRadPerSqrtS).toBe(
    Math.max(...found.axes.slice(0, 3).map((axis) => axis.terms.white.value!)),
  );
  expect(found.figures.gyro.turnOnBiasSigmaRadPerS).toBeNull();
  const hidden = found.axes.filter((axis) => axis.terms.rateRandomWalk.value === null);
  expect(hidden.length).toBeGreaterThan(0);
  expect(found.notes.join(' ')).toContain('cannot tell the rate random walk');
});

test('the stretch at rest before a drive is found, and a chosen part of it is analysed', async () => {
  const whole = await analyse('drive');
  expect(whole.stretchesS[0]![0]).toBeLessThan(1);
  expect(whole.toS).toBeGreaterThan(30);
  expect(whole.toS).toBeLessThanOrEqual(40);
  const part = await analyse('drive', [5, 25]);
  expect([part.fromS, part.toS]).toEqual([5, 25]);
  expect(part.samples).toBe(2000);
});

test('of a stretch with a gap the longest part without one is taken, and that is said', async () => {
  const found = await analyse('gapped', [0, 120]);
  expect(found.toS).toBeCloseTo(70, 0);
  expect(found.notes.join(' ')).toContain('has gaps');
});

test('nothing at rest, or too short a stretch: told in words, with what to do', async () => {
  await expect(analyse('moving')).rejects.toMatchObject({ code: 'no-rest' });
  await expect(analyse('moving')).rejects.toThrow(/Choose one in which the vehicle stands still/);
  await expect(analyse('rest', [10, 10.5])).rejects.toMatchObject({ code: 'too-short' });
  await expect(analyse('rest', [5000, 6000])).rejects.toMatchObject({ code: 'too-short' });
});

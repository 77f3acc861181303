/** Clocks, senses, units and axes that IMU and GNSS tell of each other; each remedy is accepted and the log decoded again. */
import type { ChannelMap } from '@/shared/contracts/recordings';
import { scenarioSchema, type ScenarioInput } from '@/shared/contracts/scenarios';
import { radToDeg } from '@/shared/units';
import { imuScale, imuSwapAxes } from '@/workers/engine/simulator/defects';
import { simulateScenario } from '@/workers/engine/simulator/scenario';
import type { GnssColumns, ImuColumns } from '@/workers/engine/types';
import { decodeLogs, GNSS_HEADER, IMU_HEADER, ready, testStore, type TestStore } from '../support';

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const drive = (input: ScenarioInput) =>
  simulateScenario(
    scenarioSchema.parse({ durationS: 240, imuRateHz: 50, gnssRateHz: 1, staticStartS: 10, ...input }),
  );
const table = (header: string, columns: readonly Float64Array[]) =>
  `${header}\n${Array.from(columns[0]!, (_, row) => columns.map((c) => c[row]).join(',')).join('\n')}\n`;
const imuText = ({ timeS, gyro, accel }: ImuColumns) => table(IMU_HEADER, [timeS, ...gyro, ...accel]);
const gnssText = ({ timeS, latRad, lonRad, heightM, velocityNed }: GnssColumns) =>
  table(GNSS_HEADER, [timeS, latRad.map(radToDeg), lonRad.map(radToDeg), heightM, ...velocityNed]);

async function intake(imu: ImuColumns, gnss: GnssColumns, channelMap?: ChannelMap) {
  const logs = { imu: imuText(imu), gnss: gnssText(gnss) };
  return ready(await decodeLogs(at.store, logs, channelMap ? { channelMap } : {}));
}
const negate = (imu: ImuColumns, ...axes: (0 | 1 | 2)[]) =>
  axes.reduce((made, axis) => imuScale(imuScale(made, 'gyro', -1, axis), 'accel', -1, axis), imu);

const DEFECTS: [string, string, (imu: ImuColumns) => ImuColumns][] = [
  ['accelerometer of the opposite sign', 'accel-sign', (imu) => imuScale(imu, 'accel', -1)],
  ['forward–left–up', 'stray-axes', (imu) => negate(imu, 1, 2)],
  ['forward and right exchanged', 'stray-axes', (imu) => imuSwapAxes(imu, 0, 1)],
  ['on its side', 'stray-axes', (imu) => negate(imuSwapAxes(imu, 1, 2), 2)],
  ['gyro z turned round', 'turn-sense', (imu) => imuScale(imu, 'gyro', -1, 2)],
  ['gyro in °/s under a header in rad/s', 'gyro-unit', (imu) => imuScale(imu, 'gyro', radToDeg(1))],
  ['accelerometer in g under a header in m/s²', 'gravity-size', (imu) => imuScale(imu, 'accel', 1 / 9.80665)],
];

test.each(DEFECTS)('%s: found as %s, put right by its remedy', async (_name, code, spoil) => {
  const { imu, gnss } = drive({ seed: 21 });
  const spoilt = spoil(imu);
  const found = await intake(spoilt, gnss);
  const finding = found.health.findings.find((one) => one.code === code);
  expect(found.health.verdict).toBe('not-usable');
  expect(finding?.fix?.label).toEqual(expect.any(String));
  const mended = await intake(spoilt, gnss, { ...found.channelMap, ...finding!.fix!.map });
  expect(mended.health.findings.filter(({ severity }) => severity !== 'info')).toEqual([]);
});

test.each([-2, 0.4, 5])(
  'a GNSS clock %d s off: found with its figure, put right by its remedy',
  async (offsetS) => {
    const { imu, gnss } = drive({ seed: 22 });
    const late = { ...gnss, timeS: gnss.timeS.map((t) => t - offsetS) };
    const found = await intake(imu, late);
    const finding = found.health.findings.find(({ code }) => code === 'clock-offset')!;
    expect(finding.severity).toBe(Math.abs(offsetS) > 0.5 ? 'stop' : 'warn');
    expect(Math.abs(finding.figure!.value - offsetS)).toBeLessThan(0.02);
    const mended = await intake(imu, late, { ...found.channelMap, ...finding.fix!.map });
    expect(mended.health.findings.map(({ code }) => code)).not.toContain('clock-offset');
  },
);

test.each(['road', 'crawler', 'fixed-wing', 'multirotor', 'static'] as const)(
  'a sound %s log raises nothing that stops it',
  async (motion) => {
    const { imu, gnss } = drive({ motion, seed: 23 });
    const { health } = await intake(imu, gnss);
    expect(health.findings.filter(({ severity }) => severity === 'stop')).toEqual([]);
  },
);

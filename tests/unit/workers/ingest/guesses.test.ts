/** Every guess of the intake comes with what it was taken for, how sure that is, and why. */
import type { ChannelGuess, FileRole } from '@/shared/contracts/recordings';
import { RAD_PER_DEG, STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import { csvText, decodeLogs, IMU_HEADER, testStore, type Logs, type TestStore } from '../support';
import { GNSS, IMU, PLAIN_GNSS, PLAIN_IMU } from './twin';

jest.setTimeout(60_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

async function guessOf(logs: Logs, role: FileRole, channel: string): Promise<ChannelGuess> {
  const { previews } = await decodeLogs(at.store, logs);
  const guess = previews.find((one) => one.role === role)?.guesses?.find((one) => one.channel === channel);
  if (!guess) throw new Error(`No guess of ${channel} in the ${role} file.`);
  return guess;
}

const imuIn = (header: string, gyroUnit: number, accelUnit: number) =>
  csvText(header, IMU.map((r) => [r[0]!, ...r.slice(1, 4).map((v) => v / gyroUnit), ...r.slice(4).map((v) => v / accelUnit)])); // prettier-ignore
const UNITLESS = 'time,gx,gy,gz,ax,ay,az';
const withImu = (imu: string): Logs => ({ imu, gnss: PLAIN_GNSS });
const withGnss = (gnss: string): Logs => ({ imu: PLAIN_IMU, gnss });

type Row = [string, Logs, FileRole, string, { takenAs: string; sure: [number, number]; because: RegExp }];
const GUESSES: Row[] = [
  ['units that headers name and gravity confirms', withImu(PLAIN_IMU), 'imu', 'accelerometer', { takenAs: 'm/s^2', sure: [0.9, 1], because: /headers say m\/s\^2.*9\.8.*fits gravity/ }],
  ['a unit that gravity contradicts', withImu(imuIn(IMU_HEADER.replaceAll('m_s2', 'g'), 1, 1)), 'imu', 'accelerometer', { takenAs: 'g', sure: [0, 0.4], because: /headers say g, but.*far from gravity/ }],
  ['g by the size of gravity', withImu(imuIn(UNITLESS, RAD_PER_DEG, STANDARD_GRAVITY_M_S2)), 'imu', 'accelerometer', { takenAs: 'g', sure: [0.85, 0.95], because: /gravity in g/ }],
  ['mg by the size of gravity', withImu(imuIn(UNITLESS, RAD_PER_DEG, STANDARD_GRAVITY_M_S2 / 1000)), 'imu', 'accelerometer', { takenAs: 'mg', sure: [0.85, 0.95], because: /gravity in mg/ }],
  ['°/s because it turns too fast for rad/s', withImu(imuIn(UNITLESS, RAD_PER_DEG / 2, 1)), 'imu', 'gyro', { takenAs: 'deg/s', sure: [0.85, 0.95], because: /too much for rad\/s/ }],
  ['rad/s where both are possible', withImu(imuIn(UNITLESS, 1, 1)), 'imu', 'gyro', { takenAs: 'rad/s', sure: [0.4, 0.7], because: /both rad\/s and °\/s are possible/ }],
  ['seconds by the header', withImu(PLAIN_IMU), 'imu', 'time', { takenAs: 's', sure: [0.9, 1], because: /says seconds/ }],
  ['milliseconds by the step', withImu(csvText(UNITLESS, IMU.map((r) => [r[0]! * 1000, ...r.slice(1)]))), 'imu', 'time', { takenAs: 'ms', sure: [0.8, 0.9], because: /step by 10, a usual interval in milliseconds/ }],
  ['a unit of time that the step contradicts', withImu(csvText(IMU_HEADER, IMU.map((r) => [r[0]! * 1000, ...r.slice(1)]))), 'imu', 'time', { takenAs: 's', sure: [0, 0.5], because: /step by 10, which is unusual/ }],
  ['degrees by range', withGnss(csvText('t,lat,lon,h', GNSS.map((r) => r.slice(0, 4)))), 'gnss', 'position', { takenAs: 'deg', sure: [0.9, 1], because: /within ±90°/ }],
  ['radians by range', withGnss(csvText('t,lat,lon,h', GNSS.map((r) => [r[0]!, r[1]! * RAD_PER_DEG, r[2]! * RAD_PER_DEG, r[3]!]))), 'gnss', 'position', { takenAs: 'rad', sure: [0.6, 0.8], because: /as radians do/ }],
  ['latitude and longitude swapped', withGnss(csvText('t,lat,lon', GNSS.map((r) => [r[0]!, r[2]! - 100, r[1]!]))), 'gnss', 'position', { takenAs: 'deg', sure: [0, 0.3], because: /swapped/ }],
  ['a height that says not above what', withGnss(csvText('t,lat,lon,alt', GNSS.map((r) => r.slice(0, 4)))), 'gnss', 'height', { takenAs: 'm above the ellipsoid', sure: [0.4, 0.6], because: /does not say above what/ }],
  ['dates that may be read in two ways', withImu(csvText(UNITLESS, IMU.map((r) => [`03/01/2026 10:00:0${r[0]!.toFixed(2)}`, ...r.slice(1)]))), 'imu', 'time', { takenAs: 'iso8601', sure: [0.4, 0.6], because: /dates with times/ }],
]; // prettier-ignore

test.each(GUESSES)('%s', async (_, logs, role, channel, { takenAs, sure, because }) => {
  const guess = await guessOf(logs, role, channel);
  expect(guess.takenAs).toBe(takenAs);
  expect(guess.confidence).toBeGreaterThanOrEqual(sure[0]);
  expect(guess.confidence).toBeLessThanOrEqual(sure[1]);
  expect(guess.reason).toMatch(because);
});

test('columns that a given map names are not guessed at', async () => {
  const { channelMap } = await decodeLogs(at.store, withGnss(PLAIN_GNSS));
  const given = { channelMap: { gnss: channelMap!.gnss! } };
  const { previews } = await decodeLogs(at.store, withGnss(PLAIN_GNSS), given);
  expect(previews.find(({ role }) => role === 'gnss')?.guesses).toBeUndefined();
  expect(previews.find(({ role }) => role === 'imu')?.guesses?.length).toBeGreaterThan(2);
});

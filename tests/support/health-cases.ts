/** Seeded drives with one defect each, through the intake: for the test and for the table of hits and false alarms. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { FileRole, HealthReport } from '@/shared/contracts/recordings';
import { scenarioSchema, type Motion } from '@/shared/contracts/scenarios';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { radToDeg } from '@/shared/units';
import * as defects from '@/workers/engine/simulator/defects';
import { simulateScenario } from '@/workers/engine/simulator/scenario';
import type { GnssColumns, ImuColumns } from '@/workers/engine/types';
import { decode } from '@/workers/jobs/decode';
import { createHelpers } from '@/workers/jobs/helpers';
import { RecordingCache } from '@/workers/recordings/cache';
import { FolderStore } from '@/workers/store/folder';
import { storeKeys } from '@/workers/store/types';

export interface Log {
  imu: ImuColumns;
  gnss: GnssColumns;
}

export interface Defect {
  name: string;
  /** Of the finding that must come. */
  code: string;
  motion?: Motion;
  /** Where it must be found, s; left out: everywhere. */
  intervalS?: readonly [number, number];
  spoil: (log: Log, seed: number) => Log;
}

export const CLEAN_MOTIONS: readonly Motion[] = ['road', 'crawler', 'fixed-wing', 'multirotor', 'static'];

export const soundDrive = (motion: Motion, seed: number): Log =>
  simulateScenario(
    scenarioSchema.parse({ motion, durationS: 240, imuRateHz: 50, gnssRateHz: 2, staticStartS: 10, seed }),
  );

const onImu = (change: (imu: ImuColumns) => ImuColumns) => (log: Log) => ({ ...log, imu: change(log.imu) });
const onGnss = (change: (gnss: GnssColumns) => GnssColumns) => (log: Log) => ({
  ...log,
  gnss: change(log.gnss),
});
const AT = [100, 103] as const;
const BLOW = [120, 120.1] as const;
const EXCURSION = [150, 156] as const;

export const DEFECTS: readonly Defect[] = [
  { name: 'IMU gap of 3 s', code: 'imu-gaps', intervalS: AT, spoil: onImu((imu) => defects.imuGap(imu, AT)) },
  { name: 'IMU rows twice', code: 'duplicates', spoil: onImu((imu) => defects.imuDuplicates(imu, AT)) },
  { name: 'IMU rows out of order', code: 'imu-order', intervalS: AT, spoil: onImu((imu) => defects.imuReorder(imu, AT)) },
  { name: 'IMU values missing (NaN)', code: 'incomplete-rows', spoil: onImu((imu) => defects.imuNaN(imu, 'accel', 1, AT)) },
  { name: 'accelerometer clipped', code: 'clipped', spoil: onImu((imu) => defects.imuClip(defects.imuShock(imu, 0, 60, BLOW), 'accel', 30)), intervalS: BLOW },
  { name: 'blow of 80 m/s²', code: 'shocks', intervalS: BLOW, spoil: onImu((imu) => defects.imuShock(imu, 2, 80, BLOW)) },
  { name: 'gyro y stuck', code: 'stuck', intervalS: AT, spoil: onImu((imu) => defects.imuStuck(imu, 'gyro', 1, AT)) },
  { name: 'accelerometer x stuck', code: 'stuck', intervalS: AT, spoil: onImu((imu) => defects.imuStuck(imu, 'accel', 0, AT)) },
  { name: 'axes x and y exchanged', code: 'stray-axes', spoil: onImu((imu) => defects.imuSwapAxes(imu, 0, 1)) },
  { name: 'axes y and z exchanged', code: 'stray-axes', spoil: onImu((imu) => defects.imuSwapAxes(imu, 1, 2)) },
  { name: 'gyro z inverted', code: 'turn-sense', spoil: onImu((imu) => defects.imuScale(imu, 'gyro', -1, 2)) },
  { name: 'accelerometer inverted', code: 'accel-sign', spoil: onImu((imu) => defects.imuScale(imu, 'accel', -1)) },
  { name: 'gyro × 57.3', code: 'gyro-unit', spoil: onImu((imu) => defects.imuScale(imu, 'gyro', radToDeg(1))) },
  { name: 'accelerometer ÷ 9.81', code: 'gravity-size', spoil: onImu((imu) => defects.imuScale(imu, 'accel', 1 / 9.80665)) },
  { name: 'accelerometer × 9.81', code: 'gravity-size', spoil: onImu((imu) => defects.imuScale(imu, 'accel', 9.80665)) },
  { name: 'GNSS clock −2 … +5 s', code: 'clock-offset', spoil: (log, seed) => ({ ...log, gnss: defects.gnssClockOffset(log.gnss, [-2, -0.5, 0.2, 1.3, 5][seed % 5]!) }) },
  { name: 'velocity lags 0.5 s', code: 'velocity-lag', spoil: onGnss((gnss) => defects.gnssVelocityLag(gnss, 0.5)) },
  { name: 'GNSS jump of 60 m for 6 s', code: 'gnss-jumps', intervalS: EXCURSION, spoil: onGnss((gnss) => defects.gnssJump(gnss, EXCURSION, 50, 33)) },
]; // prettier-ignore

/** Writes the log as CSV, decodes it by the real job, answers its health report. Throws where it is rejected. */
export async function healthOf(log: Log): Promise<HealthReport> {
  const root = mkdtempSync(path.join(tmpdir(), 'driftwright-health-'));
  try {
    const store = new FolderStore(root);
    const files = [];
    for (const [role, text] of [['imu', imuText(log.imu)], ['gnss', gnssText(log.gnss)]] as [FileRole, string][]) {
      const key = storeKeys.raw('rec', role);
      await store.put(key, Buffer.from(text));
      files.push({ role, name: `${role}.csv`, key });
    }
    const helpers = createHelpers(store, new RecordingCache(store, 1e9), new AbortController().signal, () => undefined);
    const job = { kind: 'decode' as const, recordingId: 'rec', files, channelMap: null, vehicleAxes: IDENTITY_AXES };
    const result = await decode(job, helpers);
    if (result.outcome !== 'ready') throw new Error(result.problems.map(({ message }) => message).join(' '));
    return result.health;
  } finally {
    rmSync(root, { recursive: true, force: true });
  }
} // prettier-ignore

function table(header: string, columns: readonly Float64Array[]): string {
  const cell = (value: number) => (Number.isNaN(value) ? '' : String(value));
  const rows = Array.from(columns[0]!, (_, row) => columns.map((column) => cell(column[row]!)).join(','));
  return `${header}\n${rows.join('\n')}\n`;
}

const imuText = ({ timeS, gyro, accel }: ImuColumns) =>
  table('time_s,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s,accel_x_m_s2,accel_y_m_s2,accel_z_m_s2', [
    timeS,
    ...gyro,
    ...accel,
  ]);
const gnssText = ({ timeS, latRad, lonRad, heightM, velocityNed, positionSigma }: GnssColumns) =>
  table('time_s,lat_deg,lon_deg,height_m,vn_m_s,ve_m_s,vd_m_s,sigma_n_m,sigma_e_m,sigma_d_m', [
    timeS, latRad.map(radToDeg), lonRad.map(radToDeg), heightM, ...velocityNed, ...positionSigma,
  ]); // prettier-ignore

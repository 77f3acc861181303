/** Paired logs as a person would bring them: CSV files of a simulated drive. */
import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { scenarioSchema, type ScenarioInput } from '@/shared/contracts/scenarios';
import { radToDeg } from '@/shared/units';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

export interface LogFiles {
  imu: string;
  gnss: string;
}

/** Writes imu.csv and gnss.csv of the scenario into `folder` and answers their paths. */
export function writeLogs(folder: string, scenario: ScenarioInput): LogFiles {
  const { imu, gnss } = simulateScenario(scenarioSchema.parse(scenario));
  const files = { imu: path.join(folder, 'imu.csv'), gnss: path.join(folder, 'gnss.csv') };
  writeFileSync(
    files.imu,
    csv(
      [
        'time_s',
        'gyro_x_rad_s',
        'gyro_y_rad_s',
        'gyro_z_rad_s',
        'accel_x_m_s2',
        'accel_y_m_s2',
        'accel_z_m_s2',
      ],
      [imu.timeS, ...imu.gyro, ...imu.accel],
    ),
  );
  writeFileSync(
    files.gnss,
    csv(
      [
        ...['time_s', 'lat_deg', 'lon_deg', 'height_m', 'vn_m_s', 've_m_s', 'vd_m_s'],
        ...['sigma_n_m', 'sigma_e_m', 'sigma_d_m', 'sigma_vn_m_s', 'sigma_ve_m_s', 'sigma_vd_m_s'],
      ],
      [
        ...[gnss.timeS, gnss.latRad.map(radToDeg), gnss.lonRad.map(radToDeg), gnss.heightM],
        ...[...gnss.velocityNed, ...gnss.positionSigma, ...gnss.velocitySigma],
      ],
    ),
  );
  return files;
}

function csv(header: string[], columns: Float64Array[]): string {
  const rows = Array.from(columns[0]!, (_, row) =>
    columns.map((column) => (Number.isNaN(column[row]) ? '' : column[row])).join(','),
  );
  return `${header.join(',')}\n${rows.join('\n')}\n`;
}

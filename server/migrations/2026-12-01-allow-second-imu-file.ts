/** Gyro and accelerometer may come in a file each, and barometer, heading and odometer in one of their own. */
import type { Migration } from './runner';

export const allowSecondImuFile: Migration = {
  name: '2026-12-01-allow-second-imu-file',
  up: `
    ALTER TABLE recording_files
      DROP CONSTRAINT recording_files_role_check,
      ADD CONSTRAINT recording_files_role_check CHECK (role IN ('imu', 'gnss', 'reference', 'imu2', 'aids'));
  `,
  down: `
    DELETE FROM recording_files WHERE role IN ('imu2', 'aids');
    ALTER TABLE recording_files
      DROP CONSTRAINT recording_files_role_check,
      ADD CONSTRAINT recording_files_role_check CHECK (role IN ('imu', 'gnss', 'reference'));
  `,
};

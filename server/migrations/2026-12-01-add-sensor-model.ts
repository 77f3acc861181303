/** Noise figures of a vehicle's IMU: of its datasheet, and measured. */
import type { Migration } from './runner';

export const addSensorModel: Migration = {
  name: '2026-12-01-add-sensor-model',
  up: `ALTER TABLE vehicles ADD COLUMN sensor jsonb;`,
  down: `ALTER TABLE vehicles DROP COLUMN sensor;`,
};

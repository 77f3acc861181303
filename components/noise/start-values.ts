/** A sensor's figures as changes of the filter's parameters: the bench's start values. */
import { parametersSchema } from '@/shared/contracts/parameters';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { figureOf, SENSOR_NAMES, SENSORS } from './sensors';

/** Only what is known, and what the contract accepts. */
export function startValues(figures: SensorFigures): { path: string; value: number }[] {
  return SENSOR_NAMES.flatMap((sensor) =>
    SENSORS[sensor].figures.flatMap(({ field }) => {
      const value = figureOf(figures, sensor, field);
      if (value === null || !parametersSchema.safeParse({ [sensor]: { [field]: value } }).success) return [];
      return [{ path: `${sensor}.${field}`, value }];
    }),
  );
}

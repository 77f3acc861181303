/** A sensor's figures as changes of the filter's parameters: the bench's start values. */
import type { BenchLink } from '@/components/bench/bench-link';
import { parametersSchema } from '@/shared/contracts/parameters';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { figureOf, SENSORS, type Sensor } from './sensors';

/** Only what is known, and what the contract accepts. */
export function startValues(figures: SensorFigures): NonNullable<BenchLink['changes']> {
  return (Object.keys(SENSORS) as Sensor[]).flatMap((sensor) =>
    SENSORS[sensor].figures.flatMap(({ field }) => {
      const value = figureOf(figures, sensor, field);
      if (value === null || !parametersSchema.safeParse({ [sensor]: { [field]: value } }).success) return [];
      return [{ path: `${sensor}.${field}`, value }];
    }),
  );
}

/** The first heading from a compass or two antennas. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { AidColumns, ImuColumns } from '../types';

/** A reading this far from the start still tells the heading there, s. */
const NEAR_S = 1;

export interface AidHeading {
  yaw: number;
  /** rad². */
  variance: number;
  /** When it was read, s. */
  timeS: number;
}

/**
 * The reading nearest to IMU sample `sample`, rad; null where the aid is off or silent there. `rateScale`: from gyro
 * column to rad/s: what the vehicle may have turned in between adds to the variance.
 */
export function headingFromAid(
  imu: ImuColumns,
  sample: number,
  aids: AidColumns | null,
  { aids: { heading: aid } }: Parameters,
  rateScale: number,
): AidHeading | null {
  const columns = aids?.heading;
  if (!aid.enabled || !columns) return null;
  const startS = imu.timeS[sample]!;
  let best = -1;
  let bestAge = NEAR_S;
  columns.timeS.forEach((t, row) => {
    const age = Math.abs(t - aid.latencyS - startS);
    if (!(age <= bestAge) || !Number.isFinite(columns.headingRad[row]!)) return;
    best = row;
    bestAge = age;
  });
  if (best < 0) return null;
  const own = aid.sigmaSource === 'log' ? (columns.sigmaRad?.[best] ?? NaN) : NaN;
  const sigma = (own > 0 && Number.isFinite(own) ? own : aid.sigmaRad) * aid.sigmaScale;
  const turned = imu.gyro[2][sample]! * rateScale * bestAge;
  return {
    yaw: columns.headingRad[best]! + aid.offsetRad,
    variance: sigma ** 2 + turned ** 2,
    timeS: columns.timeS[best]! - aid.latencyS,
  };
}

/** Whether the fixes lie on the IMU's axis; where they do not, what the motion says of how the two clocks differ. */
import type { MapFix } from '@/shared/contracts/recordings';
import { matchClocks } from '../engine/motion-match/match-clocks';
import type { GnssColumns } from '../engine/types';
import type { GnssReport } from './gnss-health';
import type { ImuFacts } from './imu-health';
import { clocksDiffer, noOverlap, unlikeClocks, type IntakeContext } from './intake-context';
import { withGnssShift, type MapInForce } from './map-fixes';

/** Throws IntakeRejected, with a shift to accept where both logs show the same motion. */
export function checkClocks(
  context: IntakeContext,
  originS: number,
  imu: ImuFacts,
  report: GnssReport,
  gnss: GnssColumns,
  inForce: MapInForce,
): void {
  const { time } = context.map.gnss!;
  const differ = clocksDiffer(context, 'gnss', time, originS);
  const overlap = report.startS < imu.endS && report.endS > imu.startS;
  if (overlap && !differ) return;
  const fix = fixByMotion(context, originS, imu, gnss, inForce);
  if (differ) throw unlikeClocks(context, 'gnss', time, fix);
  throw noOverlap('gnss', [imu.startS, imu.endS], [report.startS, report.endS], fix);
}

function fixByMotion(
  context: IntakeContext,
  originS: number,
  imu: ImuFacts,
  gnss: GnssColumns,
  inForce: MapInForce,
): MapFix | undefined {
  const matched = matchClocks(imu.motion, gnss);
  if (!matched) return undefined;
  const { offsetS, sigmaS } = matched;
  const shifted = withGnssShift(inForce, offsetS);
  const { reference } = context.map;
  const apart = (role: 'gnss' | 'reference') => {
    const time = context.map[role]?.time;
    return time !== undefined && clocksDiffer(context, role, time, originS);
  };
  // A reference of the receiver's kind of clock goes with it.
  const moved = reference &&
    apart('reference') &&
    apart('gnss') && {
      reference: { ...reference, time: { ...reference.time, offsetS: shifted.gnss!.time.offsetS } },
    };
  return {
    label: `Shift GNSS by ${offsetS.toFixed(2)} ± ${sigmaS.toFixed(2)} s`,
    map: { ...shifted, ...moved },
  };
}

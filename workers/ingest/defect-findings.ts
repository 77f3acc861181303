/** Defects of single samples and fixes: stuck axes, blows, positions that jump. */
import type { HealthFinding } from '@/shared/contracts/recordings';
import { formatDuration, formatNumber } from '@/shared/format';
import type { GnssColumns } from '../engine/types';
import { finding } from './finding';
import { gnssJumps } from './gnss-jumps';
import type { ImuFacts } from './imu-health';

type Interval = [number, number];

export const defectFindings = (imu: ImuFacts, gnss: GnssColumns): HealthFinding[] => [
  ...stuckFindings(imu),
  ...shockFindings(imu),
  ...jumpFindings(gnss),
];

const AXES = ['gyro x', 'gyro y', 'gyro z', 'accelerometer x', 'accelerometer y', 'accelerometer z'];
/** At the end of the range an axis holds its value too: that is clipping, and told as such. */
const overlaps = ([a, b]: readonly [number, number], [c, d]: readonly [number, number]) => a < d && c < b;

function stuckFindings({ stuck, clippedS }: ImuFacts): HealthFinding[] {
  const real = stuck.filter(({ fromS, toS }) => !clippedS.some((one) => overlaps(one, [fromS, toS])));
  if (real.length === 0) return [];
  const total = real.reduce((sum, { fromS, toS }) => sum + (toS - fromS), 0);
  const axes = [...new Set(real.map(({ channel }) => AXES[channel]!))].join(', ');
  return [
    finding(
      'stuck',
      'warn',
      `${axes} held one value while the other axes went on: ${formatDuration(total)} in all.`,
      {
        figure: { value: total, unit: 's' },
        intervals: real.map(({ fromS, toS }): Interval => [fromS, toS]),
        remedy: 'Look at the wiring and the driver; judge no drift across these stretches.',
      },
    ),
  ];
}

function shockFindings({ shocks }: ImuFacts): HealthFinding[] {
  if (shocks.length === 0) return [];
  const peak = Math.max(...shocks.map((shock) => shock.peak));
  return [
    finding(
      'shocks',
      'warn',
      `${shocks.length === 1 ? 'One blow' : `${shocks.length} blows`} far beyond the rest of the drive, the hardest ${formatNumber(peak)} m/s².`,
      {
        figure: { value: peak, unit: 'm/s²' },
        intervals: shocks.map(({ fromS, toS }): Interval => [fromS, toS]),
        remedy: 'Mount the IMU more softly where they come from the drive; a blow may shift a bias.',
      },
    ),
  ];
}

function jumpFindings(gnss: GnssColumns): HealthFinding[] {
  const jumps = gnssJumps(gnss);
  if (jumps.length === 0) return [];
  const largest = Math.max(...jumps.map(({ sizeM }) => sizeM));
  return [
    finding(
      'gnss-jumps',
      'warn',
      `GNSS positions jump ${jumps.length === 1 ? 'once' : `${jumps.length} times`}, at most ${formatNumber(largest)} m.`,
      {
        figure: { value: largest, unit: 'm' },
        intervals: jumps.map(({ fromS, toS }): Interval => [fromS, toS]),
        remedy: 'Keep the gate on; where they are many, give the positions a larger σ.',
      },
    ),
  ];
}

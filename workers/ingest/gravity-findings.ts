/** Gravity in the quietest second tells wrong units, and an IMU that is mounted otherwise than the map says. */
import type { ChannelMap, HealthFinding } from '@/shared/contracts/recordings';
import { formatNumber } from '@/shared/format';
import { radToDeg, STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import type { TrueAxes } from '../engine/motion-match/body-axes';
import { finding } from './finding';
import type { ImuFacts } from './imu-health';
import { withAccelSign, withAccelUnit, withTrueAxes, type MapInForce } from './map-fixes';

type Interval = [number, number];

/** `turnFactor`: turn by GNSS ÷ turn by the IMU about the vertical; null: not known. */
export function gravityFindings(
  imu: ImuFacts,
  turnFactor: number | null,
  inForce: MapInForce,
): HealthFinding[] {
  const { quiet } = imu;
  const force = quiet ? Math.hypot(...quiet.accelMean) : imu.meanForce;
  const figure = { value: force, unit: 'm/s²' };
  const intervals: Interval[] = quiet ? [[quiet.startS, quiet.endS]] : [];
  const share = force / STANDARD_GRAVITY_M_S2;
  if (share < 0.5 || share > 1.5) {
    const unit = likelyUnit(share);
    const sentence = `In its quietest second the accelerometer shows ${formatNumber(force)} m/s² instead of about 9.81.`;
    const remedy = unit
      ? `Its values look like ${unit.words}: set its unit to ${unit.words}.`
      : 'Check the unit of the accelerometer columns on the mapping screen.';
    const fix = unit && { label: `Read it in ${unit.words}`, map: withAccelUnit(inForce, unit.unit) };
    return [
      finding('gravity-size', 'stop', sentence, { figure, intervals, remedy, ...(fix ? { fix } : {}) }),
    ];
  }
  const found: HealthFinding[] = [];
  // In a turn there is more than gravity.
  const still = !quiet || Math.hypot(...quiet.gyroMean) < 0.05;
  if (still && Math.abs(share - 1) > 0.05)
    found.push(
      finding(
        'gravity-off',
        'warn',
        `In its quietest second the accelerometer shows ${formatNumber(force, 4)} m/s² instead of about 9.81.`,
        {
          figure,
          intervals,
          remedy: 'Expect a large accelerometer bias or scale error, or a log without a standstill.',
        },
      ),
    );
  const z = quiet ? { figure: { value: quiet.accelMean[2], unit: 'm/s²' }, intervals } : null;
  if (z && z.figure.value > 0.7 * force) found.push(upsideDown(z, turnFactor, inForce));
  else if (z && z.figure.value > -0.7 * force)
    found.push(
      finding(
        'axes',
        'warn',
        'Gravity does not lie along the z axis: the IMU seems to be mounted otherwise than the axes say.',
        { ...z, remedy: 'Set the axes on the vehicle or on the mapping screen.' },
      ),
    );
  const turn = quiet ? Math.hypot(...quiet.gyroMean) : 0;
  if (quiet && turn > 0.35 && quiet.gyroSpread < 0.05)
    found.push(
      finding(
        'gyro-offset',
        'warn',
        `In its quietest second the gyro shows ${formatNumber(radToDeg(turn))} °/s.`,
        {
          figure: { value: radToDeg(turn), unit: '°/s' },
          intervals,
          remedy: 'Check the unit of the gyro columns (rad/s or °/s) on the mapping screen.',
        },
      ),
    );
  return found;
}

/** z looks up, or the accelerometer counts the other way: the sense of turning tells which. */
function upsideDown(
  parts: { figure: { value: number; unit: string }; intervals: Interval[] },
  turnFactor: number | null,
  inForce: MapInForce,
): HealthFinding {
  if (turnFactor !== null && turnFactor < 0)
    return finding(
      'accel-sign',
      'stop',
      'Gravity points up while the gyro turns the right way: the accelerometer counts opposite to specific force.',
      {
        ...parts,
        remedy: 'Turn the accelerometer’s sign round.',
        fix: { label: 'Turn the accelerometer’s sign round', map: withAccelSign(inForce) },
      },
    );
  return finding(
    'upside-down',
    turnFactor === null ? 'warn' : 'stop',
    'Gravity points up: the z axis that should look down seems to look up.',
    {
      ...parts,
      remedy: 'Set the axes, for example forward +x, right −y, down −z.',
      fix: { label: 'Take z upwards, y to the left', map: withTrueAxes(inForce, UP_LEFT) },
    },
  );
}

const UP_LEFT: TrueAxes = [
  { axis: 0, sign: 1 },
  { axis: 1, sign: -1 },
  { axis: 2, sign: -1 },
];

type AccelUnit = NonNullable<ChannelMap['imu']>['accel']['unit'];

function likelyUnit(share: number): { unit: AccelUnit; words: string } | null {
  if (share > 0.08 && share < 0.13) return { unit: 'g', words: 'g' };
  if (share > 80 && share < 130) return { unit: 'mg', words: 'mg' };
  if (share > 8 && share < 12) return { unit: 'm/s^2', words: 'm/s²' };
  return null;
}

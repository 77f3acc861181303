/** What IMU and GNSS say of each other: clocks, sense and unit of the turns, axes. With remedies that can be accepted. */
import type { HealthFinding } from '@/shared/contracts/recordings';
import { formatNumber } from '@/shared/format';
import { strayAxes, type TrueAxes } from '../engine/motion-match/body-axes';
import { findClockOffsets, type ClockFindings } from '../engine/motion-match/find-offsets';
import type { GnssColumns } from '../engine/types';
import { finding } from './finding';
import { gravityFindings } from './gravity-findings';
import type { ImuFacts } from './imu-health';
import { withGnssShift, withGyroTurned, withGyroUnit, withTrueAxes, type MapInForce } from './map-fixes';

/** An offset counts from here, s and σ; and makes a recording unusable as it is from there, s. */
const LEAST_OFFSET_S = 0.05;
const SIGMAS = 3;
const STOP_OFFSET_S = 0.5;

export function motionFindings(imu: ImuFacts, gnss: GnssColumns, inForce: MapInForce): HealthFinding[] {
  const clocks = findClockOffsets(imu.motion, gnss);
  const stray = strayAxes(imu.motion, gnss, clocks.offset?.offsetS ?? 0);
  const gravity = gravityFindings(imu, clocks.turnFactor, inForce);
  const upright = !gravity.some(({ code }) => code === 'upside-down' || code === 'accel-sign');
  return [
    ...(stray ? gravity.filter(({ code }) => !AXIS_CODES.has(code)) : gravity),
    ...(stray && !gravity.some(({ code }) => code === 'accel-sign') ? [strayFinding(stray, inForce)] : []),
    ...(upright && !stray ? turnFindings(clocks, inForce) : []),
    ...clockFindings(clocks, inForce),
  ];
}

/** The motion says it better. */
const AXIS_CODES: ReadonlySet<string> = new Set(['axes', 'upside-down']);

function strayFinding(truth: TrueAxes, inForce: MapInForce): HealthFinding {
  const names = ['x', 'y', 'z'];
  const words = truth.map(({ axis, sign }) => `${sign < 0 ? '−' : ''}${names[axis]!}`);
  return finding(
    'stray-axes',
    'stop',
    `Braking, turning and gravity are felt along other axes than named: what is forward, right, down is read as ${words.join(', ')}.`,
    {
      remedy: 'Set the axes, or name the columns in their right order.',
      fix: { label: 'Put the axes right', map: withTrueAxes(inForce, truth) },
    },
  );
}

function turnFindings({ turnFactor, turnAxis }: ClockFindings, inForce: MapInForce): HealthFinding[] {
  if (turnAxis !== null && turnAxis !== 2)
    return [
      finding(
        'gyro-axes',
        'stop',
        `The turns that GNSS sees are on the gyro’s ${'xyz'[turnAxis]!} axis instead of its z axis.`,
        { remedy: 'Name the gyro’s columns in their right order on the mapping screen.' },
      ),
    ];
  if (turnFactor === null) return [];
  const size = Math.abs(turnFactor);
  const unit = size > 40 && size < 80 ? 'rad/s' : size > 1 / 80 && size < 1 / 40 ? 'deg/s' : null;
  const figure = { value: 1 / turnFactor, unit: '×' };
  const now = inForce.map.imu!.gyro.unit;
  if (unit && (now === 'rad/s' || now === 'deg/s')) {
    const words = unit === 'rad/s' ? 'rad/s' : '°/s';
    return [
      finding(
        'gyro-unit',
        'stop',
        `By GNSS the vehicle turns ${formatNumber(size)} times as fast as by the gyro: its values look like ${words}.`,
        {
          figure,
          remedy: `Read the gyro in ${words}.`,
          fix: { label: `Read it in ${words}`, map: withGyroUnit(inForce, unit) },
        },
      ),
    ];
  }
  if (turnFactor < 0)
    return [
      finding('turn-sense', 'stop', 'The gyro turns opposite to the course of GNSS.', {
        figure,
        remedy: 'Turn the sign of the gyro’s z axis round.',
        fix: { label: 'Turn gyro z round', map: withGyroTurned(inForce, 2) },
      }),
    ];
  // A vehicle that banks shows its z axis less than the whole turn.
  if (size < 0.75 || size > 1.35)
    return [
      finding(
        'gyro-scale',
        'warn',
        `By GNSS the vehicle turns ${formatNumber(size)} times as fast as by the gyro.`,
        { figure, remedy: 'Check the gyro’s unit and scale factor, and how the IMU is mounted.' },
      ),
    ];
  return [];
}

function clockFindings({ offset, velocityLag }: ClockFindings, inForce: MapInForce): HealthFinding[] {
  const found: HealthFinding[] = [];
  if (offset && Math.abs(offset.offsetS) > Math.max(LEAST_OFFSET_S, SIGMAS * offset.sigmaS)) {
    const { offsetS, sigmaS } = offset;
    const late = offsetS > 0 ? 'early' : 'late';
    found.push(
      finding(
        'clock-offset',
        Math.abs(offsetS) > STOP_OFFSET_S ? 'stop' : 'warn',
        `The GNSS stamps are ${seconds(Math.abs(offsetS))} ± ${seconds(sigmaS)} s ${late} against the IMU’s.`,
        {
          figure: { value: offsetS, unit: 's' },
          remedy: `Shift the GNSS times by ${signed(offsetS)} s.`,
          fix: { label: `Shift GNSS by ${signed(offsetS)} s`, map: withGnssShift(inForce, offsetS) },
        },
      ),
    );
  }
  if (velocityLag && Math.abs(velocityLag.lagS) > LEAST_OFFSET_S)
    found.push(
      finding(
        'velocity-lag',
        'warn',
        `The GNSS velocities are ${seconds(velocityLag.lagS)} ± ${seconds(velocityLag.sigmaS)} s older than the positions.`,
        {
          figure: { value: velocityLag.lagS, unit: 's' },
          remedy: 'Use positions alone, or give the velocities a larger σ: they speak of an earlier moment.',
        },
      ),
    );
  return found;
}

/** To milliseconds: what the motion tells is not finer. */
const seconds = (value: number) => (Math.round(value * 1000) / 1000).toString().replace('-', '−');
const signed = (value: number) => `${value > 0 ? '+' : '−'}${Math.abs(value).toFixed(2)}`;

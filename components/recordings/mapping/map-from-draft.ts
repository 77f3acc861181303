/** The channel map that a complete mapping form stands for. */
import type { ChannelMap, GnssMap, ImuMap, ReferenceMap, TimeMap } from '@/shared/contracts/recordings';
import {
  TWO_COLUMN_BASES,
  type AidDraft,
  type AidsDraft,
  type GnssDraft,
  type ImuDraft,
  type MapDraft,
  type PositionDraft,
  type ReferenceDraft,
  type SensorExtras,
  type SigmaDraft,
  type TimeDraft,
  type VelocityDraft,
} from './map-draft';

export function mapFromDraft(draft: MapDraft): ChannelMap {
  return {
    imu: draft.imu && imuMap(draft.imu),
    gnss: draft.gnss && gnssMap(draft.gnss),
    reference: draft.reference && referenceMap(draft.reference),
    ...aidsMap(draft.aids),
  };
}

/** Which of the rarer statements about a clock a base takes; the rest is not sent. */
export function timeExtrasOf(base: TimeMap['base']) {
  const written = base === 'iso8601' || base === 'date+time';
  return {
    scale: base !== 'counter',
    zoneMin: written || base === 'time-of-day',
    dateOrder: written,
    date: base === 'time-of-day',
    rateHz: base === 'counter',
    wrap: !written,
  };
}

function timeMap(time: TimeDraft): TimeMap {
  const takes = timeExtrasOf(time.base);
  const { scale, zoneMin, dateOrder, date, rateHz, wrap } = time;
  return {
    columns: TWO_COLUMN_BASES.includes(time.base) ? [time.column, time.second] : [time.column],
    base: time.base,
    offsetS: time.offsetS,
    stamp: time.stamp,
    ...(takes.scale && scale ? { scale } : null),
    ...(takes.zoneMin && zoneMin !== undefined ? { zoneMin } : null),
    ...(takes.dateOrder && dateOrder ? { dateOrder } : null),
    ...(takes.date && date ? { date } : null),
    ...(takes.rateHz && rateHz !== undefined ? { rateHz } : null),
    ...(takes.wrap && wrap !== undefined ? { wrap } : null),
  };
}

const imuMap = (imu: ImuDraft): ImuMap => ({
  time: timeMap(imu.time),
  gyro: { columns: imu.gyro, unit: imu.gyroUnit, ...sensorExtras(imu.gyroMore) },
  accel: {
    columns: imu.accel,
    unit: imu.accelUnit,
    sign: imu.accelSign,
    ...sensorExtras(imu.accelMore),
  },
  ...(imu.accelTimeFrom === 'own' ? { accelTime: timeMap(imu.accelTime) } : null),
  sampling: imu.sampling,
  ...(imu.axesFrom === 'own' ? { axes: imu.axes } : null),
  ...(imu.mounted === 'turned' ? { mounting: imu.mounting } : null),
});

function sensorExtras({
  file,
  signs,
  scale,
}: SensorExtras): Pick<ImuMap['gyro'], 'file' | 'signs' | 'scale'> {
  const sense = (axis: 0 | 1 | 2) => (signs[axis] === 'turned' ? -1 : 1);
  const senses: ImuMap['gyro']['signs'] = [sense(0), sense(1), sense(2)];
  return {
    ...(file ? { file } : null),
    ...(signs.includes('turned') ? { signs: senses } : null),
    ...(scale === undefined ? null : { scale }),
  };
}

/** Nothing where nobody spoke of other sensors: the server then looks for them by their headers. */
function aidsMap({ known, barometer, heading, odometer }: AidsDraft): Pick<ChannelMap, 'aids'> {
  if ([barometer, heading, odometer].every(({ given }) => given === 'no')) return known ? { aids: {} } : {};
  return {
    aids: {
      ...(barometer.given === 'yes' ? { barometer: { ...aidMap(barometer), unit: barometer.unit } } : null),
      ...(heading.given === 'yes'
        ? {
            heading: {
              ...aidMap(heading),
              unit: heading.unit,
              ...(heading.offsetDeg === undefined ? null : { offsetDeg: heading.offsetDeg }),
            },
          }
        : null),
      ...(odometer.given === 'yes'
        ? {
            odometer: {
              ...aidMap(odometer),
              unit: odometer.unit,
              ...(odometer.scale === undefined ? null : { scale: odometer.scale }),
            },
          }
        : null),
    },
  };
}

const aidMap = ({ column, file, sigma, timeFrom, time }: AidDraft) => ({
  column,
  ...(file ? { file } : null),
  ...(sigma ? { sigma } : null),
  ...(timeFrom === 'own' ? { time: timeMap(time) } : null),
});

const positionMap = ({
  height,
  latHemisphere,
  lonHemisphere,
  ...rest
}: PositionDraft): GnssMap['position'] => ({
  ...rest,
  ...(height ? { height } : null),
  ...(latHemisphere ? { latHemisphere } : null),
  ...(lonHemisphere ? { lonHemisphere } : null),
});

function velocityMap(velocity: VelocityDraft): GnssMap['velocity'] {
  const { frame, columns, speed, course, climb, unit, courseUnit } = velocity;
  if (frame === 'none') return undefined;
  return frame === 'speed-course'
    ? { frame, speed, course, unit, courseUnit, ...(climb ? { climb } : null) }
    : { frame, columns, unit };
}

function sigmaMap(sigma: SigmaDraft): GnssMap['positionSigma'] {
  if (sigma.shape === 'none') return undefined;
  const [first, second] = sigma.columns;
  return { columns: sigma.shape === 'two' ? [first, second] : sigma.columns, unit: sigma.unit };
}

const gnssMap = (gnss: GnssDraft): GnssMap => ({
  time: timeMap(gnss.time),
  position: positionMap(gnss.position),
  velocity: velocityMap(gnss.velocity),
  positionSigma: sigmaMap(gnss.positionSigma),
  velocitySigma: sigmaMap(gnss.velocitySigma),
  ...(gnss.quality ? { quality: gnss.quality } : null),
  ...(gnss.repeats ? { repeats: gnss.repeats } : null),
});

const referenceMap = (reference: ReferenceDraft): ReferenceMap => ({
  time: timeMap(reference.time),
  position: positionMap(reference.position),
  velocity: velocityMap(reference.velocity),
  attitude:
    reference.attitude.given === 'yes'
      ? { columns: reference.attitude.columns, unit: reference.attitude.unit }
      : undefined,
});

/** The channel map that a complete mapping form stands for, and which column plays which part in it. */
import type {
  ChannelMap,
  FileRole,
  GnssMap,
  ImuMap,
  ReferenceMap,
  TimeMap,
} from '@/shared/contracts/recordings';
import {
  TWO_COLUMN_BASES,
  type GnssDraft,
  type ImuDraft,
  type MapDraft,
  type PositionDraft,
  type ReferenceDraft,
  type SigmaDraft,
  type TimeDraft,
  type VelocityDraft,
} from './map-draft';

export function mapFromDraft(draft: MapDraft): ChannelMap {
  return {
    imu: draft.imu && imuMap(draft.imu),
    gnss: draft.gnss && gnssMap(draft.gnss),
    reference: draft.reference && referenceMap(draft.reference),
  };
}

/** For the preview: header → what it is taken for. */
export function columnParts(draft: MapDraft, role: FileRole): Map<string, string> {
  const parts = new Map<string, string>();
  const put = (column: string | undefined, part: string) => {
    if (column) parts.set(column, parts.has(column) ? `${parts.get(column)}, ${part}` : part);
  };
  const put3 = (columns: readonly string[], names: readonly string[]) =>
    names.forEach((name, i) => put(columns[i], name));
  const { imu } = draft;
  if (role === 'imu' && imu) {
    putTime(imu.time, put);
    put3(imu.gyro, ['gyro x', 'gyro y', 'gyro z']);
    put3(imu.accel, ['accel x', 'accel y', 'accel z']);
  }
  const track = role === 'gnss' ? draft.gnss : role === 'reference' ? draft.reference : undefined;
  if (track) {
    putTime(track.time, put);
    put(track.position.lat, 'latitude');
    put(track.position.lon, 'longitude');
    put(track.position.height, 'height');
    putVelocity(track.velocity, put, put3);
  }
  if (role === 'gnss' && draft.gnss) {
    putSigma(draft.gnss.positionSigma, 'position σ', put3);
    putSigma(draft.gnss.velocitySigma, 'velocity σ', put3);
    put(draft.gnss.quality, 'fix quality');
  }
  if (role === 'reference' && draft.reference?.attitude.given === 'yes')
    put3(draft.reference.attitude.columns, ['roll', 'pitch', 'yaw']);
  return parts;
}

export const VELOCITY_AXES = {
  ned: ['north', 'east', 'down'],
  enu: ['east', 'north', 'up'],
  neu: ['north', 'east', 'up'],
  ecef: ['X', 'Y', 'Z'],
} as const;

export const SIGMA_AXES = { two: ['horizontal', 'vertical'], three: ['north', 'east', 'down'] } as const;

type Put = (column: string | undefined, part: string) => void;
type Put3 = (columns: readonly string[], names: readonly string[]) => void;

function putTime(time: TimeDraft, put: Put) {
  put(time.column, 'time');
  if (TWO_COLUMN_BASES.includes(time.base)) put(time.second, 'time, fraction');
}

function putVelocity(velocity: VelocityDraft, put: Put, put3: Put3) {
  if (velocity.frame === 'none') return;
  if (velocity.frame === 'speed-course') {
    put(velocity.speed, 'speed');
    put(velocity.course, 'course');
  } else {
    put3(
      velocity.columns,
      VELOCITY_AXES[velocity.frame].map((axis) => `velocity ${axis}`),
    );
  }
}

function putSigma(sigma: SigmaDraft, name: string, put3: Put3) {
  if (sigma.shape === 'none') return;
  put3(
    sigma.columns,
    SIGMA_AXES[sigma.shape].map((axis) => `${name} ${axis}`),
  );
}

const timeMap = (time: TimeDraft): TimeMap => ({
  columns: TWO_COLUMN_BASES.includes(time.base) ? [time.column, time.second] : [time.column],
  base: time.base,
  offsetS: time.offsetS,
  stamp: time.stamp,
});

const imuMap = (imu: ImuDraft): ImuMap => ({
  time: timeMap(imu.time),
  gyro: { columns: imu.gyro, unit: imu.gyroUnit },
  accel: { columns: imu.accel, unit: imu.accelUnit, sign: imu.accelSign },
  sampling: imu.sampling,
  ...(imu.axesFrom === 'own' ? { axes: imu.axes } : null),
});

const positionMap = ({ height, ...rest }: PositionDraft): GnssMap['position'] => ({
  ...rest,
  ...(height ? { height } : null),
});

function velocityMap(velocity: VelocityDraft): GnssMap['velocity'] {
  const { frame, columns, speed, course, unit, courseUnit } = velocity;
  if (frame === 'none') return undefined;
  return frame === 'speed-course' ? { frame, speed, course, unit, courseUnit } : { frame, columns, unit };
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

/** Which column of a file plays which part in the form's map. */
import type { FileRole } from '@/shared/contracts/recordings';
import {
  TWO_COLUMN_BASES,
  type MapDraft,
  type SigmaDraft,
  type TimeDraft,
  type VelocityDraft,
} from './map-draft';

/** Header → what it is taken for. `aidsIn`: the file of other sensors that name none. */
export function columnParts(
  draft: MapDraft,
  role: FileRole,
  aidsIn: 'aids' | 'imu' = 'aids',
): Map<string, string> {
  const parts = new Map<string, string>();
  const put = (column: string | undefined, part: string) => {
    if (column) parts.set(column, parts.has(column) ? `${parts.get(column)}, ${part}` : part);
  };
  const put3 = (columns: readonly string[], names: readonly string[]) =>
    names.forEach((name, i) => put(columns[i], name));
  const { imu } = draft;
  if ((role === 'imu' || role === 'imu2') && imu) {
    putTime(imu.time, put);
    put3(imu.gyro, ['gyro x', 'gyro y', 'gyro z']);
    if (imu.accelTimeFrom === 'own') putTime(imu.accelTime, put);
    put3(imu.accel, ['accel x', 'accel y', 'accel z']);
  }
  const track = role === 'gnss' ? draft.gnss : role === 'reference' ? draft.reference : undefined;
  if (track) {
    putTime(track.time, put);
    put(track.position.lat, 'latitude');
    put(track.position.lon, 'longitude');
    put(track.position.height, 'height');
    put(track.position.latHemisphere, 'north or south');
    put(track.position.lonHemisphere, 'east or west');
    putVelocity(track.velocity, put, put3);
  }
  if (role === 'gnss' && draft.gnss) {
    putSigma(draft.gnss.positionSigma, 'position σ', put3);
    putSigma(draft.gnss.velocitySigma, 'velocity σ', put3);
    put(draft.gnss.quality, 'fix quality');
  }
  if (role === 'reference' && draft.reference?.attitude.given === 'yes')
    put3(draft.reference.attitude.columns, ['roll', 'pitch', 'yaw']);
  for (const kind of ['barometer', 'heading', 'odometer'] as const) {
    const aid = draft.aids[kind];
    if (aid.given === 'no' || (aid.file || aidsIn) !== role) continue;
    if (aid.timeFrom === 'own') putTime(aid.time, put);
    put(aid.column, kind);
    put(aid.sigma, `${kind} σ`);
  }
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
    put(velocity.climb, 'climb');
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

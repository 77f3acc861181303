/** Fills the mapping form: from the map in force or guessed, else from what the headers look like. */
import type {
  ChannelMap,
  FilePreview,
  GnssMap,
  ImuMap,
  Recording,
  ReferenceMap,
  TimeMap,
} from '@/shared/contracts/recordings';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import type {
  GnssDraft,
  ImuDraft,
  MapDraft,
  PositionDraft,
  ReferenceDraft,
  SigmaDraft,
  TimeDraft,
  VelocityDraft,
} from './map-draft';
import { suggestColumn, type Suggestable } from './suggest';

/** The form's first values for every file that the recording has. */
export function draftFromMap(recording: Pick<Recording, 'channelMap' | 'previews'>): MapDraft {
  const map: ChannelMap = recording.channelMap ?? {};
  const headersOf = (role: FilePreview['role']) =>
    recording.previews.find((preview) => preview.role === role)?.headers;
  const [imu, gnss, reference] = [headersOf('imu'), headersOf('gnss'), headersOf('reference')];
  return {
    imu: imu && imuDraft(map.imu, imu),
    gnss: gnss && gnssDraft(map.gnss, gnss),
    reference: reference && referenceDraft(map.reference, reference),
  };
}

function imuDraft(map: ImuMap | undefined, headers: readonly string[]): ImuDraft {
  return {
    time: timeDraft(map?.time, headers),
    gyro: map?.gyro.columns ?? three(headers, ['gyroX', 'gyroY', 'gyroZ']),
    gyroUnit: map?.gyro.unit ?? 'rad/s',
    accel: map?.accel.columns ?? three(headers, ['accelX', 'accelY', 'accelZ']),
    accelUnit: map?.accel.unit ?? 'm/s^2',
    accelSign: map?.accel.sign ?? 'specific-force',
    sampling: map?.sampling ?? 'mean-rate',
    axesFrom: map?.axes ? 'own' : 'vehicle',
    axes: map?.axes ?? IDENTITY_AXES,
  };
}

function gnssDraft(map: GnssMap | undefined, headers: readonly string[]): GnssDraft {
  return {
    time: timeDraft(map?.time, headers),
    position: positionDraft(map?.position, headers),
    velocity: velocityDraft(map?.velocity),
    positionSigma: sigmaDraft(map?.positionSigma, 'm'),
    velocitySigma: sigmaDraft(map?.velocitySigma, 'm/s'),
    quality: map?.quality ?? '',
  };
}

function referenceDraft(map: ReferenceMap | undefined, headers: readonly string[]): ReferenceDraft {
  return {
    time: timeDraft(map?.time, headers),
    position: positionDraft(map?.position, headers),
    velocity: velocityDraft(map?.velocity),
    attitude: {
      given: map?.attitude ? 'yes' : 'no',
      columns: map?.attitude?.columns ?? ['', '', ''],
      unit: map?.attitude?.unit ?? 'deg',
    },
  };
}

function timeDraft(map: TimeMap | undefined, headers: readonly string[]): TimeDraft {
  return {
    column: map?.columns[0] ?? suggestColumn(headers, 'time'),
    second: map?.columns[1] ?? '',
    base: map?.base ?? 's',
    offsetS: map?.offsetS ?? 0,
    stamp: map?.stamp ?? 'end',
  };
}

function positionDraft(map: GnssMap['position'] | undefined, headers: readonly string[]): PositionDraft {
  return {
    lat: map?.lat ?? suggestColumn(headers, 'lat'),
    lon: map?.lon ?? suggestColumn(headers, 'lon'),
    height: map ? (map.height ?? '') : suggestColumn(headers, 'height'),
    unit: map?.unit ?? 'deg',
    heightUnit: map?.heightUnit ?? 'm',
    heightDatum: map?.heightDatum ?? 'ellipsoid',
  };
}

function velocityDraft(map: GnssMap['velocity']): VelocityDraft {
  const empty: VelocityDraft = {
    frame: 'none',
    columns: ['', '', ''],
    speed: '',
    course: '',
    unit: 'm/s',
    courseUnit: 'deg',
  };
  return map ? { ...empty, ...map } : empty;
}

function sigmaDraft(map: GnssMap['positionSigma'], unit: SigmaDraft['unit']): SigmaDraft {
  if (!map) return { shape: 'none', columns: ['', '', ''], unit };
  const [first, second, third = ''] = map.columns;
  return {
    shape: map.columns.length === 2 ? 'two' : 'three',
    columns: [first, second, third],
    unit: map.unit,
  };
}

const three = (
  headers: readonly string[],
  channels: readonly [Suggestable, Suggestable, Suggestable],
): [string, string, string] => [
  suggestColumn(headers, channels[0]),
  suggestColumn(headers, channels[1]),
  suggestColumn(headers, channels[2]),
];

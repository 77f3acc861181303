/** Fills the mapping form: from the map in force or guessed, else from what the headers look like. */
import type {
  AidsMap,
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
  AidDraft,
  AidsDraft,
  GnssDraft,
  ImuDraft,
  MapDraft,
  PositionDraft,
  ReferenceDraft,
  SensorExtras,
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
    aids: { known: map.aids !== undefined, ...aidsDraft(map.aids ?? {}) },
  };
}

function imuDraft(map: ImuMap | undefined, headers: readonly string[]): ImuDraft {
  return {
    time: timeDraft(map?.time, headers),
    gyro: map?.gyro.columns ?? three(headers, ['gyroX', 'gyroY', 'gyroZ']),
    gyroUnit: map?.gyro.unit ?? 'rad/s',
    gyroMore: sensorExtras(map?.gyro),
    accel: map?.accel.columns ?? three(headers, ['accelX', 'accelY', 'accelZ']),
    accelUnit: map?.accel.unit ?? 'm/s^2',
    accelMore: sensorExtras(map?.accel),
    accelSign: map?.accel.sign ?? 'specific-force',
    accelTimeFrom: map?.accelTime ? 'own' : 'shared',
    accelTime: timeDraft(map?.accelTime, []),
    sampling: map?.sampling ?? 'mean-rate',
    ...mountingDraft(map),
  };
}

const mountingDraft = (
  map: ImuMap | undefined,
): Pick<ImuDraft, 'axesFrom' | 'axes' | 'mounted' | 'mounting'> => ({
  axesFrom: map?.axes ? 'own' : 'vehicle',
  axes: map?.axes ?? IDENTITY_AXES,
  mounted: map?.mounting ? 'turned' : 'along',
  mounting: map?.mounting ?? { rollDeg: 0, pitchDeg: 0, yawDeg: 0 },
});

function sensorExtras(map: Pick<ImuMap['gyro'], 'file' | 'signs' | 'scale'> | undefined): SensorExtras {
  const sense = (axis: 0 | 1 | 2) => (map?.signs?.[axis] === -1 ? 'turned' : 'kept');
  return { file: map?.file ?? '', signs: [sense(0), sense(1), sense(2)], scale: map?.scale };
}

function aidsDraft({ barometer, heading, odometer }: AidsMap): Omit<AidsDraft, 'known'> {
  return {
    barometer: { ...aidDraft(barometer), unit: barometer?.unit ?? 'm' },
    heading: { ...aidDraft(heading), unit: heading?.unit ?? 'deg', offsetDeg: heading?.offsetDeg },
    odometer: { ...aidDraft(odometer), unit: odometer?.unit ?? 'm/s', scale: odometer?.scale },
  };
}

const aidDraft = (map: AidsMap['barometer'] | AidsMap['heading'] | AidsMap['odometer']): AidDraft => ({
  given: map ? 'yes' : 'no',
  file: map?.file ?? '',
  column: map?.column ?? '',
  sigma: map?.sigma ?? '',
  timeFrom: map?.time ? 'own' : 'shared',
  time: timeDraft(map?.time, []),
});

function gnssDraft(map: GnssMap | undefined, headers: readonly string[]): GnssDraft {
  return {
    time: timeDraft(map?.time, headers),
    position: positionDraft(map?.position, headers),
    velocity: velocityDraft(map?.velocity),
    positionSigma: sigmaDraft(map?.positionSigma, 'm'),
    velocitySigma: sigmaDraft(map?.velocitySigma, 'm/s'),
    quality: map?.quality ?? '',
    repeats: map?.repeats ?? '',
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
    scale: map?.scale ?? '',
    zoneMin: map?.zoneMin,
    dateOrder: map?.dateOrder ?? '',
    date: map?.date ?? '',
    rateHz: map?.rateHz,
    wrap: map?.wrap,
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
    latHemisphere: map?.latHemisphere ?? '',
    lonHemisphere: map?.lonHemisphere ?? '',
  };
}

function velocityDraft(map: GnssMap['velocity']): VelocityDraft {
  const empty: VelocityDraft = {
    frame: 'none',
    columns: ['', '', ''],
    speed: '',
    course: '',
    climb: '',
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

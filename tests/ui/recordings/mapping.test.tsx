import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { draftFromMap } from '@/components/recordings/mapping/draft-from-map';
import { mapDraftSchema } from '@/components/recordings/mapping/map-draft';
import { columnParts } from '@/components/recordings/mapping/column-parts';
import { mapFromDraft } from '@/components/recordings/mapping/map-from-draft';
import { MappingForm } from '@/components/recordings/mapping/MappingForm';
import { channelMapSchema, type ChannelMap, type FilePreview } from '@/shared/contracts/recordings';
import { renderAs } from '../render';
import { recordingOf } from './fixtures';

// A form of thirty choices is drawn again at every change: slow where several test files share a core.
jest.setTimeout(30_000);

const IMU: FilePreview = {
  role: 'imu',
  headers: ['c1', 'c2', 'c3', 'c4', 'c5', 'c6', 'c7'],
  rows: [['0', '0.1', '0.2', '0.3', '0.4', '0.5', '-9.8']],
  missing: ['time', 'gyro x'],
};
const GNSS: FilePreview = {
  role: 'gnss',
  headers: ['week', 'tow', 'lat', 'lon', 'h', 'spd', 'crs', 'eph', 'epv', 'fix'],
  rows: [],
  missing: [],
};
const REFERENCE: FilePreview = { ...GNSS, role: 'reference', headers: ['t', 'lat', 'lon', 'r', 'p', 'y'] };
const MAP: ChannelMap = channelMapSchema.parse({
  imu: {
    time: { columns: ['c1'], base: 'ms', offsetS: -0.5, stamp: 'middle' },
    gyro: { columns: ['c2', 'c3', 'c4'], unit: 'deg/s' },
    accel: { columns: ['c5', 'c6', 'c7'], unit: 'g', sign: 'opposite' },
    sampling: 'instantaneous',
    axes: { forward: '+y', right: '+x', down: '-z' },
  },
  gnss: {
    time: { columns: ['week', 'tow'], base: 'gps-week+s' },
    position: { lat: 'lat', lon: 'lon', height: 'h', heightDatum: 'sea-level' },
    velocity: { frame: 'speed-course', speed: 'spd', course: 'crs', unit: 'kn' },
    positionSigma: { columns: ['eph', 'epv'], unit: 'm' },
    quality: 'fix',
  },
  reference: {
    time: { columns: ['t'], base: 's' },
    position: { lat: 'lat', lon: 'lon' },
    attitude: { columns: ['r', 'p', 'y'], unit: 'rad' },
  },
});
const RECORDING = recordingOf({ channelMap: MAP, previews: [IMU, GNSS, REFERENCE] });

test('a map survives the way through the form unchanged', () => {
  const draft = draftFromMap(RECORDING);
  expect(mapDraftSchema.safeParse(draft).success).toBe(true);
  expect(channelMapSchema.parse(mapFromDraft(draft))).toEqual(MAP);
});

test('whatever else a map says survives too', () => {
  const map: ChannelMap = channelMapSchema.parse({
    imu: {
      ...MAP.imu,
      time: { columns: ['c1'], base: 'counter', rateHz: 32768, wrap: 4294967296 },
      gyro: { ...MAP.imu!.gyro, file: 'imu2', signs: [1, -1, 1], scale: 0.01 },
      accelTime: { columns: ['c1'], base: 'time-of-day', date: '2026-11-03', zoneMin: 60, scale: 'gps' },
      mounting: { rollDeg: 1, pitchDeg: -2, yawDeg: 90 },
    },
    gnss: {
      ...MAP.gnss,
      time: { columns: ['week'], base: 'iso8601', dateOrder: 'dmy', zoneMin: -120, scale: 'utc' },
      position: { ...MAP.gnss!.position, latHemisphere: 'fix', lonHemisphere: 'fix' },
      velocity: { ...MAP.gnss!.velocity, climb: 'epv' },
      repeats: 'drop',
    },
    reference: MAP.reference,
    aids: {
      barometer: { column: 'c2', file: 'imu', unit: 'hPa', sigma: 'c3' },
      heading: { column: 'crs', file: 'gnss', unit: 'deg', offsetDeg: 2.5 },
      odometer: { column: 'c4', unit: 'count', scale: 0.02, time: { columns: ['c1'], base: 'us' } },
    },
  });
  const draft = draftFromMap({ ...RECORDING, channelMap: map });
  expect(mapDraftSchema.safeParse(draft).success).toBe(true);
  expect(channelMapSchema.parse(mapFromDraft(draft))).toEqual(map);
});

test('other sensors that are taken away are said to be none, not left to a guess', () => {
  const draft = draftFromMap({
    ...RECORDING,
    channelMap: { ...MAP, aids: { barometer: { column: 'c2', unit: 'm' } } },
  });
  draft.aids.barometer.given = 'no';
  expect(mapFromDraft(draft).aids).toEqual({});
});

test('each column of the preview says what it is taken for', () => {
  const parts = columnParts(draftFromMap(RECORDING), 'gnss');
  expect(parts.get('week')).toBe('time');
  expect(parts.get('epv')).toBe('position σ vertical');
  expect(columnParts(draftFromMap(RECORDING), 'imu').get('c7')).toBe('accel z');
});

test('a file without a map is filled from its headers as far as they speak', () => {
  const previews = [{ ...IMU, headers: ['stamp', 'gx', 'gyroX', 'gyroY', 'gyroZ', 'ax', 'ay', 'az'] }];
  const { imu } = draftFromMap({ channelMap: null, previews });
  expect(imu?.time.column).toBe('stamp');
  expect(imu?.gyro).toEqual(['gyroX', 'gyroY', 'gyroZ']);
  expect(imu?.accel).toEqual(['ax', 'ay', 'az']);
});

describe('the form', () => {
  const choose = (label: string, value: string) =>
    fireEvent(screen.getByLabelText(label), 'change', { target: { value } });
  const send = () => fireEvent.press(screen.getByRole('button', { name: 'Use this map and decode' }));

  test('names every column that is still missing and sends nothing', async () => {
    const submit = jest.fn();
    renderAs(
      <MappingForm recording={recordingOf({ channelMap: null, previews: [IMU] })} onSubmit={submit} />,
    );
    send();
    expect(await screen.findByText(/marked fields of the IMU file/)).toBeOnTheScreen();
    expect(screen.getAllByText('Choose a column.')).toHaveLength(7);
    expect(submit).not.toHaveBeenCalled();
  });

  test('sends the map once every column has its part', async () => {
    const submit = jest.fn<Promise<void>, [ChannelMap]>(() => Promise.resolve());
    renderAs(
      <MappingForm recording={recordingOf({ channelMap: null, previews: [IMU] })} onSubmit={submit} />,
    );
    const labels = ['Time column', 'Gyro x', 'Gyro y', 'Gyro z'];
    labels.push('Accelerometer x', 'Accelerometer y', 'Accelerometer z');
    labels.forEach((label, i) => choose(label, IMU.headers[i]!));
    choose('Gyro unit', 'deg/s');
    send();
    await waitFor(() => expect(submit).toHaveBeenCalled());
    const sent = channelMapSchema.parse(submit.mock.calls[0]![0]);
    expect(sent.imu?.gyro).toEqual({ columns: ['c2', 'c3', 'c4'], unit: 'deg/s' });
    expect(sent.imu?.accel.sign).toBe('specific-force');
  });

  test('a refusal is told and the choices stay', async () => {
    renderAs(<MappingForm recording={RECORDING} onSubmit={() => Promise.reject(new Error('Not now.'))} />);
    send();
    expect(await screen.findByText('Not now.')).toBeOnTheScreen();
    expect(screen.getByLabelText('Gyro x').props.value).toBe('c2');
  });
});

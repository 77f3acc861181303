import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { draftFromMap } from '@/components/recordings/mapping/draft-from-map';
import { mapDraftSchema } from '@/components/recordings/mapping/map-draft';
import { columnParts, mapFromDraft } from '@/components/recordings/mapping/map-from-draft';
import { MappingForm } from '@/components/recordings/mapping/MappingForm';
import { channelMapSchema, type ChannelMap, type FilePreview } from '@/shared/contracts/recordings';
import { renderAs } from '../render';

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
const RECORDING = { channelMap: MAP, previews: [IMU, GNSS, REFERENCE] };

test('a map survives the way through the form unchanged', () => {
  const draft = draftFromMap(RECORDING);
  expect(mapDraftSchema.safeParse(draft).success).toBe(true);
  expect(channelMapSchema.parse(mapFromDraft(draft))).toEqual(MAP);
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
    renderAs(<MappingForm recording={{ channelMap: null, previews: [IMU] }} onSubmit={submit} />);
    send();
    expect(await screen.findByText(/marked fields of the IMU file/)).toBeOnTheScreen();
    expect(screen.getAllByText('Choose a column.')).toHaveLength(7);
    expect(submit).not.toHaveBeenCalled();
  });

  test('sends the map once every column has its part', async () => {
    const submit = jest.fn<Promise<void>, [ChannelMap]>(() => Promise.resolve());
    renderAs(<MappingForm recording={{ channelMap: null, previews: [IMU] }} onSubmit={submit} />);
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

import { act, fireEvent, screen } from '@testing-library/react-native';
import { fits, fittingParts, misfits, misfitWords } from '@/components/recordings/mapping/map-fit';
import { GuessList } from '@/components/recordings/mapping/GuessList';
import { MappingForm } from '@/components/recordings/mapping/MappingForm';
import { gravityCheck, turnCheck } from '@/components/recordings/mapping/preview-checks';
import { filesOf } from '@/hooks/recordings';
import {
  channelMapSchema,
  type ChannelMap,
  type FilePreview,
  type HealthFinding,
  type MapPreview,
} from '@/shared/contracts/recordings';
import { renderAs } from '../render';
import { recordingOf } from './fixtures';

jest.setTimeout(30_000);

const GRAVITY_RIGHT = /^Gravity: .*along down: right/;

const IMU: FilePreview = {
  role: 'imu',
  headers: ['t', 'a', 'b', 'c', 'd', 'e', 'f'],
  rows: [],
  missing: [],
};
const MAP: ChannelMap = channelMapSchema.parse({
  imu: {
    time: { columns: ['t'], base: 's' },
    gyro: { columns: ['a', 'b', 'c'], unit: 'rad/s' },
    accel: { columns: ['d', 'e', 'f'], unit: 'm/s^2' },
  },
});
const VEHICLE_ID = '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e30';
const IN_G: ChannelMap = { imu: { ...MAP.imu!, accel: { ...MAP.imu!.accel, unit: 'g' } } };
const OTHER_COLUMNS: ChannelMap = { imu: { ...MAP.imu!, time: { ...MAP.imu!.time, columns: ['clock'] } } };
const FINDING: HealthFinding = {
  code: 'gravity-size',
  severity: 'stop',
  sentence: 'The accelerometer shows 1 m/s² instead of about 9.81.',
  figure: null,
  intervalsS: [],
  remedy: 'Set its unit to g.',
  fix: { label: 'Read it in g', map: IN_G },
};

function previewOf(
  force: readonly [number, number, number],
  { findings = [], turnDegPerS = 20 }: { findings?: HealthFinding[]; turnDegPerS?: number } = {},
): MapPreview {
  const channel = (name: string, unit: string, value: number, swing = 0) => ({
    name,
    unit,
    timeS: Array.from({ length: 40 }, (_, i) => i / 10),
    values: Array.from({ length: 40 }, (_, i) => value + (i % 2 === 0 ? swing : -swing)),
  });
  return {
    outcome: 'ready',
    problems: [],
    health: { ...recordingOf().health!, findings },
    series: {
      channels: [
        ...['x', 'y'].map((axis) => channel(`gyro_${axis}`, '°/s', 0)),
        channel('gyro_z', '°/s', 0, turnDegPerS),
        ...['x', 'y', 'z'].map((axis, i) => channel(`accel_${axis}`, 'm/s²', force[i]!, 0.1)),
      ],
    },
  };
}

describe('the checks at a glance', () => {
  test.each([
    [[0, 0, -9.79], 'pine', '9.79 m/s² along down: right'],
    [[0, 0, 9.79], 'ochre', 'along up instead of down'],
    [[-9.8, 0, 0], 'ochre', 'along forward instead of down'],
    [[0, 9.8, 0], 'ochre', 'along left instead of down'],
    [[0, 0, -1.02], 'vermilion', '1.02 m/s² instead of about 9.81'],
    [[0, 0, -10.6], 'ochre', '10.6 m/s² along down, instead of about 9.81'],
  ] as const)('gravity of %j', (force, tone, words) => {
    const check = gravityCheck(previewOf(force));
    expect(check?.tone).toBe(tone);
    expect(check?.words).toContain(words);
  });

  test('turns: agreed, too few, and against GNSS', () => {
    expect(turnCheck(previewOf([0, 0, -9.8]))?.tone).toBe('pine');
    expect(turnCheck(previewOf([0, 0, -9.8], { turnDegPerS: 0.1 }))?.tone).toBe('soft');
    const findings = [{ ...FINDING, code: 'turn-sense' }];
    expect(turnCheck(previewOf([0, 0, -9.8], { findings }))?.tone).toBe('vermilion');
  });

  test('without plots nothing is claimed', () => {
    const blank: MapPreview = { outcome: 'rejected', problems: [], health: null, series: null };
    expect(gravityCheck(blank)).toBeNull();
    expect(turnCheck(blank)).toBeNull();
  });
});

describe('the preview beside the form', () => {
  const original = globalThis.fetch;
  afterEach(() => {
    globalThis.fetch = original;
  });
  /** Answers each preview by what `answer` makes of the map that was sent. */
  function withAnswers(answer: (map: ChannelMap) => Response) {
    const fake = jest.fn((_: unknown, init?: RequestInit) =>
      Promise.resolve(answer(JSON.parse(init?.body as string) as ChannelMap)),
    );
    globalThis.fetch = fake;
    return fake;
  }
  const json = (body: unknown, status = 200) => new Response(JSON.stringify(body), { status });
  const render = () =>
    renderAs(
      <MappingForm
        recording={recordingOf({ channelMap: MAP, previews: [IMU] })}
        onSubmit={() => Promise.resolve()}
      />,
    );

  test('a remedy is put into the form, and the next preview follows it', async () => {
    withAnswers((map) =>
      json(
        map.imu?.accel.unit === 'g'
          ? previewOf([0, 0, -9.79])
          : previewOf([0, 0, -1], { findings: [FINDING] }),
      ),
    );
    render();
    fireEvent.press(await screen.findByRole('button', { name: 'Read it in g' }, { timeout: 5000 }));
    expect(screen.getByLabelText('Accelerometer unit').props.value).toBe('g');
    expect(await screen.findByText(GRAVITY_RIGHT, {}, { timeout: 5000 })).toBeOnTheScreen();
    expect(screen.queryByRole('button', { name: 'Read it in g' })).toBeNull();
  });

  function renderOfVehicle({ earlier = [], templates = [] }: { earlier?: object[]; templates?: object[] }) {
    const answer = (address: string) => {
      if (address.includes('map-templates')) return { items: templates, nextCursor: null };
      if (address.includes('vehicleId=')) return { items: earlier, nextCursor: null };
      return previewOf([0, 0, -9.79]);
    };
    globalThis.fetch = jest.fn((address: string) =>
      Promise.resolve(json(answer(address))),
    ) as unknown as typeof fetch;
    const recording = recordingOf({ channelMap: null, vehicleId: VEHICLE_ID, previews: [IMU] });
    renderAs(<MappingForm recording={recording} onSubmit={() => Promise.resolve()} />);
  }

  test('an earlier mapping of the vehicle fills the form, and can be taken back', async () => {
    const earlier = recordingOf({
      id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e21',
      name: 'Breakwater loop 2',
      channelMap: IN_G,
    });
    const other = { ...earlier, id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e22', channelMap: OTHER_COLUMNS };
    renderOfVehicle({ earlier: [earlier, other] });
    const choice = await screen.findByLabelText(/earlier mapping of/);
    expect(screen.getByText(/One earlier recording has other columns/)).toBeOnTheScreen();
    fireEvent(choice, 'change', { target: { value: earlier.id } });
    expect(screen.getByLabelText('Gyro x').props.value).toBe('a');
    expect(screen.getByLabelText('Accelerometer unit').props.value).toBe('g');
    fireEvent.press(screen.getByRole('button', { name: 'Undo' }));
    expect(screen.getByLabelText('Gyro x').props.value).toBe('');
    expect(await screen.findByText('waits for the form')).toBeOnTheScreen();
  });

  test('a template fills the form; one of other columns says which are missing and changes nothing', async () => {
    const template = {
      id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e41',
      vehicleId: VEHICLE_ID,
      name: 'Autumn logger',
      channelMap: IN_G,
      createdAt: '2026-11-03T08:00:00Z',
      createdBy: 'Maren Holt',
    };
    const other = { ...template, id: `${template.id.slice(0, -1)}2`, channelMap: OTHER_COLUMNS };
    renderOfVehicle({ templates: [template, other] });
    const choice = await screen.findByLabelText(/Use a template/);
    fireEvent(choice, 'change', { target: { value: other.id } });
    expect(screen.getByText(/The IMU file lacks “/)).toBeOnTheScreen();
    expect(screen.getByLabelText('Gyro x').props.value).toBe('');
    fireEvent(choice, 'change', { target: { value: template.id } });
    expect(screen.queryByText(/The IMU file lacks/)).toBeNull();
    expect(screen.getByLabelText('Gyro x').props.value).toBe('a');
  });

  test('problems say where, what and what to do', async () => {
    const problem = {
      code: 'bad-number',
      file: 'imu',
      line: 12,
      column: 'b',
      message: 'Line 12 holds text.',
      remedy: 'Remove the line.',
    };
    withAnswers(() => json({ outcome: 'rejected', problems: [problem], health: null, series: null }));
    render();
    expect(await screen.findByText('IMU file · line 12 · column b', {}, { timeout: 5000 })).toBeOnTheScreen();
    expect(screen.getByText('Remove the line.')).toBeOnTheScreen();
  });

  test('a refusal because of a newer preview is asked again, and not shown', async () => {
    const refusal = {
      type: 'urn:driftwright:problem:conflict',
      title: 'Conflict',
      status: 409,
      detail: 'A newer preview took its place.',
    };
    let asked = 0;
    withAnswers(() => (++asked === 1 ? json(refusal, 409) : json(previewOf([0, 0, -9.79]))));
    render();
    expect(await screen.findByText(GRAVITY_RIGHT, {}, { timeout: 8000 })).toBeOnTheScreen();
    expect(screen.queryByText(/newer preview/)).toBeNull();
    expect(asked).toBe(2);
  });

  test('while a column is missing nothing is asked', async () => {
    const fake = withAnswers(() => json(previewOf([0, 0, -9.79])));
    renderAs(
      <MappingForm
        recording={recordingOf({ channelMap: null, previews: [IMU] })}
        onSubmit={() => Promise.resolve()}
      />,
    );
    expect(screen.getByText('waits for the form')).toBeOnTheScreen();
    await act(() => Promise.resolve());
    expect(fake).not.toHaveBeenCalled();
  });
});

test('a doubtful guess says check, with its reason; the others wait behind a press', () => {
  const guess = {
    channel: 'time',
    columns: ['t'],
    takenAs: 's',
    confidence: 0.9,
    reason: 'Its header says so.',
  };
  const doubtful = {
    channel: 'gyro',
    columns: ['a', 'b', 'c'],
    takenAs: 'deg/s',
    confidence: 0.4,
    reason: 'By size alone.',
  };
  renderAs(<GuessList guesses={[guess, doubtful]} />);
  expect(screen.getAllByText('check')).toHaveLength(1);
  expect(screen.getByText('Gyro: a, b, c, taken as °/s')).toBeOnTheScreen();
  expect(screen.queryByText('Its header says so.')).toBeNull();
  fireEvent.press(screen.getByRole('button', { name: 'Taken without doubt: time' }));
  expect(screen.getByText('Its header says so.')).toBeOnTheScreen();
});

describe('an earlier map', () => {
  test('fits where every column that it names is there', () => {
    expect(fits(MAP, [IMU])).toBe(true);
    expect(fits(MAP, [{ ...IMU, headers: IMU.headers.slice(1) }])).toBe(false);
  });
  test('does not fit a file that it says nothing of, nor lacks one that it needs', () => {
    expect(fits(MAP, [IMU, { ...IMU, role: 'gnss' }])).toBe(false);
    expect(fits({ ...MAP, aids: { barometer: { column: 'baro', unit: 'm' } } }, [IMU])).toBe(false);
  });
  test('sensors in two files are looked for in both', () => {
    const [first, second] = [
      { ...IMU, headers: ['t', 'a', 'b', 'c'] },
      { ...IMU, role: 'imu2' as const, headers: ['d', 'e', 'f'] },
    ];
    expect(fits(MAP, [first, second])).toBe(true);
    expect(fits(MAP, [first])).toBe(false);
  });
  test('that fits in part says which columns are missing, and gives the rest', () => {
    const map = { ...MAP, aids: { barometer: { column: 'baro', unit: 'm' as const } } };
    expect(misfits(map, [IMU]).map(misfitWords)).toEqual(['the files lack “baro”']);
    expect(Object.keys(fittingParts(map, [IMU]))).toEqual(['imu']);
    const shorter = { ...IMU, headers: IMU.headers.slice(2) };
    expect(misfits(MAP, [shorter]).map(misfitWords)).toEqual([
      `the IMU file lacks “${IMU.headers[0]}”, “${IMU.headers[1]}”`,
    ]);
    expect(fittingParts(MAP, [shorter])).toEqual({});
  });
});

test('an upload names each file by its part, and leaves out what was not chosen', () => {
  const file = (name: string) => new File(['x'], name);
  const sent = filesOf({ meta: { name: 'x' }, imu: file('both.csv'), aids: file('baro.csv') });
  expect(sent.map(([role, { name }]) => [role, name])).toEqual([
    ['imu', 'both.csv'],
    ['aids', 'baro.csv'],
  ]);
});

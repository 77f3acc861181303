import { placeOf } from '@/components/recordings/ProblemsCard';
import { statusWord } from '@/components/recordings/status';
import { times } from '@/components/recordings/HealthCard';
import { nameFromFile } from '@/components/recordings/UploadScreen';
import { recordingOf } from './fixtures';

test.each([
  [recordingOf(), 'with care', 'ochre'],
  [recordingOf({ status: 'decoding', progress: 0.42 }), 'decoding 42 %', 'petrol'],
  [recordingOf({ status: 'needs-mapping' }), 'needs mapping', 'ochre'],
  [recordingOf({ status: 'rejected' }), 'rejected', 'vermilion'],
])('a recording in a word (%#)', (recording, word, tone) => {
  expect(statusWord(recording)).toEqual({ word, tone });
});

test('a problem says in which line and column', () => {
  const problem = { code: 'x', file: 'imu', line: 121, column: 'gyro_x', message: '', remedy: '' } as const;
  expect(placeOf(problem)).toBe('IMU file · line 121 · column gyro_x');
  expect(placeOf({ ...problem, line: null, column: null })).toBe('IMU file');
});

test('a finding names its first times and counts the rest', () => {
  expect(
    times([
      [420, 480],
      [800, 800.2],
      [900, 901],
      [1000, 1001],
      [1100, 1101],
    ]),
  ).toBe('7:00–8:00, 13:20, 15:00–15:01 and 2 more');
});

test.each([
  ['breakwater_loop-3_imu.csv.gz', 'Breakwater loop 3'],
  ['imu.csv', ''],
  ['Quay wall.txt', 'Quay wall'],
])('%s suggests the name "%s"', (file, name) => {
  expect(nameFromFile(file)).toBe(name);
});

import { recordingSchema, type Recording } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import { type Api, startApi, until } from '../support/api';
import { buildMember, decoded, upload } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';

type Cells = string[][];
const table = (text: string): Cells => text.trimEnd().split('\n').map((line) => line.split(',')); // prettier-ignore
const csv = (rows: Cells) => `${rows.map((row) => row.join(',')).join('\n')}\n`;
const part = (rows: Cells, ...columns: number[]) => csv(rows.map((row) => columns.map((i) => row[i]!)));

/** Rows of both sensors in one table, each with its cells and empty ones for the other, by time. */
function merged(imu: Cells, gnss: Cells): string {
  const blanks = (count: number) => Array.from({ length: count }, () => '');
  const header = [...imu[0]!, ...gnss[0]!.slice(1)];
  const rows = [
    ...imu.slice(1).map((row) => [...row, ...blanks(6)]),
    ...gnss.slice(1).map(([time, ...cells]) => [time!, ...blanks(6), ...cells]),
  ];
  return csv([header, ...rows.sort((a, b) => Number(a[0]) - Number(b[0]))]);
}

describe('an upload of other files than one IMU and one GNSS log', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const { imu, gnss } = smallLogs();
  const rows = table(imu);

  async function sent(files: Record<string, string>) {
    const engineer = await buildMember(api, 'engineer');
    const form = new FormData();
    form.set('meta', JSON.stringify({ name: 'Breakwater in parts' }));
    for (const [role, text] of Object.entries(files)) form.set(role, new Blob([text]), `${role}.csv`);
    const answer = await engineer.post('/recordings', form);
    expect(answer.status).toBe(201);
    const recording = await decoded(engineer, recordingSchema.parse(answer.body).id);
    return { engineer, recording, plain: await decoded(engineer, (await upload(engineer)).id) };
  }

  const sameData = ({ recording, plain }: { recording: Recording; plain: Recording }) => {
    expect(recording.status).toBe('ready');
    expect([recording.startS, recording.endS]).toEqual([plain.startS, plain.endS]);
    expect(recording.health?.imu).toEqual(plain.health?.imu);
    expect(recording.health?.gnss).toEqual(plain.health?.gnss);
    expect(recording.strip).toEqual(plain.strip);
  };

  it('may bring gyro and accelerometer apart', async () => {
    const both = await sent({ imu: part(rows, 0, 1, 2, 3), imu2: part(rows, 0, 4, 5, 6), gnss });
    sameData(both);
    expect(both.recording.files.map(({ role }) => role)).toEqual(['imu', 'gnss', 'imu2']);
    expect(both.recording.channelMap?.imu?.accel.file).toBe('imu2');
    expect(both.recording.previews.find(({ role }) => role === 'imu')?.guesses?.length).toBeGreaterThan(2);
  });

  it('may bring one log that holds both', async () => {
    const both = await sent({ imu: merged(rows, table(gnss)) });
    sameData(both);
    expect(both.recording.files.map(({ role }) => role)).toEqual(['imu']);
  });

  it('may bring a barometer, which is told of', async () => {
    const baro = csv([['time_s', 'baro_height_m'], ...Array.from({ length: 80 }, (_, k) => [`${k}`, `${40 + k / 10}`])]); // prettier-ignore
    const both = await sent({ imu, gnss, aids: baro });
    expect(both.recording.health?.findings).toContainEqual(
      expect.objectContaining({ code: 'aid', figure: { value: 80, unit: 'readings' } }),
    );
  });

  it('without any fixes serves for the sensor’s noise, and says why it cannot be run', async () => {
    const { engineer, recording } = await sent({ imu });
    expect(recording.status).toBe('ready');
    expect(recording.health?.verdict).toBe('with-care');
    expect(recording.health?.findings.map(({ code }) => code)).toContain('no-gnss');
    expect((await engineer.post(`/recordings/${recording.id}/noise`, {})).status).toBe(200);
    const run = (await engineer.post('/runs', { recordingId: recording.id })).body as Run;
    const ended = await until('the run has ended', async () => {
      const { state, failure } = (await engineer.get(`/runs/${run.id}`)).body as Run;
      return state === 'failed' && failure;
    });
    expect(ended).toContain('GNSS');
  });
});

import { decodeFrame } from '@/shared/contracts/frames';
import type { Series } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import { tilesOf } from '@/hooks/finer/tiles';
import { startApi, until, type Api } from '../support/api';
import { buildMember, decoded, upload } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';

jest.setTimeout(120_000);

/** 40 minutes at 25 Hz: one gyro sample leaps, and one fix lies far off. */
const SCENARIO = { durationS: 2400, imuRateHz: 25, gnssRateHz: 1, staticStartS: 20, seed: 5 };
const POINTS = 500;

function withCell(csv: string, row: number, column: number, change: (value: number) => number) {
  const lines = csv.split('\n');
  const cells = lines[row + 1]!.split(',');
  cells[column] = String(change(Number(cells[column])));
  lines[row + 1] = cells.join(',');
  return { csv: lines.join('\n'), timeS: Number(cells[0]) };
}

describe('a spike of one sample in a long log', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let recordingId: string;
  let startS: number;
  let endS: number;
  const logs = smallLogs(SCENARIO);
  const gyro = withCell(logs.imu, 31_234, 3, () => 4);
  const fix = withCell(logs.gnss, 1500, 1, (latDeg) => latDeg + 0.002);
  beforeAll(async () => {
    api = await startApi({ WORKERS: '1' });
    engineer = await buildMember(api, 'engineer');
    const { id } = await upload(engineer, {}, { imu: gyro.csv, gnss: fix.csv });
    const recording = await decoded(engineer, id);
    expect(recording.status).toBe('ready');
    recordingId = id;
    ({ startS, endS } = recording.strip!);
  });
  afterAll(() => api.stop());

  const channel = async (query: string) => {
    const answer = await engineer.get(
      `/recordings/${recordingId}/series?channels=gyro_z&points=${POINTS}${query}`,
    );
    return (answer.body as Series).channels[0]!;
  };
  /** Time of the largest value by size, and that value. */
  const peak = (timeS: ArrayLike<number>, values: ArrayLike<number | null>) => {
    let at = 0;
    for (let i = 0; i < timeS.length; i++) if (Math.abs(values[i] ?? 0) > Math.abs(values[at] ?? 0)) at = i;
    return { timeS: timeS[at]!, value: values[at]! };
  };
  /** A view about `timeS` at each level, and what it asks for. */
  const levels = (timeS: number) =>
    [1, 3, 6, 9].map((level) => {
      const span = (endS - startS) / 2 ** level;
      return tilesOf([timeS - span / 3, timeS + span / 3], [startS, endS]).find(
        (tile) => timeS >= tile.fromS && timeS <= tile.toS,
      )!;
    });

  it('of a channel is there at full view and, at every level of zoom, at its sample’s time and value', async () => {
    const whole = await channel('');
    expect(whole.timeS.length).toBeLessThanOrEqual(POINTS + 2);
    const expected = { timeS: gyro.timeS, value: expect.closeTo((4 * 180) / Math.PI, 3) as number };
    expect(peak(whole.timeS, whole.values)).toEqual(expected);
    for (const { fromS, toS } of levels(gyro.timeS)) {
      const piece = await channel(`&from=${fromS}&to=${toS}`);
      expect(peak(piece.timeS, piece.values)).toEqual(expected);
    }
    const [finest] = levels(gyro.timeS).slice(-1);
    const { timeS } = await channel(`&from=${finest!.fromS}&to=${finest!.toS}`);
    expect(timeS).toContain(gyro.timeS);
    expect(timeS.length).toBeGreaterThan(100);
  });

  it('of a run’s innovations likewise; the finest pieces say that nothing was left out', async () => {
    const made = await engineer.post('/runs', { recordingId });
    const { id } = made.body as Run;
    const run = await until('the run ends', async () => {
      const body = (await engineer.get(`/runs/${id}`)).body as Run;
      return ['done', 'failed'].includes(body.state) && body;
    });
    expect(run.state).toBe('done');
    const series = async (query: string) =>
      decodeFrame((await engineer.get(`/runs/${id}/series?points=${POINTS}${query}`)).bytes);
    const north = ({ tables }: Awaited<ReturnType<typeof series>>) =>
      peak(tables.position!.time_s, tables.position!.n_m);
    const whole = await series('');
    const found = north(whole);
    expect(whole.head.whole).toBe(false);
    expect(found.timeS).toBeCloseTo(fix.timeS, 6);
    expect(found.value).toBeGreaterThan(150);
    const wholes: (boolean | undefined)[] = [];
    for (const { fromS, toS } of levels(fix.timeS)) {
      const piece = await series(`&from=${fromS}&to=${toS}`);
      expect(north(piece)).toEqual(found);
      wholes.push(piece.head.whole);
    }
    expect(wholes).toEqual([false, false, true, true]);
  });
});

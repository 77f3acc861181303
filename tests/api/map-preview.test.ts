import type { MapPreview } from '@/shared/contracts/recordings';
import { mapPreviewSchema } from '@/shared/contracts/recordings';
import { type Api, startApi } from '../support/api';
import { buildMember, buildRecording, decoded, upload } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';
import { filesBelow } from '../support/api-traces';

describe('the preview of a channel map', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('shows what a map makes of the first rows and changes nothing', async () => {
    const engineer = await buildMember(api, 'engineer');
    const recording = await buildRecording(engineer);
    const files = filesBelow(api.ctx.config.dataDir);
    const preview = async (map: object) => {
      const answer = await engineer.post(`/recordings/${recording.id}/map-preview`, map);
      expect(answer.status).toBe(200);
      return mapPreviewSchema.parse(answer.body);
    };
    const asItIs = await preview(recording.channelMap!);
    expect(asItIs.outcome).toBe('ready');
    expect(asItIs.series?.channels.map(({ name }) => name)).toEqual([
      'gyro_x', 'gyro_y', 'gyro_z', 'accel_x', 'accel_y', 'accel_z',
    ]); // prettier-ignore
    const imu = recording.channelMap!.imu!;
    const inG = await preview({
      ...recording.channelMap,
      imu: { ...imu, accel: { ...imu.accel, unit: 'g' } },
    });
    expect(inG.health?.findings.map(({ code }) => code)).toContain('gravity-size');
    const unknown = await preview({
      ...recording.channelMap,
      imu: { ...imu, time: { ...imu.time, columns: ['clock'] } },
    });
    expect(unknown.outcome).not.toBe('ready');
    expect(unknown.problems[0]?.message).toContain('clock');
    expect((await decoded(engineer, recording.id)).health?.verdict).toBe('usable');
    expect(filesBelow(api.ctx.config.dataDir).sort()).toEqual(files.sort());
  });

  it('serves a recording whose headers say nothing', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { imu, gnss } = smallLogs();
    const nameless = imu.replace(/^[^\n]*/, 't,a,b,c,d,e,f');
    const { id } = await decoded(engineer, (await upload(engineer, {}, { imu: nameless, gnss })).id);
    const map = {
      imu: {
        time: { columns: ['t'], base: 's' },
        gyro: { columns: ['a', 'b', 'c'], unit: 'rad/s' },
        accel: { columns: ['d', 'e', 'f'], unit: 'm/s^2' },
      },
    };
    const { outcome } = (await engineer.post(`/recordings/${id}/map-preview`, map)).body as MapPreview;
    expect(outcome).toBe('ready');
  });

  it('is for those who may map', async () => {
    const engineer = await buildMember(api, 'engineer');
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const recording = await buildRecording(engineer);
    const post = (by: typeof viewer) =>
      by.post(`/recordings/${recording.id}/map-preview`, recording.channelMap!);
    expect((await post(viewer)).status).toBe(403);
    expect((await post(await buildMember(api, 'admin'))).status).toBe(404);
  });
});

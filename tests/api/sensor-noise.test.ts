import type { NoiseAnalysis } from '@/shared/contracts/noise';
import { noiseAnalysisSchema } from '@/shared/contracts/noise';
import type { Vehicle } from '@/shared/contracts/vehicles';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';

describe('sensor noise', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('is found in the stretch at rest before a drive, or in a chosen one; a viewer may look', async () => {
    const engineer = await buildMember(api, 'engineer');
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const { id } = await buildRecording(engineer);
    const answer = await viewer.post(`/recordings/${id}/noise`, {});
    expect(answer.status).toBe(200);
    const found = noiseAnalysisSchema.parse(answer.body);
    expect(found.axes).toHaveLength(6);
    expect(found.fromS).toBeLessThan(1);
    expect(found.toS).toBeLessThanOrEqual(10);
    const part = (await viewer.post(`/recordings/${id}/noise`, { fromS: 2, toS: 7 })).body as NoiseAnalysis;
    expect([part.fromS, part.toS]).toEqual([2, 7]);
  });

  it('says what is wrong with a stretch, and is not there for another workspace', async () => {
    const engineer = await buildMember(api, 'engineer');
    const outsider = await buildMember(api, 'admin');
    const { id } = await buildRecording(engineer);
    const refused = async (body: object) => {
      const answer = await engineer.post(`/recordings/${id}/noise`, body);
      expect(answer.status).toBe(422);
      return problemOf(answer);
    };
    expect((await refused({ fromS: 5 })).errors?.[0]?.path).toBe('toS');
    expect((await refused({ fromS: 5, toS: 4 })).errors?.[0]?.path).toBe('toS');
    expect((await refused({ fromS: 5, toS: 5.2 })).detail).toContain('Choose a longer one');
    expect((await outsider.post(`/recordings/${id}/noise`, {})).status).toBe(404);
  });

  it('is kept in the vehicle’s sensor model, beside the datasheet', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer);
    const recording = await buildRecording(engineer);
    const noise = (await engineer.post(`/recordings/${recording.id}/noise`, {})).body as NoiseAnalysis;
    const { fromS, toS, figures } = noise;
    const measured = {
      ...figures,
      recordingId: recording.id,
      recordingName: recording.name,
      fromS,
      toS,
      measuredAt: '2031-03-01T10:00:00.000Z',
    };
    const datasheet = { gyro: { whiteNoiseRadPerSqrtS: 1e-4 } };
    const answer = await engineer.patch(`/vehicles/${id}`, {
      sensor: { name: 'IMU 7', datasheet, measured },
    });
    expect(answer.status).toBe(200);
    const { sensor } = (await engineer.get(`/vehicles/${id}`)).body as Vehicle;
    expect(sensor?.measured).toEqual(measured);
    expect(sensor?.datasheet?.gyro.whiteNoiseRadPerSqrtS).toBe(1e-4);
    expect(sensor?.datasheet?.accel.turnOnBiasSigmaMPerS2).toBeNull();
    const negative = { sensor: { datasheet: { gyro: { whiteNoiseRadPerSqrtS: -1 } } } };
    expect((await engineer.patch(`/vehicles/${id}`, negative)).status).toBe(422);
    expect((await engineer.patch(`/vehicles/${id}`, { sensor: null })).body).toMatchObject({ sensor: null });
  });
});

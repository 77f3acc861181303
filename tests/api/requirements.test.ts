import type { AuditEntry } from '@/shared/contracts/accounts';
import type { Recording } from '@/shared/contracts/recordings';
import type { Requirement } from '@/shared/contracts/requirements';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';

describe('requirements', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let recording: Recording;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
    recording = await buildRecording(engineer);
  });
  afterAll(() => api.stop());

  const drift = (overrides: object = {}) => ({
    name: 'Drift after 30 s',
    metric: { kind: 'drift', quantity: 'horizontal', afterS: 30, statistic: 'p95' },
    comparison: 'at-most',
    limit: 15,
    recordingIds: [recording.id],
    schedule: { kind: 'every', everyS: 60, forS: 30 },
    ...overrides,
  });
  const faults = async (body: object) => {
    const answer = await engineer.post('/requirements', body);
    expect(answer.status).toBe(422);
    return problemOf(answer).errors?.map((error) => error.path);
  };

  it('are written, read in words, changed and deleted, each of it audited', async () => {
    const vehicle = await buildVehicle(engineer);
    const made = await engineer.post('/requirements', drift({ vehicleId: vehicle.id }));
    expect(made.status).toBe(201);
    const requirement = made.body as Requirement;
    expect(requirement).toMatchObject({
      unit: 'm',
      sentence: 'Horizontal drift after 30 s of coasting, 95th percentile: at most 15\u00a0m',
      vehicleName: vehicle.name,
      recordings: [{ id: recording.id, name: recording.name }],
      schedule: { kind: 'every', everyS: 60, forS: 30, firstAfterS: 60, withhold: 'gnss' },
    });
    const path = `/requirements/${requirement.id}`;
    const changed = await engineer.patch(path, { limit: 12.5 });
    expect(changed.body).toMatchObject({
      limit: 12.5,
      name: 'Drift after 30 s',
      recordingIds: [recording.id],
    });
    expect((await engineer.get(path)).body).toEqual(changed.body);
    expect((await engineer.delete(`/vehicles/${vehicle.id}`)).status).toBe(409);
    expect((await engineer.delete(path)).status).toBe(204);
    expect((await engineer.get(path)).status).toBe(404);
    const admin = await buildMember(api, 'admin', engineer.workspaceId);
    const { items } = (await admin.get('/audit?search=requirement.')).body as { items: AuditEntry[] };
    expect(items.map((entry) => entry.action)).toEqual([
      'requirement.deleted',
      'requirement.changed',
      'requirement.created',
    ]);
    expect(items[1]?.detail).toMatchObject({ before: { limit: 15 }, after: { limit: 12.5 } });
  });

  it('are listed for a vehicle with those of the workspace', async () => {
    const [one, other] = [await buildVehicle(engineer), await buildVehicle(engineer)];
    const add = async (name: string, vehicleId: string | null) =>
      expect((await engineer.post('/requirements', drift({ name, vehicleId }))).status).toBe(201);
    await add('B of the first', one.id);
    await add('C of the other', other.id);
    await add('A for all', null);
    const { items } = (await engineer.get(`/requirements?vehicleId=${one.id}`)).body as {
      items: Requirement[];
    };
    expect(items.map((item) => item.name)).toEqual(['A for all', 'B of the first']);
    expect((await engineer.post('/requirements', drift({ name: 'a FOR all' }))).status).toBe(409);
  });

  it('say what cannot be judged', async () => {
    expect(await faults(drift({ schedule: { kind: 'none' } }))).toEqual(['schedule']);
    expect(await faults(drift({ schedule: { kind: 'every', everyS: 10, forS: 30 } }))).toEqual([
      'schedule.everyS',
    ]);
    const after = (afterS: number) => ({ ...drift().metric, afterS });
    expect(await faults(drift({ metric: after(60) }))).toEqual(['metric.afterS']);
    expect(await faults(drift({ metric: after(25) }))).toEqual(['metric.afterS']);
    expect(await faults(drift({ limit: null }))).toEqual(['limit']);
    expect(await faults(drift({ comparison: 'inside-bounds' }))).toEqual(['comparison', 'limit']);
    const share = { kind: 'rejected-share', group: 'position' };
    expect(await faults(drift({ metric: share, limit: 5 }))).toEqual(['limit']);
    expect(await faults(drift({ recordingIds: [] }))).toEqual(['recordingIds']);
    expect(await faults(drift({ metric: { kind: 'speed' } }))).toEqual(['metric.kind']);
  });

  it('name nothing of another workspace, and stay in their own', async () => {
    const elsewhere = await buildMember(api, 'admin');
    const vehicle = await buildVehicle(elsewhere);
    const foreign = drift({ vehicleId: vehicle.id, recordingIds: [recording.id, vehicle.id], name: 'x' });
    expect(await faults(foreign)).toEqual(['vehicleId', 'recordingIds.1']);
    const { id } = (await engineer.post('/requirements', drift({ name: 'Ours' }))).body as Requirement;
    expect((await elsewhere.get(`/requirements/${id}`)).status).toBe(404);
    expect((await elsewhere.patch(`/requirements/${id}`, { limit: 1 })).status).toBe(404);
    expect((await elsewhere.delete(`/requirements/${id}`)).status).toBe(404);
  });

  it('keep the recordings that they are judged on', async () => {
    const own = await buildRecording(engineer);
    const body = drift({ name: 'Keeps it', recordingIds: [own.id] });
    const { id } = (await engineer.post('/requirements', body)).body as Requirement;
    const refused = await engineer.delete(`/recordings/${own.id}`);
    expect(refused.status).toBe(409);
    expect(problemOf(refused).detail).toContain('Keeps it');
    await engineer.delete(`/requirements/${id}`);
    expect((await engineer.delete(`/recordings/${own.id}`)).status).toBe(204);
  });
});

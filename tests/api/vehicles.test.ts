import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildVehicle, buildWorkspace } from '../support/api-factories';

describe('vehicles', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('keeps what an engineer adds, with defaults filled in', async () => {
    const engineer = await buildMember(api, 'engineer');
    const answer = await engineer.post('/vehicles', { name: ' Crawler 1 ', leverArmM: [0.4, 0, -0.9] });
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({
      name: 'Crawler 1',
      kind: 'other',
      leverArmM: [0.4, 0, -0.9],
      axes: { forward: '+x', right: '+y', down: '+z' },
      recordingCount: 0,
    });
    const { id } = answer.body as { id: string };
    expect((await engineer.get(`/vehicles/${id}`)).body).toEqual(answer.body);
    const audit = await api.ctx.db.AuditEntry.findAll({ where: { action: 'vehicle.created' } });
    expect(audit.map((entry) => entry.subject)).toContain('Crawler 1');
  });

  it('changes only what a patch names', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer, { kind: 'marine', notes: 'Tall mast.' });
    const answer = await engineer.patch(`/vehicles/${id}`, { leverArmM: [1, 2, 3] });
    expect(answer.status).toBe(200);
    expect(answer.body).toMatchObject({ kind: 'marine', notes: 'Tall mast.', leverArmM: [1, 2, 3] });
  });

  it('refuses a mirrored axis map and names the field', async () => {
    const engineer = await buildMember(api, 'engineer');
    const axes = { forward: '+x', right: '-y', down: '+z' };
    const answer = await engineer.post('/vehicles', { name: 'Crawler 3', axes });
    expect(answer.status).toBe(422);
    const { errors, detail } = problemOf(answer);
    expect(errors).toEqual([{ path: 'axes', message: expect.stringContaining('right-handed') as string }]);
    expect(detail).toContain('axes');
  });

  it('refuses a field that it does not know instead of dropping it', async () => {
    const engineer = await buildMember(api, 'engineer');
    const answer = await engineer.post('/vehicles', { name: 'Crawler 3', leverArm: [1, 2, 3] });
    expect(answer.status).toBe(422);
    expect(problemOf(answer).errors?.[0]?.path).toBe('leverArm');
  });

  it('refuses a name that is taken in the workspace, whatever its case', async () => {
    const engineer = await buildMember(api, 'engineer');
    await buildVehicle(engineer, { name: 'Shore van' });
    const answer = await engineer.post('/vehicles', { name: 'SHORE VAN' });
    expect(answer.status).toBe(409);
    expect(problemOf(answer).errors?.[0]?.path).toBe('name');
    const elsewhere = await buildMember(api, 'engineer');
    expect((await elsewhere.post('/vehicles', { name: 'Shore van' })).status).toBe(201);
  });

  it('pages by name, finds by part of a name, and refuses a foreign cursor', async () => {
    const engineer = await buildMember(api, 'engineer');
    for (const name of ['Barge 1', 'Barge 2', 'Crawler 9']) await buildVehicle(engineer, { name });
    const names = (body: unknown) => (body as { items: { name: string }[] }).items.map((item) => item.name);
    const first = await engineer.get('/vehicles?limit=2');
    expect(names(first.body)).toEqual(['Barge 1', 'Barge 2']);
    const { nextCursor } = first.body as { nextCursor: string };
    const second = await engineer.get(`/vehicles?limit=2&cursor=${nextCursor}`);
    expect(names(second.body)).toEqual(['Crawler 9']);
    expect(second.body).toMatchObject({ nextCursor: null });
    expect(names((await engineer.get('/vehicles?search=barge')).body)).toEqual(['Barge 1', 'Barge 2']);
    expect(names((await engineer.get('/vehicles?search=%25')).body)).toEqual([]);
    const bad = await engineer.get('/vehicles?cursor=bm9uc2Vuc2U');
    expect(bad.status).toBe(422);
    expect(problemOf(bad).errors?.[0]?.path).toBe('cursor');
  });

  it('sorts and filters by kind', async () => {
    const engineer = await buildMember(api, 'engineer');
    for (const [name, kind] of [
      ['Barge', 'marine'],
      ['Van', 'road'],
      ['Coaster', 'marine'],
    ] as const)
      // prettier-ignore
      await buildVehicle(engineer, { name, kind });
    const names = async (query: string) =>
      ((await engineer.get(`/vehicles?${query}`)).body as { items: { name: string }[] }).items.map(
        (item) => item.name,
      );
    expect(await names('sort=-createdAt')).toEqual(['Coaster', 'Van', 'Barge']);
    expect(await names('sort=-name&kind=marine')).toEqual(['Coaster', 'Barge']);
    expect((await engineer.get('/vehicles?sort=colour')).status).toBe(422);
  });

  it('pages by names as long as they may be', async () => {
    const engineer = await buildMember(api, 'engineer');
    for (const end of ['a', 'b']) await buildVehicle(engineer, { name: 'Ω'.repeat(119) + end });
    const first = (await engineer.get('/vehicles?limit=1')).body as { nextCursor: string };
    const second = await engineer.get(`/vehicles?limit=1&cursor=${first.nextCursor}`);
    expect(second.body).toMatchObject({ items: [{ name: 'Ω'.repeat(119) + 'b' }], nextCursor: null });
  });

  it('lets a viewer read and refuses changes by role', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer);
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    expect((await viewer.get(`/vehicles/${id}`)).status).toBe(200);
    const refusals = [
      await viewer.post('/vehicles', { name: 'Crawler 3' }),
      await viewer.patch(`/vehicles/${id}`, { notes: 'x' }),
      await viewer.delete(`/vehicles/${id}`),
    ];
    for (const refusal of refusals) {
      expect(refusal.status).toBe(403);
      expect(problemOf(refusal).detail).toContain('viewer');
    }
  });

  it('answers another workspace’s vehicle as one that does not exist', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer);
    const outsider = await buildMember(api, 'admin');
    for (const method of ['GET', 'PATCH', 'DELETE']) {
      const body = method === 'PATCH' ? { notes: 'x' } : undefined;
      expect((await outsider.send(method, `/vehicles/${id}`, body)).status).toBe(404);
    }
    const named = await outsider.send('GET', '/vehicles', undefined, { 'X-Workspace': engineer.workspaceId });
    expect(named.status).toBe(404);
    expect((await engineer.get(`/vehicles/${id}`)).status).toBe(200);
  });

  it('deletes what nothing uses, and says what uses the rest', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer);
    const set = { name: 'Harbour set', vehicleId: id, version: { note: 'First.', parameters: {} } };
    expect((await engineer.post('/parameter-sets', set)).status).toBe(201);
    const refused = await engineer.delete(`/vehicles/${id}`);
    expect(refused.status).toBe(409);
    expect(problemOf(refused).detail).toContain('1 parameter set');
    const free = await buildVehicle(engineer);
    expect((await engineer.delete(`/vehicles/${free.id}`)).status).toBe(204);
    expect((await engineer.get(`/vehicles/${free.id}`)).status).toBe(404);
  });

  it('asks a member of several workspaces to name one', async () => {
    const engineer = await buildMember(api, 'engineer');
    const other = await buildWorkspace(api);
    await api.ctx.db.Membership.create({ workspaceId: other.id, userId: engineer.userId, role: 'viewer' });
    const named = engineer.workspaceId;
    engineer.workspaceId = null as unknown as string;
    const answer = await engineer.get('/vehicles');
    expect(answer.status).toBe(400);
    expect(problemOf(answer).type).toBe('urn:driftwright:problem:workspace-required');
    expect((await engineer.get(`/vehicles?workspace=${named}`)).status).toBe(200);
  });
});

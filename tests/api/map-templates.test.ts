import type { Page } from '@/shared/contracts/common';
import { mapTemplateSchema, type MapTemplate } from '@/shared/contracts/map-templates';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';

const channelMap = {
  gnss: {
    time: { columns: ['t'], base: 's' },
    position: { lat: 'lat', lon: 'lon' },
  },
};

describe('templates of a channel map', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('are kept with their vehicle, newest first, with author and an audit entry', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id, name } = await buildVehicle(engineer);
    const other = await buildVehicle(engineer);
    const made = await engineer.post(`/vehicles/${id}/map-templates`, { name: ' Old logger ', channelMap });
    expect(made.status).toBe(201);
    expect(mapTemplateSchema.parse(made.body)).toMatchObject({
      vehicleId: id,
      name: 'Old logger',
      // Defaults are filled in, so that a template does not change with them.
      channelMap: { gnss: { position: { unit: 'deg', heightDatum: 'ellipsoid' } } },
    });
    await engineer.post(`/vehicles/${id}/map-templates`, { name: 'New logger', channelMap });
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const listed = (await viewer.get(`/vehicles/${id}/map-templates`)).body as Page<MapTemplate>;
    expect(listed.items.map((template) => template.name)).toEqual(['New logger', 'Old logger']);
    expect(listed.items[0]!.createdBy).toContain('Person');
    expect((await viewer.get(`/vehicles/${other.id}/map-templates`)).body).toMatchObject({ items: [] });
    const where = { action: 'map-template.created', workspaceId: engineer.workspaceId };
    const [entry] = await api.ctx.db.AuditEntry.findAll({ where, order: ['createdAt'] });
    expect(entry).toMatchObject({ subject: 'Old logger', detail: { vehicle: name } });
  });

  it('take the map that a recording was decoded by as it stands', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(engineer);
    const recording = await buildRecording(engineer, { vehicleId: vehicle.id });
    const body = { name: 'As decoded', channelMap: recording.channelMap };
    const made = await engineer.post(`/vehicles/${vehicle.id}/map-templates`, body);
    expect(made.status).toBe(201);
    const again = await buildRecording(engineer, { channelMap: (made.body as MapTemplate).channelMap });
    expect(again.channelMap).toEqual(recording.channelMap);
  });

  it('need a name of their own and a map that says something', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer, { name: 'Barge 7' });
    await engineer.post(`/vehicles/${id}/map-templates`, { name: 'Logger', channelMap });
    const twice = await engineer.post(`/vehicles/${id}/map-templates`, { name: 'LOGGER', channelMap });
    expect(twice.status).toBe(409);
    expect(problemOf(twice)).toMatchObject({ errors: [{ path: 'name' }] });
    expect(problemOf(twice).detail).toContain('Barge 7');
    const empty = await engineer.post(`/vehicles/${id}/map-templates`, { name: 'Empty', channelMap: {} });
    expect(empty.status).toBe(422);
    expect(problemOf(empty).errors?.[0]?.path).toBe('channelMap');
  });

  it('are deleted alone, or with their vehicle', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer);
    const add = async (name: string) =>
      (await engineer.post(`/vehicles/${id}/map-templates`, { name, channelMap })).body as MapTemplate;
    const [first, second] = [await add('First'), await add('Second')];
    expect((await engineer.delete(`/vehicles/${id}/map-templates/${first.id}`)).status).toBe(204);
    expect((await engineer.delete(`/vehicles/${id}/map-templates/${first.id}`)).status).toBe(404);
    expect((await engineer.get(`/vehicles/${id}/map-templates`)).body).toMatchObject({
      items: [{ id: second.id }],
    });
    expect((await engineer.delete(`/vehicles/${id}`)).status).toBe(204);
    expect(await api.ctx.db.MapTemplate.count({ where: { vehicleId: id } })).toBe(0);
  });

  it('are out of reach from another workspace', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = await buildVehicle(engineer);
    const made = await engineer.post(`/vehicles/${id}/map-templates`, { name: 'Logger', channelMap });
    const outsider = await buildMember(api, 'admin');
    const path = `/vehicles/${id}/map-templates`;
    expect((await outsider.get(path)).status).toBe(404);
    expect((await outsider.post(path, { name: 'Mine', channelMap })).status).toBe(404);
    expect((await outsider.delete(`${path}/${(made.body as MapTemplate).id}`)).status).toBe(404);
    const own = await buildVehicle(outsider);
    const smuggled = `/vehicles/${own.id}/map-templates/${(made.body as MapTemplate).id}`;
    expect((await outsider.delete(smuggled)).status).toBe(404);
  });
});

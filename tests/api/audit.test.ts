/** The audit trail: every change by whom, when, from where, before and after; narrowed, as a file, and never changed. */
import Papa from 'papaparse';
import type { AuditEntry } from '@/shared/contracts/accounts';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildVehicle } from '../support/api-factories';

describe('the audit trail', () => {
  let api: Api;
  let admin: Awaited<ReturnType<typeof buildMember>>;
  let engineer: typeof admin;
  let vehicle: { id: string; name: string };
  beforeAll(async () => {
    api = await startApi();
    admin = await buildMember(api, 'admin');
    engineer = await buildMember(api, 'engineer', admin.workspaceId);
    vehicle = await buildVehicle(engineer, { name: '=Crawler, "1"', leverArmM: [1, 0, 0] });
    await admin.patch(`/vehicles/${vehicle.id}`, { leverArmM: [2, 0, 0] });
    await engineer.delete(`/vehicles/${vehicle.id}`);
    await admin.post('/tokens', { name: 'Build', scopes: ['workspace:read'] });
  });
  afterAll(() => api.stop());

  const find = async (query = '') => {
    const answer = await admin.get(`/audit${query}`);
    expect(answer.status).toBe(200);
    return (answer.body as { items: AuditEntry[] }).items;
  };
  const actions = async (query: string) => (await find(query)).map(({ action }) => action);

  it('says by whom, from where, before and after', async () => {
    const [changed] = await find('?action=vehicle.changed');
    expect(changed).toMatchObject({
      actorId: admin.userId,
      subject: vehicle.name,
      subjectId: vehicle.id,
      detail: { before: { leverArmM: [1, 0, 0] }, after: { leverArmM: [2, 0, 0] } },
    });
    expect(changed?.address).toMatch(/127\.0\.0\.1/);
  });

  it('is narrowed by action, kind of action, person, subject and time', async () => {
    expect(await actions('?action=vehicle.deleted')).toEqual(['vehicle.deleted']);
    const three = ['vehicle.deleted', 'vehicle.changed', 'vehicle.created'];
    expect(await actions('?action=vehicle.')).toEqual(three);
    expect(await actions(`?actorId=${engineer.userId}`)).toEqual(['vehicle.deleted', 'vehicle.created']);
    expect(await actions(`?subjectId=${vehicle.id}`)).toEqual(three);
    expect(await actions(`?subjectId=${vehicle.id}&actorId=${admin.userId}`)).toEqual(['vehicle.changed']);
    const { at } = (await find('?action=vehicle.changed'))[0]!;
    expect(await actions(`?action=vehicle.&to=${at}`)).toEqual(['vehicle.created']);
    expect(await actions(`?action=vehicle.&from=${at}`)).toEqual(['vehicle.deleted', 'vehicle.changed']);
    const bad = await admin.get('/audit?action=%25&from=yesterday');
    expect(problemOf(bad).errors?.map(({ path }) => path)).toEqual(['action', 'from']);
  });

  it('is a file that a spreadsheet opens safely, narrowed the same way, however long', async () => {
    const rows = Array.from({ length: 450 }, (_, i) => ({
      workspaceId: admin.workspaceId,
      actorId: null,
      actorName: 'Server',
      action: 'trial.step',
      subject: `Step ${i}`,
      detail: { i },
      address: null,
    }));
    await api.ctx.db.AuditEntry.bulkCreate(rows);
    const answer = await admin.get('/audit.csv');
    expect(answer.headers.get('Content-Type')).toBe('text/csv; charset=utf-8');
    const read = (text: string) =>
      Papa.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true }).data;
    const all = read(answer.bytes.toString('utf8'));
    expect(new Set(all.map(({ subject }) => subject)).size).toBeGreaterThan(450);
    const [created] = read((await admin.get('/audit.csv?action=vehicle.created')).bytes.toString('utf8'));
    expect(created).toMatchObject({ subject: `'${vehicle.name}`, actor_id: engineer.userId });
    expect(JSON.parse(created!.detail_json!)).toMatchObject({ leverArmM: [1, 0, 0] });
  });

  it('is for admins, and has no route that changes it', async () => {
    expect((await engineer.get('/audit.csv')).status).toBe(403);
    const [entry] = await find();
    for (const method of ['PUT', 'PATCH', 'DELETE', 'POST']) {
      const body = method === 'DELETE' ? undefined : {};
      expect((await admin.send(method, `/audit/${entry!.id}`, body)).status).toBe(404);
      expect((await admin.send(method, '/audit', body)).status).toBe(404);
    }
    const sql = (text: string) => api.ctx.db.sequelize.query(text);
    await expect(sql("UPDATE audit_entries SET actor_name = 'Nobody'")).rejects.toThrow(/only ever added to/);
    await expect(sql('DELETE FROM audit_entries')).rejects.toThrow(/only ever added to/);
  });
});

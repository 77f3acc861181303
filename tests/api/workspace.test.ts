/** Leaving a workspace, and deleting it with all its data. */
import type { AuditEntry, Me } from '@/shared/contracts/accounts';
import { type Api, problemOf, startApi, until } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';
import { filesBelow } from '../support/api-traces';
import { buildDraft, buildRequirement, verified } from '../support/api-verification';

describe('the workspace', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('is left by anybody but its last admin; their work stays', async () => {
    const admin = await buildMember(api, 'admin');
    const engineer = await buildMember(api, 'engineer', admin.workspaceId);
    const { path } = await buildDraft(engineer, null);
    expect((await engineer.post('/workspace/leave', {})).status).toBe(422);
    expect((await engineer.post('/workspace/leave', { confirm: true })).status).toBe(204);
    expect(((await engineer.get('/me')).body as Me).workspaces).toEqual([]);
    expect((await engineer.get(path)).status).toBe(404);
    expect((await admin.get(path)).status).toBe(200);
    expect((await admin.post(`${path}/revise`, {})).status).toBe(201);
    const { items } = (await admin.get('/audit?action=member.left')).body as { items: AuditEntry[] };
    expect(items[0]).toMatchObject({ subject: engineer.email, detail: { role: 'engineer' } });
    const last = await admin.post('/workspace/leave', { confirm: true });
    expect(last.status).toBe(409);
    expect(problemOf(last).detail).toContain('only admin');
  });

  it('is deleted with everything in it once its name is typed, and nothing else', async () => {
    const admin = await buildMember(api, 'admin');
    const { workspaceId } = admin;
    const approver = await buildMember(api, 'approver', workspaceId);
    const neighbour = await buildMember(api, 'admin');
    const kept = await buildRecording(neighbour);
    const vehicle = await buildVehicle(admin);
    const recording = await buildRecording(admin, { vehicleId: vehicle.id });
    await buildRequirement(admin, [recording.id], { vehicleId: vehicle.id });
    const { path } = await buildDraft(admin, vehicle.id);
    await admin.post(`${path}/submit`);
    await verified(admin, path);
    expect((await approver.post(`${path}/release`, {})).status).toBe(200);
    await approver.post(`${path}/comments`, { text: 'Good.' });
    await admin.post('/tokens', { name: 'Build', scopes: ['workspace:read'] });
    const { name } = (await api.ctx.db.Workspace.findByPk(workspaceId))!;

    const mistyped = await admin.post('/workspace/delete', { name: 'Workspace' });
    expect(problemOf(mistyped).errors?.[0]).toMatchObject({ path: 'name' });
    expect((await approver.post('/workspace/delete', { name })).status).toBe(403);
    expect((await admin.post('/workspace/delete', { name })).status).toBe(204);

    const { db } = api.ctx;
    expect(await db.Workspace.count({ where: { id: workspaceId } })).toBe(0);
    const tables = ['recordings', 'runs', 'parameter_sets', 'requirements', 'audit_entries', 'api_tokens'];
    for (const table of tables) {
      const sql = `SELECT count(*)::int AS count FROM ${table} WHERE workspace_id = $1`;
      const [rows] = await db.sequelize.query(sql, { bind: [workspaceId] });
      expect([table, rows]).toEqual([table, [{ count: 0 }]]);
    }
    expect(await db.SetVersion.count()).toBeGreaterThan(0); // of the test before
    expect(await db.Discard.count()).toBe(0);
    await until('its files are gone', () =>
      filesBelow(`${api.dataDir}/store`).every((file) => file.includes(kept.id)),
    );
    expect(((await approver.get('/me')).body as Me).workspaces).toEqual([]);
    expect((await neighbour.get(`/recordings/${kept.id}`)).body).toMatchObject({ status: 'ready' });
  });
});

/** Leaving a workspace, and deleting it with all its data. */
import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import nodePath from 'node:path';
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

  it('is taken away whole: uploads as they came, the rest as JSON, and no secret', async () => {
    const admin = await buildMember(api, 'admin');
    const vehicle = await buildVehicle(admin);
    const recording = await buildRecording(admin, { name: 'Breakwater é' });
    await buildRequirement(admin, [recording.id]);
    const { setId, path } = await buildDraft(admin, vehicle.id);
    await verified(admin, path);
    await admin.post(`${path}/comments`, { text: 'Good.' });
    const made = (await admin.post('/tokens', { name: 'Build', scopes: ['workspace:read'] })).body as {
      token: string;
    };
    const answer = await admin.get('/workspace/export.tar');
    expect(answer.status).toBe(200);
    expect(answer.headers.get('Content-Disposition')).toMatch(/filename="?Workspace-[\w-]+\.tar"?$/);

    const folder = fs.mkdtempSync(nodePath.join(os.tmpdir(), 'driftwright-tar-'));
    fs.writeFileSync(nodePath.join(folder, 'all.tar'), answer.bytes);
    execFileSync('tar', ['-xf', 'all.tar'], { cwd: folder });
    const read = (file: string) => fs.readFileSync(nodePath.join(folder, file), 'utf8');
    const files = filesBelow(folder).filter((file) => file !== 'all.tar');
    expect(files.sort()).toEqual([
      'audit.csv',
      'members.json',
      `parameter-sets/${setId}.json`,
      `recordings/${recording.id}/gnss-gnss.csv`,
      `recordings/${recording.id}/imu-imu.csv`,
      'recordings/00001.json',
      'requirements/00001.json',
      'runs/00001.json',
      'vehicles/00001.json',
      'workspace.json',
    ].sort()); // prettier-ignore
    for (const { role, sha256 } of recording.files) {
      const bytes = fs.readFileSync(nodePath.join(folder, `recordings/${recording.id}/${role}-${role}.csv`));
      expect(createHash('sha256').update(bytes).digest('hex')).toBe(sha256);
    }
    const set = JSON.parse(read(`parameter-sets/${setId}.json`)) as { reviews: { comments: object[] }[] };
    expect(set.reviews[0]).toMatchObject({
      comments: [{ text: 'Good.' }],
      verification: { cells: [{ verdict: 'pass' }] },
    });
    expect(JSON.parse(read('recordings/00001.json'))).toMatchObject([{ name: 'Breakwater é' }]);
    expect(read('audit.csv')).toContain('workspace.exported');
    const everything = answer.bytes.toString('latin1');
    expect(everything).not.toContain(made.token);
    expect(everything).not.toMatch(/argon2|passwordHash|tokenHash/);
    fs.rmSync(folder, { recursive: true, force: true });
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
    const runs = await api.ctx.db.Run.findAll({ where: { workspaceId } });
    const gone = [recording.id, ...runs.map(({ id }) => id)];
    expect(filesBelow(`${api.dataDir}/store`).filter((file) => file.includes(runs[0]!.id))).not.toEqual([]);

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
      filesBelow(`${api.dataDir}/store`).every((file) => !gone.some((id) => file.includes(id))),
    );
    expect(((await approver.get('/me')).body as Me).workspaces).toEqual([]);
    expect((await neighbour.get(`/recordings/${kept.id}`)).body).toMatchObject({ status: 'ready' });
  });
});

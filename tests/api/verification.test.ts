/** The verification matrix: made by queued runs, kept by the hash of its inputs, asked for by the release. */
import type { AuditEntry } from '@/shared/contracts/accounts';
import type { Recording } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import type { Verification } from '@/shared/contracts/verification';
import { type Api, problemOf, startApi, until } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';
import { filesBelow } from '../support/api-traces';
import { buildDraft, buildRequirement, every, verificationOf, verified } from '../support/api-verification';

describe('verification', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let approver: typeof engineer;
  let first: Recording;
  let second: Recording;
  beforeAll(async () => {
    api = await startApi({ WORKERS: '2' });
  });
  afterAll(() => api.stop());
  beforeEach(async () => {
    engineer = await buildMember(api, 'engineer');
    approver = await buildMember(api, 'approver', engineer.workspaceId);
    first = await buildRecording(engineer, { name: 'A breakwater' });
    second = await buildRecording(engineer, { name: 'B harbour' });
  });

  const vehicle = async (overrides: object = {}) => (await buildVehicle(engineer, overrides)).id;
  const runs = () => api.ctx.db.Run.count({ where: { workspaceId: engineer.workspaceId } });
  const verdicts = ({ cells }: Verification) => cells.map(({ verdict }) => verdict);
  const reasons = ({ cells }: Verification) => [...new Set(cells.flatMap(({ outOfDate }) => outOfDate))];

  it('judges every requirement on every recording, by runs that cells share and that open', async () => {
    const both = [first.id, second.id];
    await buildRequirement(engineer, both, { name: '1 drift' });
    await buildRequirement(engineer, both, { name: '2 too tight', limit: 1e-6 });
    const nis = {
      metric: { kind: 'nis-inside-share', group: 'position' },
      comparison: 'at-least',
      limit: 0.5,
    };
    await buildRequirement(engineer, both, { name: '3 consistency', ...nis });
    const bias = { metric: { kind: 'bias-convergence', sensor: 'gyro', sigma: 0.1 }, limit: 60 };
    await buildRequirement(engineer, [first.id], { name: '4 convergence', ...bias });
    const truth = { metric: { kind: 'rmse', quantity: 'horizontal' }, limit: 5 };
    await buildRequirement(engineer, [second.id], { name: '5 truth', ...truth, schedule: { kind: 'none' } });
    const { path } = await buildDraft(engineer, await vehicle());
    expect(await verificationOf(engineer, path)).toMatchObject({ state: 'none', counts: { notVerified: 8 } });

    const done = await verified(engineer, path);
    expect(await runs()).toBe(3); // one a recording for the common schedule, one without outages
    expect(verdicts(done)).toEqual([
      'pass', 'pass', 'fail', 'fail', 'pass', 'pass', 'pass', 'not-applicable',
    ]); // prettier-ignore
    expect(done.counts).toMatchObject({ cells: 8, pass: 5, fail: 2, notApplicable: 1, unsettled: 3 });
    expect(done.cells[7]?.reason).toContain('no reference trajectory');
    const [drift] = done.cells;
    const run = (await engineer.get(`/runs/${drift!.runId}`)).body as Run;
    expect(run).toMatchObject({ state: 'done', hasSeries: true, recordingId: first.id });
    expect(run.outages.length).toBeGreaterThan(1);
    const start = run.summary!.alignment.timeS;
    expect(run.outages.map((window) => window.startS - start)).toEqual(
      run.outages.map((_, i) => expect.closeTo(5 + 15 * i, 6)),
    );
    const at10 = run.summary!.outages.map(
      ({ points }) => points.find(({ afterS }) => afterS === 10)!.horizontalM,
    );
    expect(drift!.value).toBe(Math.max(...at10));
    expect((await engineer.get(`/runs/${drift!.runId}/solution.csv`)).status).toBe(200);
    const { items } = (await engineer.get(`${path}/history`)).body as { items: AuditEntry[] };
    expect(items.at(-1)).toMatchObject({
      action: 'version.verification-started',
      detail: { cells: 8, runs: 3 },
    });
  });

  it('makes again only what has changed, and says why the rest is out of date', async () => {
    const vehicleId = await vehicle();
    const mounted = await buildRecording(engineer, { name: 'C mounted', vehicleId });
    const ids = [first.id, mounted.id];
    const one = await buildRequirement(engineer, ids, { name: '1' });
    await buildRequirement(engineer, ids, { name: '2', schedule: every(30, 10) });
    const { path } = await buildDraft(engineer, vehicleId);
    await verified(engineer, path);
    expect(await runs()).toBe(4);
    await verified(engineer, path);
    expect(await runs()).toBe(4);

    await engineer.patch(`/requirements/${one.id}`, { limit: 1e-6 });
    const stale = await verificationOf(engineer, path);
    expect(stale.cells.map(({ outOfDate }) => outOfDate.length)).toEqual([1, 1, 0, 0]);
    expect(reasons(stale)).toEqual(['the requirement was changed']);
    expect(stale.counts).toMatchObject({ outOfDate: 2, pass: 2, unsettled: 2 });
    expect(verdicts(await verified(engineer, path))).toEqual(['fail', 'fail', 'pass', 'pass']);
    expect(await runs()).toBe(4);

    await engineer.patch(`/requirements/${one.id}`, { schedule: every(20, 10) });
    expect(reasons(await verificationOf(engineer, path))).toEqual(['the outage schedule was changed']);
    await verified(engineer, path);
    expect(await runs()).toBe(6);

    await engineer.patch(`/vehicles/${vehicleId}`, { leverArmM: [1, 0, -1] });
    const moved = await verificationOf(engineer, path);
    expect(moved.cells.map(({ outOfDate }) => outOfDate.length)).toEqual([0, 1, 0, 1]);
    expect(reasons(moved)).toEqual(['the lever arm was changed']);
    await verified(engineer, path);
    expect(await runs()).toBe(8);

    await engineer.patch(path, { parameters: { gnss: { positionScale: 2 } } });
    expect(reasons(await verificationOf(engineer, path))).toEqual(['the parameters were changed']);
    expect((await verified(engineer, path)).counts).toMatchObject({ outOfDate: 0, going: 0, notVerified: 0 });
    expect(await runs()).toBe(12);
    const where = { workspaceId: engineer.workspaceId, hasSeries: true };
    await until(
      'runs that no cell stands on any more keep their summary alone',
      async () => (await api.ctx.db.Run.count({ where })) === 4,
    );
  });

  it('tells why a run could not be made, and makes it once it can', async () => {
    await buildRequirement(engineer, [first.id]);
    const { path } = await buildDraft(engineer, await vehicle(), { initial: { timeS: 1e6 } });
    const failed = await verified(engineer, path);
    expect(failed.cells[0]).toMatchObject({ verdict: 'failed', value: null, settled: false });
    expect(failed.cells[0]!.reason).toMatch(/\w+ .*\./);
    const { runId } = failed.cells[0]!;
    expect((await engineer.get(`/runs/${runId}`)).body).toMatchObject({
      state: 'failed',
      failure: failed.cells[0]!.reason,
    });
    expect(filesBelow(api.dataDir).filter((file) => file.includes(runId!))).toEqual([]);
    await engineer.patch(path, { parameters: {} });
    expect((await verified(engineer, path)).cells[0]).toMatchObject({ verdict: 'pass', settled: true });
  });

  it('asks for a requirement', async () => {
    const { path } = await buildDraft(engineer, await vehicle());
    const answer = await engineer.post(`${path}/verify`);
    expect(answer.status).toBe(409);
    expect(problemOf(answer).detail).toContain('Add one first');
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    expect((await viewer.post(`${path}/verify`)).status).toBe(403);
    expect((await viewer.get(`${path}/verification`)).status).toBe(200);
  });

  it('is asked for by a release: green and current, or waived in writing by somebody else', async () => {
    const both = [first.id, second.id];
    await buildRequirement(engineer, both, { name: 'Loose' });
    const tight = await buildRequirement(engineer, [first.id], { name: 'Tight', limit: 1e-6 });
    const { path } = await buildDraft(engineer, await vehicle());
    const waiver = {
      requirementId: tight.id,
      recordingId: first.id,
      text: 'The quay hides the sky there; shown on B.',
    };
    expect((await approver.post(`${path}/waivers`, waiver)).status).toBe(409); // a draft
    await engineer.post(`${path}/submit`);
    const release = (body: object = {}) => approver.post(`${path}/release`, body);
    expect(problemOf(await release()).detail).toContain('3 of 3 cells');
    await verified(engineer, path);
    expect(problemOf(await release()).detail).toContain('“Tight” on “A breakwater” (fails)');
    const reason = { withoutRequirements: 'There is no time for these today.' };
    expect(problemOf(await release(reason)).errors?.[0]?.path).toBe('withoutRequirements');

    expect((await engineer.post(`${path}/waivers`, waiver)).status).toBe(403);
    expect(
      problemOf(await approver.post(`${path}/waivers`, { ...waiver, text: 'Ok.' })).errors?.[0]?.path,
    ).toBe('text');
    const foreign = await approver.post(`${path}/waivers`, { ...waiver, recordingId: second.id });
    expect(foreign.status).toBe(422);
    expect((await approver.post(`${path}/waivers`, waiver)).body).toMatchObject({
      counts: { waived: 1, unsettled: 0 },
    });
    expect((await approver.post(`${path}/waivers`, waiver)).status).toBe(409);
    await expect(api.ctx.db.sequelize.query("UPDATE waivers SET text = 'Other.'")).rejects.toThrow(
      /never changed/,
    );

    await engineer.patch(`/requirements/${tight.id}`, { limit: 1e-7 });
    expect(problemOf(await release()).detail).toContain('out of date because the requirement was changed');
    await engineer.patch(`/requirements/${tight.id}`, { limit: 1e-6 });
    const released = await release({ comment: 'With one waiver.' });
    expect(released.body).toMatchObject({ state: 'released' });

    await engineer.patch(`/requirements/${tight.id}`, { limit: 1e6 });
    const { evidence } = await verificationOf(engineer, path);
    expect(evidence).toMatchObject({
      withoutRequirements: null,
      requirements: [{ name: 'Loose' }, { name: 'Tight', limit: 1e-6 }],
    });
    expect(evidence?.cells.map(({ verdict, waiver: given }) => [verdict, given?.text ?? null])).toEqual([
      ['pass', null],
      ['pass', null],
      ['fail', waiver.text],
    ]);

    for (const { id } of evidence!.requirements) {
      expect((await engineer.delete(`/requirements/${id}`)).status).toBe(204);
    }
    const refused = await engineer.delete(`/recordings/${second.id}`);
    expect(problemOf(refused)).toMatchObject({
      status: 409,
      detail: expect.stringContaining('(released) rests on it'),
    });
    expect((await verificationOf(engineer, path)).evidence?.cells).toEqual(evidence!.cells);
  });

  it('is replaced by a written reason where there is no requirement', async () => {
    const { path } = await buildDraft(engineer, await vehicle());
    await engineer.post(`${path}/submit`);
    expect(problemOf(await approver.post(`${path}/release`, {})).errors?.[0]?.path).toBe(
      'withoutRequirements',
    );
    const short = await approver.post(`${path}/release`, { withoutRequirements: 'No.' });
    expect(short.status).toBe(422);
    const withoutRequirements = 'Trial of the release path on the bench.';
    expect((await approver.post(`${path}/release`, { withoutRequirements })).status).toBe(200);
    expect((await verificationOf(engineer, path)).evidence).toMatchObject({ withoutRequirements, cells: [] });
  });

  it('lets nobody release by adding a requirement at the same moment', async () => {
    const vehicleId = await vehicle();
    const { path } = await buildDraft(engineer, vehicleId);
    await engineer.post(`${path}/submit`);
    const withoutRequirements = 'None is agreed for this vehicle yet.';
    const [released, added] = await Promise.all([
      approver.post(`${path}/release`, { withoutRequirements }),
      engineer.post('/requirements', {
        name: 'At once',
        metric: { kind: 'rejected-share', group: 'position' },
        comparison: 'at-most',
        limit: 0.1,
        recordingIds: [first.id],
        vehicleId,
      }),
    ]);
    expect(added.status).toBe(201);
    const row = await api.ctx.db.Requirement.findOne({ where: { vehicleId }, rejectOnEmpty: true });
    const { evidence } = await verificationOf(engineer, path);
    if (released.status === 200) expect(evidence?.requirements).toEqual([]);
    else expect(problemOf(released).detail).toContain('Requirements apply to');
    expect(row.name).toBe('At once');
  });
});

/** The way of a version: draft → in review → returned or released → superseded, and no other. */
import type { AuditEntry } from '@/shared/contracts/accounts';
import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import type { VersionComment, VersionDifferences } from '@/shared/contracts/version-reviews';
import { type Answer, type Api, type Caller, problemOf, startApi } from '../support/api';
import { buildMember, buildVehicle } from '../support/api-factories';

describe('reviews', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let approver: typeof engineer;
  let vehicleId: string;
  let count = 0;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
    approver = await buildMember(api, 'approver', engineer.workspaceId);
  });
  beforeEach(async () => {
    vehicleId = (await buildVehicle(engineer)).id;
  });
  afterAll(() => api.stop());

  const reason = { withoutRequirements: 'Bench trial, no requirement is agreed yet.' };
  /** A set of one draft; answers the path of the draft. */
  const draft = async (caller: Caller = engineer, of: string | null = vehicleId, parameters: object = {}) => {
    const answer = await caller.post('/parameter-sets', {
      name: `Harbour ${++count}`,
      ...(of ? { vehicleId: of } : {}),
      version: { note: 'Datasheet figures.', parameters },
    });
    const { id } = answer.body as ParameterSetDetail;
    return { id, path: `/parameter-sets/${id}/versions/1` };
  };
  const inReview = async (caller: Caller = engineer) => {
    const made = await draft(caller);
    expect((await caller.post(`${made.path}/submit`)).status).toBe(200);
    return made;
  };
  const released = async () => {
    const made = await inReview();
    expect((await approver.post(`${made.path}/release`, reason)).status).toBe(200);
    return made;
  };
  const state = async (path: string) => ((await engineer.get(path)).body as ParameterSetVersion).state;
  const statuses = (answers: Answer[]) => answers.map((answer) => answer.status).sort();
  const sql = (text: string, bind: unknown[]) => api.ctx.db.sequelize.query(text, { bind });

  it('take a version to its release, and say who did what', async () => {
    const { id, path } = await draft();
    const submitted = (await engineer.post(`${path}/submit`)).body as ParameterSetVersion;
    expect(submitted).toMatchObject({ state: 'in-review', reviewedBy: null });
    expect(submitted.submittedAt).not.toBeNull();
    const answer = await approver.post(`${path}/release`, { comment: 'Well shown.', ...reason });
    const name = (await api.ctx.db.User.findByPk(approver.userId))?.name;
    expect(answer.body).toMatchObject({ state: 'released', reviewComment: 'Well shown.', reviewedBy: name });
    const set = (await engineer.get(`/parameter-sets/${id}`)).body as ParameterSetDetail;
    expect(set).toMatchObject({ releasedNumber: 1, inReviewNumbers: [] });
    const { items } = (await engineer.get(`${path}/history`)).body as { items: AuditEntry[] };
    expect(items.map((entry) => entry.action)).toEqual([
      'set.version-created',
      'version.submitted',
      'version.released',
    ]);
    expect(items[2]).toMatchObject({ actor: name, address: null, detail: { comment: 'Well shown.' } });
  });

  it('return a version with a reason; it is mended by a new draft, and stays as it was', async () => {
    const { id, path } = await inReview();
    const wordless = await approver.post(`${path}/return`, { comment: ' ' });
    expect(problemOf(wordless).errors?.[0]).toMatchObject({ path: 'comment' });
    const returned = await approver.post(`${path}/return`, { comment: 'Drift after 60 s is too large.' });
    expect(returned.body).toMatchObject({
      state: 'returned',
      reviewComment: 'Drift after 60 s is too large.',
    });
    expect((await engineer.patch(path, { note: 'Mended.' })).status).toBe(409);
    expect((await engineer.post(`${path}/submit`)).status).toBe(409);
    const next = await engineer.post(`${path}/revise`, {});
    expect(next.status).toBe(201);
    expect(next.body).toMatchObject({
      number: 2,
      state: 'draft',
      parentNumber: 1,
      note: 'From version 1, returned.',
    });
    const second = `/parameter-sets/${id}/versions/2`;
    const parameters = { gnss: { positionScale: 2 } };
    expect((await engineer.patch(second, { note: 'Trusts GNSS less.', parameters })).body).toMatchObject({
      note: 'Trusts GNSS less.',
      parameters: { gnss: { positionScale: 2 } },
    });
    expect((await engineer.post(`${second}/submit`)).status).toBe(200);
    expect((await approver.post(`${second}/release`, reason)).status).toBe(200);
    expect(await state(path)).toBe('returned');
  });

  it('are never given by who wrote or submitted the version', async () => {
    const own = await inReview(approver);
    for (const action of ['return', 'release']) {
      const answer = await approver.post(`${own.path}/${action}`, { comment: 'Mine.' });
      expect(answer.status).toBe(403);
      expect(problemOf(answer).type).toContain('own-work');
    }
    const { path } = await draft(engineer);
    expect((await approver.post(`${path}/submit`)).status).toBe(200);
    expect(problemOf(await approver.post(`${path}/release`, reason)).detail).toContain('You submitted');
    const second = await buildMember(api, 'approver', engineer.workspaceId);
    expect((await second.post(`${path}/release`, reason)).status).toBe(200);
  });

  it('are refused to engineers and admins, and to what is not in review', async () => {
    const admin = await buildMember(api, 'admin', engineer.workspaceId);
    const { path } = await draft();
    expect(statuses([await approver.post(`${path}/release`, reason)])).toEqual([409]);
    expect(problemOf(await approver.post(`${path}/return`, { comment: 'No.' })).detail).toContain('a draft');
    await engineer.post(`${path}/submit`);
    for (const caller of [engineer, admin]) {
      expect((await caller.post(`${path}/release`, reason)).status).toBe(403);
      expect((await caller.post(`${path}/return`, { comment: 'No.' })).status).toBe(403);
    }
    expect(await state(path)).toBe('in-review');
  });

  it('ask for a vehicle, which is then settled', async () => {
    const { id, path } = await draft(engineer, null);
    expect(problemOf(await engineer.post(`${path}/submit`)).detail).toContain('no vehicle');
    expect((await engineer.patch(`/parameter-sets/${id}`, { vehicleId })).body).toMatchObject({ vehicleId });
    expect((await engineer.post(`${path}/submit`)).status).toBe(200);
    const other = await buildVehicle(engineer);
    const moved = await engineer.patch(`/parameter-sets/${id}`, { vehicleId: other.id });
    expect(moved.status).toBe(409);
    expect(problemOf(moved).errors?.[0]?.path).toBe('vehicleId');
  });

  it('leave one released version a vehicle, whatever its set', async () => {
    const first = await released();
    const second = await released();
    expect(await state(first.path)).toBe('superseded');
    expect(await state(second.path)).toBe('released');
    const listed = (await engineer.get(`/parameter-sets?vehicleId=${vehicleId}&state=released`)).body as {
      items: ParameterSetDetail[];
    };
    expect(listed.items.map((set) => set.id)).toEqual([second.id]);
    const { items } = (await engineer.get(`${first.path}/history`)).body as { items: AuditEntry[] };
    expect(items.at(-1)?.action).toBe('version.superseded');
  });

  it('give one winner when several judge at once', async () => {
    const others = await Promise.all([1, 2, 3].map(() => buildMember(api, 'approver', engineer.workspaceId)));
    const { path } = await inReview();
    const answers = await Promise.all(
      [approver, ...others].map((caller, i) =>
        i % 2 ? caller.post(`${path}/return`, { comment: 'No.' }) : caller.post(`${path}/release`, reason),
      ),
    );
    expect(statuses(answers)).toEqual([200, 409, 409, 409]);
    const { items } = (await engineer.get(`${path}/history`)).body as { items: AuditEntry[] };
    expect(items.filter(({ action }) => /returned|released/.test(action))).toHaveLength(1);
  });

  it('leave one released version when several of a vehicle are released at once', async () => {
    const made = await Promise.all([inReview(), inReview(), inReview()]);
    const answers = await Promise.all(made.map(({ path }) => approver.post(`${path}/release`, reason)));
    expect(statuses(answers)).toEqual([200, 200, 200]);
    const states = await Promise.all(made.map(({ path }) => state(path)));
    expect(states.sort()).toEqual(['released', 'superseded', 'superseded']);
  });

  it('hold in the database itself', async () => {
    const { id } = await released();
    const by = [id];
    const refused = [
      "UPDATE set_versions SET parameters = '{}' WHERE set_id = $1",
      "UPDATE set_versions SET outages = '[1]' WHERE set_id = $1",
      "UPDATE set_versions SET note = 'Other.' WHERE set_id = $1",
      'UPDATE set_versions SET run_id = gen_random_uuid() WHERE set_id = $1',
      'UPDATE set_versions SET recording_id = gen_random_uuid() WHERE set_id = $1',
      "UPDATE set_versions SET state = 'draft' WHERE set_id = $1",
      "UPDATE set_versions SET state = 'in-review' WHERE set_id = $1",
      "UPDATE set_versions SET review_comment = 'Other.' WHERE set_id = $1",
      'UPDATE set_versions SET created_by_id = reviewed_by_id WHERE set_id = $1',
      'UPDATE parameter_sets SET vehicle_id = NULL WHERE id = $1',
      'DELETE FROM set_versions WHERE set_id = $1',
      'DELETE FROM parameter_sets WHERE id = $1',
      'DELETE FROM audit_entries WHERE subject_id IN (SELECT id FROM set_versions WHERE set_id = $1)',
      "UPDATE audit_entries SET action = 'x' WHERE subject_id IN (SELECT id FROM set_versions WHERE set_id = $1)",
    ];
    for (const text of refused)
      await expect(sql(text, by)).rejects.toThrow(/never|keeps|does not go|only ever/);
    await sql("UPDATE set_versions SET state = 'superseded' WHERE set_id = $1", by);
  });

  it('cannot be forged by writing rows: neither the state, nor the reviewer, nor a second release', async () => {
    const { id } = await inReview();
    const direct = draft();
    const skip = "UPDATE set_versions SET state = 'released' WHERE set_id = $1";
    await expect(sql(skip, [(await direct).id])).rejects.toThrow(/does not go/);
    const own = `UPDATE set_versions SET state = 'released', vehicle_id = $2, reviewed_by_id = created_by_id,
      reviewed_at = now() WHERE set_id = $1`;
    await expect(sql(own, [id, vehicleId])).rejects.toThrow(/four_eyes/);
    await released();
    const second = `UPDATE set_versions SET state = 'released', vehicle_id = $2, reviewed_by_id = $3,
      reviewed_at = now() WHERE set_id = $1`;
    await expect(sql(second, [id, vehicleId, approver.userId])).rejects.toThrow();
    const born = `INSERT INTO set_versions (id, set_id, number, state, note, parameters, outages, created_by_id, created_at)
      VALUES (gen_random_uuid(), $1, 9, 'in-review', 'x', '{}', '[]', $2, now())`;
    await expect(sql(born, [id, engineer.userId])).rejects.toThrow(/begins as a draft/);
  });

  it('go with their workspace when that is deleted', async () => {
    const elsewhere = await buildMember(api, 'engineer');
    const judge = await buildMember(api, 'approver', elsewhere.workspaceId);
    vehicleId = (await buildVehicle(elsewhere)).id;
    const { id, path } = await draft(elsewhere);
    await elsewhere.post(`${path}/submit`);
    await judge.post(`${path}/release`, reason);
    await api.ctx.db.transaction(async (transaction) => {
      await api.ctx.db.sequelize.query('SET CONSTRAINTS ALL DEFERRED', { transaction });
      await api.ctx.db.Workspace.destroy({ where: { id: elsewhere.workspaceId }, transaction });
    });
    expect(await api.ctx.db.ParameterSet.count({ where: { id } })).toBe(0);
  });
});

describe('drafts', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
  });
  afterAll(() => api.stop());

  const make = async (name: string) => {
    const version = { note: 'First.', parameters: {} };
    return ((await engineer.post('/parameter-sets', { name, version })).body as ParameterSetDetail).id;
  };

  it('are changed by their author alone', async () => {
    const path = `/parameter-sets/${await make('Own')}/versions/1`;
    const colleague = await buildMember(api, 'approver', engineer.workspaceId);
    expect((await colleague.patch(path, { note: 'Mine now.' })).status).toBe(403);
    expect((await colleague.delete(path)).status).toBe(403);
    const outages = [{ startS: 10, endS: 40, withhold: 'gnss' }];
    const changed = await engineer.patch(path, { outages });
    expect(changed.body).toMatchObject({ note: 'First.', outages });
    const bad = await engineer.patch(path, { parameters: { gate: { probability: 2 } } });
    expect(problemOf(bad).errors?.[0]?.path).toBe('parameters.gate.probability');
    const { items } = (await engineer.get(`${path}/history`)).body as { items: AuditEntry[] };
    expect(items.at(-1)).toMatchObject({
      action: 'version.changed',
      detail: { after: { outages }, before: { outages: [] } },
    });
  });

  it('are discarded without their number being given again; the last takes the set along', async () => {
    const id = await make('Short-lived');
    const add = async () =>
      (await engineer.post(`/parameter-sets/${id}/versions`, { note: 'x', parameters: {} }))
        .body as ParameterSetVersion;
    expect((await add()).number).toBe(2);
    expect((await engineer.delete(`/parameter-sets/${id}/versions/2`)).status).toBe(204);
    expect((await add()).number).toBe(3);
    const admin = await buildMember(api, 'admin', engineer.workspaceId);
    expect((await admin.delete(`/parameter-sets/${id}/versions/3`)).status).toBe(204);
    expect((await engineer.delete(`/parameter-sets/${id}/versions/1`)).status).toBe(204);
    expect((await engineer.get(`/parameter-sets/${id}`)).status).toBe(404);
  });

  it('are told apart parameter by parameter', async () => {
    const id = await make('Compared');
    const parameters = { gyro: { whiteNoiseRadPerSqrtS: 1.74e-4 }, gate: { enabled: false } };
    await engineer.post(`/parameter-sets/${id}/versions`, { note: 'Second.', parameters, parentNumber: 1 });
    const answer = await engineer.get(`/parameter-sets/${id}/versions/2/differences?against=1`);
    const { parameters: found } = answer.body as VersionDifferences;
    expect(found).toMatchObject([
      { path: 'gyro.whiteNoiseRadPerSqrtS', label: 'White noise (ARW)', unit: '°/√h' },
      { path: 'gate.enabled', before: 'on', after: 'off', percent: null },
    ]);
    expect(found[0]!.percent).toBeCloseTo(100, 9);
    expect((await engineer.get(`/parameter-sets/${id}/versions/2/differences?against=7`)).status).toBe(404);
    expect((await engineer.get(`/parameter-sets/${id}/versions/2/differences`)).status).toBe(422);
  });

  it('are commented by anybody who reads, as a whole and by parameter', async () => {
    const path = `/parameter-sets/${await make('Discussed')}/versions/1/comments`;
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    expect((await viewer.post(path, { text: 'Which recording is this from?' })).status).toBe(201);
    const about = { text: 'Above the datasheet.', path: 'gyro.whiteNoiseRadPerSqrtS' };
    expect((await engineer.post(path, about)).body).toMatchObject({ ...about, label: 'White noise (ARW)' });
    const mistyped = await viewer.post(path, { text: 'x', path: 'gyro.noise' });
    expect(problemOf(mistyped).errors?.[0]?.path).toBe('path');
    const { items } = (await engineer.get(path)).body as { items: VersionComment[] };
    expect(items.map((comment) => [comment.text, comment.path])).toEqual([
      ['Which recording is this from?', null],
      [about.text, about.path],
    ]);
    const outsider = await buildMember(api, 'admin');
    expect((await outsider.post(path, { text: 'x' })).status).toBe(404);
  });
});

import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import { defaultParameters } from '@/shared/contracts/parameters';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildVehicle } from '../support/api-factories';

describe('parameter sets', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  const first = { name: 'Harbour set', version: { note: 'Datasheet figures.', parameters: {} } };

  it('begin with a complete draft version that a teammate opens', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(engineer, { name: 'Crawler 1' });
    const parameters = { gnss: { positionScale: 1.5 } };
    const version = { note: ' Trusts GNSS less. ', parameters, outages: [{ startS: 10, endS: 40 }] };
    const made = await engineer.post('/parameter-sets', {
      name: 'Harbour set',
      vehicleId: vehicle.id,
      version,
    });
    expect(made.status).toBe(201);
    const set = made.body as ParameterSetDetail;
    expect(set).toMatchObject({
      vehicleName: 'Crawler 1',
      versionCount: 1,
      latest: { number: 1, state: 'draft', note: 'Trusts GNSS less.' },
    });
    expect(set.versions[0]?.parameters).toEqual({
      ...defaultParameters(),
      gnss: { ...defaultParameters().gnss, positionScale: 1.5 },
    });
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    expect((await viewer.get(`/parameter-sets/${set.id}`)).body).toEqual(set);
    expect((await viewer.get(`/parameter-sets/${set.id}/versions/1`)).body).toEqual(set.versions[0]);
    const listed = (await viewer.get('/parameter-sets')).body as { items: ParameterSetDetail[] };
    expect(listed.items).toEqual([expect.objectContaining({ id: set.id, latest: set.latest })]);
  });

  it('number versions in order, also when several are saved at once', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = (await engineer.post('/parameter-sets', first)).body as ParameterSetDetail;
    const save = (i: number) =>
      engineer.post(`/parameter-sets/${id}/versions`, { note: `Try ${i}.`, parameters: {}, parentNumber: 1 });
    const answers = await Promise.all([1, 2, 3, 4, 5].map(save));
    const numbers = answers.map((answer) => (answer.body as ParameterSetVersion).number);
    expect(numbers.sort()).toEqual([2, 3, 4, 5, 6]);
    const set = (await engineer.get(`/parameter-sets/${id}`)).body as ParameterSetDetail;
    expect(set.versions.map((version) => version.number)).toEqual([6, 5, 4, 3, 2, 1]);
  });

  it('are refused to a viewer, in every way of saving', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = (await engineer.post('/parameter-sets', first)).body as ParameterSetDetail;
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const answers = [
      await viewer.post('/parameter-sets', { ...first, name: 'Mine' }),
      await viewer.post(`/parameter-sets/${id}/versions`, { note: 'Mine.', parameters: {} }),
      await viewer.patch(`/parameter-sets/${id}`, { name: 'Mine' }),
    ];
    expect(answers.map((answer) => answer.status)).toEqual([403, 403, 403]);
    const set = (await viewer.get(`/parameter-sets/${id}`)).body as ParameterSetDetail;
    expect(set).toMatchObject({ name: 'Harbour set', versionCount: 1 });
  });

  it('say which parameter is out of its range', async () => {
    const engineer = await buildMember(api, 'engineer');
    const parameters = { gyro: { whiteNoiseRadPerSqrtS: -1 }, gate: { probability: 'high' } };
    const answer = await engineer.post('/parameter-sets', {
      name: 'Bad',
      version: { note: 'No.', parameters },
    });
    expect(answer.status).toBe(422);
    const paths = problemOf(answer).errors?.map((error) => error.path);
    expect(paths).toEqual([
      'version.parameters.gyro.whiteNoiseRadPerSqrtS',
      'version.parameters.gate.probability',
    ]);
    expect(await api.ctx.db.ParameterSet.count({ where: { name: 'Bad' } })).toBe(0);
  });

  it('ask for a note, for windows apart, and for a parent that exists', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = (await engineer.post('/parameter-sets', first)).body as ParameterSetDetail;
    const save = async (version: object) =>
      problemOf(await engineer.post(`/parameter-sets/${id}/versions`, { parameters: {}, ...version }))
        .errors?.[0];
    expect(await save({ note: ' ' })).toMatchObject({ path: 'note' });
    const overlapping = [
      { startS: 0, endS: 20 },
      { startS: 10, endS: 30 },
    ];
    expect(await save({ note: 'x', outages: overlapping })).toMatchObject({ path: 'outages' });
    expect(await save({ note: 'x', parentNumber: 9 })).toMatchObject({ path: 'parentNumber' });
  });

  it('take no evidence from another workspace', async () => {
    const engineer = await buildMember(api, 'engineer');
    const elsewhere = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(elsewhere);
    const foreign = await engineer.post('/parameter-sets', { ...first, vehicleId: vehicle.id });
    expect(problemOf(foreign).errors?.[0]?.path).toBe('vehicleId');
    const run = { ...first.version, runId: vehicle.id, recordingId: vehicle.id };
    const answer = await engineer.post('/parameter-sets', { ...first, version: run });
    expect(problemOf(answer).errors?.map((error) => error.path)).toEqual(['runId', 'recordingId']);
  });

  it('of another workspace do not exist here', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = (await engineer.post('/parameter-sets', first)).body as ParameterSetDetail;
    const outsider = await buildMember(api, 'approver');
    expect((await outsider.get(`/parameter-sets/${id}`)).status).toBe(404);
    expect((await outsider.get(`/parameter-sets/${id}/versions/1`)).status).toBe(404);
    const version = { note: 'x', parameters: {} };
    expect((await outsider.post(`/parameter-sets/${id}/versions`, version)).status).toBe(404);
    expect((await outsider.patch(`/parameter-sets/${id}`, { name: 'x' })).status).toBe(404);
  });

  it('keep their names apart within a workspace, and can be renamed', async () => {
    const engineer = await buildMember(api, 'engineer');
    await engineer.post('/parameter-sets', first);
    expect((await engineer.post('/parameter-sets', { ...first, name: 'harbour SET' })).status).toBe(409);
    const { id } = (await engineer.post('/parameter-sets', { ...first, name: 'Van set' }))
      .body as ParameterSetDetail;
    expect((await engineer.patch(`/parameter-sets/${id}`, { name: 'Harbour set' })).status).toBe(409);
    const renamed = await engineer.patch(`/parameter-sets/${id}`, { name: 'Shore van set' });
    expect(renamed.body).toMatchObject({ id, name: 'Shore van set' });
  });

  it('are sorted, searched by name or vehicle, and filtered, page by page', async () => {
    const engineer = await buildMember(api, 'engineer');
    const vehicle = await buildVehicle(engineer, { name: 'Slow barge' });
    const { version } = first;
    await engineer.post('/parameter-sets', { name: 'Open sea', version });
    await engineer.post('/parameter-sets', { name: 'Quay', vehicleId: vehicle.id, version });
    await engineer.post('/parameter-sets', { name: 'Inner harbour', version });
    const names = async (query: string) => {
      const found: string[] = [];
      for (let cursor: string | null = ''; cursor !== null;) {
        const path = `/parameter-sets?${query}&limit=2${cursor ? `&cursor=${cursor}` : ''}`;
        const page = (await engineer.get(path)).body as {
          items: { name: string }[];
          nextCursor: string | null;
        };
        found.push(...page.items.map(({ name }) => name));
        cursor = page.nextCursor;
      }
      return found;
    };
    expect(await names('')).toEqual(['Inner harbour', 'Quay', 'Open sea']);
    expect(await names('sort=name')).toEqual(['Inner harbour', 'Open sea', 'Quay']);
    expect(await names('search=barge')).toEqual(['Quay']);
    expect(await names(`vehicleId=${vehicle.id}&state=draft`)).toEqual(['Quay']);
    expect(await names('state=released')).toEqual([]);
  });

  it('answer a missing version and a senseless number plainly', async () => {
    const engineer = await buildMember(api, 'engineer');
    const { id } = (await engineer.post('/parameter-sets', first)).body as ParameterSetDetail;
    expect((await engineer.get(`/parameter-sets/${id}/versions/7`)).status).toBe(404);
    const senseless = await engineer.get(`/parameter-sets/${id}/versions/last`);
    expect(senseless.status).toBe(422);
    expect(problemOf(senseless).errors?.[0]?.path).toBe('n');
  });
});

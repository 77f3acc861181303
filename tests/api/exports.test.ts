/** What integrators fetch: any version as a file, and the one that is released for a vehicle. */
import { parse } from 'yaml';
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import { type ExportDocument, exportDocumentSchema } from '@/shared/contracts/exports';
import type { Recording } from '@/shared/contracts/recordings';
import { sha256OfJson } from '@/workers';
import { type Api, problemOf, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';
import { buildDraft, buildRequirement, verified } from '../support/api-verification';

describe('exports', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let approver: typeof engineer;
  let recording: Recording;
  let vehicle: { id: string; name: string };
  let path: string;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
    approver = await buildMember(api, 'approver', engineer.workspaceId);
    recording = await buildRecording(engineer);
    vehicle = await buildVehicle(engineer, { leverArmM: [1.2, 0, -0.6] });
    await buildRequirement(engineer, [recording.id]);
    path = (await buildDraft(engineer, vehicle.id, { gyro: { whiteNoiseRadPerSqrtS: 1e-7 } })).path;
  });
  afterAll(() => api.stop());

  const exported = async (of = path) =>
    exportDocumentSchema.parse(JSON.parse((await engineer.get(`${of}/export`)).bytes.toString('utf8')));
  const releasedSet = (query = '', headers: Record<string, string> = {}) =>
    engineer.send('GET', `/vehicles/${vehicle.id}/released-set${query}`, undefined, headers);

  it('of an unreleased version say so in their text, in every format', async () => {
    for (const format of ['json', 'yaml', 'c', 'csv']) {
      const answer = await engineer.get(`${path}/export?format=${format}`);
      expect(answer.status).toBe(200);
      expect(answer.bytes.toString('utf8')).toContain('NOT RELEASED: this version is a draft.');
      expect(answer.bytes.toString('utf8')).toContain('Keep an independent means of navigation.');
    }
    expect((await exported()).released).toBe(false);
    const none = await releasedSet();
    expect(none.status).toBe(404);
    expect(problemOf(none).detail).toContain(vehicle.name);
  });

  it('of a released version say by whom, on which data, with which result', async () => {
    await engineer.post(`${path}/submit`);
    await verified(engineer, path);
    expect((await approver.post(`${path}/release`, { comment: 'Well shown.' })).status).toBe(200);
    const document = await exported();
    const [author, reviewer] = await Promise.all(
      [engineer, approver].map(async ({ userId }) => (await api.ctx.db.User.findByPk(userId))!.name),
    );
    expect(document).toMatchObject({
      released: true,
      vehicle: { name: vehicle.name, leverArmM: [1.2, 0, -0.6] },
      version: { number: 1, state: 'released', note: 'Datasheet figures.' },
      provenance: {
        author,
        reviewer,
        reviewComment: 'Well shown.',
        recordings: [{ id: recording.id, name: recording.name }],
        verification: { cells: 1, passed: 1, waived: 0, withoutRequirements: null },
      },
    });
    expect(document.notice).toMatch(
      new RegExp(`^RELEASED for ${vehicle.name} on \\d{4}-\\d\\d-\\d\\d by ${reviewer}\\.$`),
    );
    expect(document.provenance.engineVersion).toMatch(/\d/);
    expect(document.provenance.recordings[0]?.sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(document.checksum.value).toBe(sha256OfJson(document.parameters));
  });

  it('of the vehicle are the released version, the same in JSON and YAML, with a name and a type', async () => {
    const json = await releasedSet();
    const yaml = await releasedSet('?format=yaml');
    expect(json.headers.get('Content-Type')).toBe('application/json; charset=utf-8');
    expect(yaml.headers.get('Content-Type')).toBe('application/yaml; charset=utf-8');
    expect(parse(yaml.bytes.toString('utf8'))).toEqual(json.body);
    expect(json.body).toEqual(await exported());
    const types = { c: ['text/x-c; charset=utf-8', '.h'], csv: ['text/csv; charset=utf-8', '.csv'] };
    for (const [format, [type, ending]] of Object.entries(types)) {
      const file = await releasedSet(`?format=${format}`);
      expect(file.headers.get('Content-Type')).toBe(type);
      expect(file.headers.get('Content-Disposition')).toMatch(
        new RegExp(`filename="?[\\w.-]+-v1\\${ending}"?$`),
      );
    }
    const unknown = await releasedSet('?format=xml');
    expect(unknown.status).toBe(422);
    expect(problemOf(unknown).errors?.[0]?.path).toBe('format');
  });

  it('are not sent again to who has them, until another version is released', async () => {
    const first = await releasedSet();
    const etag = first.headers.get('ETag')!;
    expect(etag).toMatch(/^"[0-9a-f]{64}"$/);
    const modified = first.headers.get('Last-Modified')!;
    const reviewedAt = (first.body as ExportDocument).provenance.reviewedAt!;
    expect(Date.parse(modified)).toBe(Math.floor(Date.parse(reviewedAt) / 1000) * 1000);
    const conditions: Record<string, string>[] = [
      { 'If-None-Match': etag },
      { 'If-None-Match': `"other", W/${etag}` },
      { 'If-Modified-Since': modified },
    ];
    for (const headers of conditions) {
      const again = await releasedSet('', headers);
      expect(again.status).toBe(304);
      expect(again.bytes).toHaveLength(0);
      expect(again.headers.get('ETag')).toBe(etag);
    }
    expect((await releasedSet('', { 'If-None-Match': '"other"' })).status).toBe(200);

    const set = (await engineer.get(path.replace(/\/versions.*/, ''))).body as ParameterSetDetail;
    const next = `/parameter-sets/${set.id}/versions/2`;
    await engineer.post(`${path}/revise`, {});
    await engineer.post(`${next}/submit`);
    await verified(engineer, next);
    expect((await approver.post(`${next}/release`, {})).status).toBe(200);
    const changed = await releasedSet('', { 'If-None-Match': etag });
    expect(changed.status).toBe(200);
    expect(changed.body).toMatchObject({ version: { number: 2 } });
    expect((await exported()).notice).toContain('SUPERSEDED');
    expect((await exported()).checksum.value).toBe((changed.body as ExportDocument).checksum.value);
  });

  it('do not leave their workspace', async () => {
    const outsider = await buildMember(api, 'admin');
    expect((await outsider.get(`${path}/export`)).status).toBe(404);
    expect((await outsider.get(`/vehicles/${vehicle.id}/released-set`)).status).toBe(404);
  });
});

import { recordingSchema, type Recording } from '@/shared/contracts/recordings';
import { type Api, type Caller, problemOf, startApi } from '../support/api';
import { buildMember, decoded, upload } from '../support/api-factories';
import { smallLogs } from '../support/api-logs';

/** The stamps of a GNSS file moved by so many seconds. */
function logsApart(byS: number) {
  const { imu, gnss } = smallLogs({ durationS: 200, seed: 31 });
  const [header, ...rows] = gnss.trim().split('\n');
  const moved = rows.map((row) => row.replace(/^[^,]+/, (time) => String(Number(time) + byS)));
  return { imu, gnss: [header, ...moved].join('\n') };
}
const codes = (recording: Recording) => recording.health?.findings.map(({ code }) => code);

describe('remedies', () => {
  let api: Api;
  let engineer: Caller & { workspaceId: string };
  let late: Recording;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
    late = await decoded(engineer, (await upload(engineer, {}, logsApart(-1.5))).id);
  });
  afterAll(() => api.stop());

  it('are accepted, decode the recording again, are kept by whom and when, and are taken back', async () => {
    expect(late.health?.verdict).toBe('not-usable');
    expect(codes(late)).toContain('clock-offset');
    const answer = await engineer.post(`/recordings/${late.id}/remedies`, { code: 'clock-offset' });
    expect(answer.status).toBe(202);
    const mended = await decoded(engineer, late.id);
    expect(codes(mended)).not.toContain('clock-offset');
    expect(mended.channelMap?.gnss?.time.offsetS).toBeCloseTo(1.5, 1);
    expect(recordingSchema.parse(mended).remedies).toEqual([
      { code: 'clock-offset', label: expect.stringMatching(/^Shift GNSS by \+1\.(49|50|51) s$/) as string, at: expect.any(String) as string, by: expect.any(String) as string },
    ]); // prettier-ignore
    expect((await engineer.post(`/recordings/${late.id}/remedies/undo`)).status).toBe(202);
    const before = await decoded(engineer, late.id);
    expect(before.remedies).toEqual([]);
    expect(before.channelMap).toEqual(late.channelMap);
    expect(codes(before)).toContain('clock-offset');
    const again = await engineer.post(`/recordings/${late.id}/remedies/undo`);
    expect(again.status).toBe(409);
    const actions = await api.ctx.db.AuditEntry.findAll({ where: { workspaceId: engineer.workspaceId } });
    expect(actions.map(({ action }) => action)).toEqual(
      expect.arrayContaining(['recording.remedied', 'recording.remedy-undone']),
    );
  });

  it('that the report does not offer are refused', async () => {
    const answer = await engineer.post(`/recordings/${late.id}/remedies`, { code: 'turn-sense' });
    expect(answer.status).toBe(422);
    expect(problemOf(answer).errors?.[0]?.path).toBe('code');
  });

  it('are for those who may change recordings of this workspace', async () => {
    const viewer = await buildMember(api, 'viewer', engineer.workspaceId);
    const outsider = await buildMember(api, 'admin');
    const accept = (caller: Caller) =>
      caller.post(`/recordings/${late.id}/remedies`, { code: 'clock-offset' });
    expect((await accept(viewer)).status).toBe(403);
    expect((await accept(outsider)).status).toBe(404);
    expect((await viewer.post(`/recordings/${late.id}/remedies/undo`)).status).toBe(403);
  });

  it('begin anew with a mapping by hand', async () => {
    await engineer.post(`/recordings/${late.id}/remedies`, { code: 'clock-offset' });
    const mended = await decoded(engineer, late.id);
    expect(mended.remedies).toHaveLength(1);
    await engineer.put(`/recordings/${late.id}/channel-map`, mended.channelMap!);
    expect((await decoded(engineer, late.id)).remedies).toEqual([]);
  });

  it.each([
    ['an uptime beside UNIX time', 1_767_225_600, 'clocks-differ'],
    ['two counters that began at different times', 8000, 'no-overlap'],
  ])('bring together logs whose clocks share nothing: %s', async (_, byS, code) => {
    const { id } = await upload(engineer, {}, logsApart(byS));
    const refused = await decoded(engineer, id);
    expect(refused).toMatchObject({ status: 'rejected', problems: [{ code, file: 'gnss' }] });
    const answer = await engineer.post(`/recordings/${id}/remedies`, { code });
    expect(answer.status).toBe(202);
    const mended = await decoded(engineer, id);
    expect(mended.status).toBe('ready');
    expect(mended.channelMap?.gnss?.time.offsetS).toBeCloseTo(-byS, 0);
    expect(codes(mended)).not.toContain('clock-offset');
    await engineer.post(`/recordings/${id}/remedies/undo`);
    expect(await decoded(engineer, id)).toMatchObject({ status: 'rejected', remedies: [] });
  });
});

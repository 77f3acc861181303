import { randomUUID } from 'node:crypto';
import type { Run } from '@/shared/contracts/runs';
import { type Api, startApi, until } from '../support/api';
import { buildMember, buildRecording, decoded, upload } from '../support/api-factories';
import { connectLive } from '../support/api-live';
import { smallLogs } from '../support/api-logs';

describe('the live socket', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api.stop());

  it('lets nobody in without a session, or from another site', async () => {
    await expect(connectLive(api.stranger())).rejects.toThrow(/sign in/i);
    const member = await buildMember(api, 'viewer');
    await expect(connectLive(member, { Origin: 'https://elsewhere.example' })).rejects.toThrow();
    const live = await connectLive(member, { Origin: api.url });
    expect(live.socket.connected).toBe(true);
    live.close();
  });

  it('works where a proxy lets no websocket through', async () => {
    const live = await connectLive(await buildMember(api, 'viewer'), {}, 'polling');
    expect(await live.follow(randomUUID())).toMatchObject({ ok: false });
    live.close();
  });

  it('ends with the session, however it ends', async () => {
    const admin = await buildMember(api, 'admin');
    const member = await buildMember(api, 'engineer', admin.workspaceId);
    const other = await connectLive(admin);
    const byResignation = await connectLive(member);
    await member.delete('/sessions/current');
    await until('the socket is closed', () => !byResignation.socket.connected);
    expect(other.socket.connected).toBe(true);

    const second = await buildMember(api, 'engineer', admin.workspaceId);
    const byRemoval = await connectLive(second);
    await admin.delete(`/members/${second.userId}`);
    await until('the socket is closed', () => !byRemoval.socket.connected);
    expect(other.socket.connected).toBe(true);
    other.close();
  });

  it('follows runs of one’s own workspaces alone', async () => {
    const engineer = await buildMember(api, 'engineer');
    const recording = await buildRecording(engineer);
    const { id } = (await engineer.post('/runs', { recordingId: recording.id })).body as Run;
    const outsider = await connectLive(await buildMember(api, 'admin'));
    expect(await outsider.follow(id)).toMatchObject({ ok: false });
    expect(await outsider.follow(randomUUID())).toMatchObject({ ok: false });
    expect(await outsider.follow('nonsense')).toMatchObject({ ok: false });
    const viewer = await connectLive(await buildMember(api, 'viewer', engineer.workspaceId));
    expect(await viewer.follow(id)).toEqual({ ok: true });
    await until('the summary comes', () => viewer.summaries[0]);
    expect(outsider.frames).toEqual([]);
    expect(outsider.summaries).toEqual([]);
    viewer.close();
    outsider.close();
  });

  it('tells a follower who comes after the end how it ended', async () => {
    const engineer = await buildMember(api, 'engineer');
    const recording = await buildRecording(engineer);
    const { id } = (await engineer.post('/runs', { recordingId: recording.id })).body as Run;
    await until('the run is done', async () => (await api.ctx.db.Run.findByPk(id))?.state === 'done');
    const live = await connectLive(engineer);
    expect(await live.follow(id)).toEqual({ ok: true });
    const message = await until('the summary comes', () => live.summaries[0]);
    expect(message).toMatchObject({ runId: id, hasSeries: true });
    live.close();
  });

  it('tells followers of a cancelled run why there is no more', async () => {
    const engineer = await buildMember(api, 'engineer');
    const long = smallLogs({ durationS: 600, imuRateHz: 100 });
    const recording = await decoded(engineer, (await upload(engineer, {}, long)).id);
    const live = await connectLive(engineer);
    const { id } = (await engineer.post('/runs', { recordingId: recording.id })).body as Run;
    await live.follow(id);
    await engineer.post(`/runs/${id}/cancel`);
    const failure = await until('the end is told', () => live.failures[0]);
    expect(failure).toMatchObject({ runId: id, state: 'cancelled' });
    live.close();
  });

  it('tells the workspace how a recording comes along, and nobody else', async () => {
    const engineer = await buildMember(api, 'engineer');
    const live = await connectLive(await buildMember(api, 'viewer', engineer.workspaceId));
    const outsider = await connectLive(await buildMember(api, 'viewer'));
    const { id } = await buildRecording(engineer);
    await until('ready is told', () => live.recordings.some((message) => message.status === 'ready'));
    await engineer.delete(`/recordings/${id}`);
    await until('the deletion is told', () => live.recordings.some((message) => message.status === null));
    expect(new Set(live.recordings.map((message) => message.recordingId))).toEqual(new Set([id]));
    expect(outsider.recordings).toEqual([]);
    live.close();
    outsider.close();
  });
});

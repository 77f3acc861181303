import { randomUUID } from 'node:crypto';
import type { Run } from '@/shared/contracts/runs';
import { type Api, type Caller, startApi, until } from '../support/api';
import { buildMember, buildRecording } from '../support/api-factories';
import { connectLive, type LiveClient } from '../support/api-live';

describe('two people on one bench', () => {
  let api: Api;
  let engineer: Caller & { workspaceId: string; userId: string };
  let colleague: Caller & { userId: string };
  let recordingId: string;
  beforeAll(async () => {
    api = await startApi();
    engineer = await buildMember(api, 'engineer');
    colleague = await buildMember(api, 'viewer', engineer.workspaceId);
    recordingId = (await buildRecording(engineer)).id;
  });
  afterAll(() => api.stop());

  const benchesSeen = (client: LiveClient) =>
    client.company
      .at(-1)
      ?.visitors.map(({ benchId }) => benchId)
      .sort();

  it('see each other come and go, by name', async () => {
    const [one, two] = [await connectLive(engineer), await connectLive(colleague)];
    const [a, b] = [randomUUID(), randomUUID()];
    expect(await one.openBench(recordingId, a)).toEqual({ ok: true });
    expect(await two.openBench(recordingId, b)).toEqual({ ok: true });
    await until('both are told of', () => benchesSeen(one)?.length === 2 && benchesSeen(two)?.length === 2);
    expect(one.company.at(-1)).toMatchObject({ recordingId });
    const names = one.company.at(-1)!.visitors.map(({ userId, name }) => [userId, name !== '']);
    expect(names).toEqual(expect.arrayContaining([[engineer.userId, true], [colleague.userId, true]])); // prettier-ignore
    two.close();
    await until('the other is gone', () => benchesSeen(one)?.length === 1);
    expect(benchesSeen(one)).toEqual([a]);
    one.close();
  });

  it('hear of each other’s runs, and may follow them', async () => {
    const [one, two] = [await connectLive(engineer), await connectLive(colleague)];
    const [a, b] = [randomUUID(), randomUUID()];
    await one.openBench(recordingId, a);
    await two.openBench(recordingId, b);
    const { id } = (await engineer.post('/runs', { recordingId, benchId: a })).body as Run;
    await until('the run is heard of', () => two.benchRuns.some(({ runId }) => runId === id));
    expect(two.benchRuns.at(-1)).toEqual({ recordingId, benchId: a, runId: id });
    const late = await connectLive(colleague);
    await late.openBench(recordingId, randomUUID());
    await until('who comes later is told of it', () =>
      late.company.at(-1)?.visitors.some(({ benchId, runId }) => benchId === a && runId === id),
    );
    late.close();
    expect(await two.follow(id)).toEqual({ ok: true });
    await until('its figures come', () => two.summaries.some(({ runId }) => runId === id));
    one.close();
    two.close();
  });

  it('leave one bench by opening another', async () => {
    const other = await buildRecording(engineer);
    const [one, two] = [await connectLive(engineer), await connectLive(colleague)];
    await one.openBench(recordingId, randomUUID());
    const b = randomUUID();
    await two.openBench(recordingId, b);
    await until('both are there', () => benchesSeen(one)?.includes(b));
    await two.openBench(other.id, b);
    await until('one is alone', () => benchesSeen(one)?.length === 1);
    one.close();
    two.close();
  });

  it('of another workspace are neither let in nor told anything', async () => {
    const outsider = await connectLive(await buildMember(api, 'admin'));
    expect(await outsider.openBench(recordingId, randomUUID())).toMatchObject({ ok: false });
    expect(await outsider.openBench('nonsense', randomUUID())).toMatchObject({ ok: false });
    const one = await connectLive(engineer);
    await one.openBench(recordingId, randomUUID());
    await until('it is told', () => one.company.length > 0);
    expect(outsider.company).toEqual([]);
    outsider.close();
    one.close();
  });
});

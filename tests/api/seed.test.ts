import {
  DEMO_PASSWORD,
  DEMO_PEOPLE,
  DEMO_RECORDINGS,
  DEMO_REQUIREMENTS,
  DEMO_SETS,
  DEMO_VEHICLES,
} from '@/fixtures/demo-scenario';
import type { Installation } from '@/shared/contracts/accounts';
import type { Recording } from '@/shared/contracts/recordings';
import { seedDemo } from '@/server/seed/demo';
import { type Api, startApi } from '../support/api';
import { buildUser, signIn } from '../support/api-factories';

describe('the demonstration', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi({ DEMO: 'on' });
  });
  afterAll(() => api.stop());

  it('lets everybody sign in whom the sign-in page shows, each in their role', async () => {
    const installation = (await api.stranger().get('/installation')).body as Installation;
    expect(installation).toMatchObject({ needsFirstAdmin: false, demo: true, mailSink: true });
    expect(installation.demoPeople.map(({ role }) => role).sort()).toEqual([
      'admin',
      'approver',
      'engineer',
      'viewer',
    ]);
    for (const { email, password, role } of installation.demoPeople) {
      const me = (await (await signIn(api, email, password)).get('/me')).body;
      expect(me).toMatchObject({ workspaces: [{ role }] });
    }
  });

  it('has its vehicles, sets and recordings, the first of the list on top', async () => {
    const [engineer] = DEMO_PEOPLE;
    const person = await signIn(api, engineer?.email ?? '', DEMO_PASSWORD);
    const names = async (route: string) =>
      ((await person.get(route)).body as { items: Recording[] }).items.map((item) => item.name);
    expect(await names('/recordings')).toEqual(DEMO_RECORDINGS.map((recording) => recording.name));
    expect((await names('/vehicles')).sort()).toEqual(DEMO_VEHICLES.map((vehicle) => vehicle.name).sort());
    expect((await names('/parameter-sets')).sort()).toEqual(DEMO_SETS.map((set) => set.name).sort());
    const required = DEMO_REQUIREMENTS.map(({ requirement }) => requirement.name);
    expect((await names('/requirements')).sort()).toEqual(required.sort());
  });

  it('is put into an empty database alone, and once', async () => {
    const before = await api.ctx.db.Workspace.count();
    expect(await seedDemo(api.ctx)).toBe(false);
    expect(await api.ctx.db.Workspace.count()).toBe(before);
    const own = await startApi();
    await buildUser(own);
    expect(await seedDemo(own.ctx)).toBe(false);
    expect(await own.ctx.db.Workspace.count()).toBe(0);
    await own.stop();
  });
});

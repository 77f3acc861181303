/** Letters about versions: who gets one, who does not, and that none is told of what did not happen. */
import type { Recording } from '@/shared/contracts/recordings';
import { type Api, type Caller, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';
import { buildDraft, buildRequirement, verified } from '../support/api-verification';

const PUBLIC_URL = 'http://drift.kelmarhaven.example';
const reason = { withoutRequirements: 'Bench trial, no requirement is agreed yet.' };

describe('letters about versions', () => {
  let api: Api;
  let author: Awaited<ReturnType<typeof buildMember>>;
  let approver: typeof author;
  let second: typeof author;
  let viewer: typeof author;
  let admin: typeof author;
  let vehicle: { id: string; name: string };
  beforeAll(async () => {
    api = await startApi({ PUBLIC_URL });
  });
  afterAll(() => api.stop());
  beforeEach(async () => {
    author = await buildMember(api, 'engineer');
    const join = (role: 'approver' | 'viewer' | 'admin') => buildMember(api, role, author.workspaceId);
    [approver, second, viewer, admin] = [
      await join('approver'),
      await join('approver'),
      await join('viewer'),
      await join('admin'),
    ];
    await buildMember(api, 'approver'); // of another workspace: nothing here concerns them
    vehicle = await buildVehicle(author);
  });

  const letters = (workspaceId = author.workspaceId) =>
    api.ctx.db.MailMessage.findAll({ where: { workspaceId } });
  const about = async (what: string) =>
    (await letters()).filter(({ subject }) => subject.startsWith(`${what}: `));
  const recipients = async (what: string) => (await about(what)).map(({ recipient }) => recipient).sort();
  const emails = (...people: { email: string }[]) => people.map(({ email }) => email).sort();
  const nameOf = async ({ userId }: { userId: string }) => (await api.ctx.db.User.findByPk(userId))!.name;
  const draft = (caller: Caller = author) => buildDraft(caller, vehicle.id);
  const done = async (caller: Caller, path: string, body: object = {}) =>
    expect((await caller.post(path, body)).status).toBe(200);

  it('ask every approver for a review, but never who wrote or submitted the version', async () => {
    const first = await draft();
    await done(author, `${first.path}/submit`);
    expect(await recipients('Review asked')).toEqual(emails(approver, second));
    const [letter] = await about('Review asked');
    const set = (await author.get(`/parameter-sets/${first.setId}`)).body as { name: string };
    expect(letter!.subject).toBe(`Review asked: “${set.name}”, version 1`);
    for (const words of [
      await nameOf(author),
      `version 1 of “${set.name}”`,
      `“${vehicle.name}”`,
      'Datasheet figures.',
      `${PUBLIC_URL}/sets/${first.setId}?version=1`,
    ]) {
      expect(letter!.text).toContain(words);
    }
    const own = await draft(approver);
    await done(second, `${own.path}/submit`);
    expect(await recipients('Review asked')).toEqual(emails(approver, second)); // no further one
  });

  it('bring a returned version’s comment to its author and to who submitted it', async () => {
    const { path, setId } = await draft();
    await done(second, `${path}/submit`);
    await done(approver, `${path}/return`, { comment: 'Drift after 60 s is too large.' });
    expect(await recipients('Returned')).toEqual(emails(author, second));
    const [letter] = await about('Returned');
    expect(letter!.text).toContain('Drift after 60 s is too large.');
    expect(letter!.text).toContain(await nameOf(approver));
    expect(letter!.text).toContain(`${PUBLIC_URL}/sets/${setId}?version=1`);
  });

  it('tell of a release its author, and of other people’s work those who asked for it', async () => {
    for (const person of [viewer, approver])
      await person.patch('/me/preferences', { letters: { anyReleased: true } });
    const before = await draft();
    await done(author, `${before.path}/submit`);
    await done(approver, `${before.path}/release`, { ...reason, comment: 'Well shown.' });
    expect(await recipients('Released')).toEqual(emails(author, viewer)); // the approver knows
    const next = await draft();
    await done(author, `${next.path}/submit`);
    await done(approver, `${next.path}/release`, reason);
    const [mine] = (await about('Released')).filter(
      ({ recipient, text }) => recipient === author.email && text.includes(next.setId),
    );
    const set = (await author.get(`/parameter-sets/${before.setId}`)).body as { name: string };
    expect(mine!.text).toContain(`It takes the place of ${set.name}, version 1.`);
  });

  it('are not written to who switched them off, nor to who has left', async () => {
    await approver.patch('/me/preferences', { letters: { reviewAsked: false } });
    await admin.delete(`/members/${second.userId}`);
    const { path } = await draft();
    await done(author, `${path}/submit`);
    expect(await about('Review asked')).toEqual([]);
    await author.patch('/me/preferences', { letters: { returned: false } });
    await done(approver, `${path}/return`, { comment: 'No.' });
    expect(await about('Returned')).toEqual([]);
  });

  it('are not written where the change is rolled back', async () => {
    const { path, setId } = await draft();
    const sql = (text: string) => api.ctx.db.sequelize.query(text);
    await sql(`
      CREATE FUNCTION refuse_entry() RETURNS trigger LANGUAGE plpgsql AS $$ BEGIN RAISE 'No room.'; END $$;
      CREATE TRIGGER refuse_entry BEFORE INSERT ON audit_entries FOR EACH ROW
        WHEN (NEW.action = 'version.submitted') EXECUTE FUNCTION refuse_entry();
    `);
    try {
      expect((await author.post(`${path}/submit`)).status).toBe(500);
    } finally {
      await sql('DROP TRIGGER refuse_entry ON audit_entries; DROP FUNCTION refuse_entry;');
    }
    expect(await letters()).toEqual([]);
    await done(author, `${path}/submit`); // it was a draft still
    expect((await about('Review asked')).every(({ text }) => text.includes(setId))).toBe(true);
    expect(await recipients('Review asked')).toEqual(emails(approver, second));
  });

  it('are written once where two release at once', async () => {
    const { path } = await draft();
    await done(author, `${path}/submit`);
    const answers = await Promise.all([approver, second].map((one) => one.post(`${path}/release`, reason)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(await recipients('Released')).toEqual([author.email]);
  });

  describe('of a verification', () => {
    let recordings: Recording[];
    beforeEach(async () => {
      recordings = [
        await buildRecording(author, { name: 'A breakwater' }),
        await buildRecording(author, { name: 'B harbour' }),
      ];
    });
    const ids = () => recordings.map(({ id }) => id);

    it('tell who started it once what fails, when all of it has ended', async () => {
      await buildRequirement(author, ids(), { name: 'Drift, generous' });
      await buildRequirement(author, ids(), { name: 'Drift, too tight', limit: 1e-6 });
      const { path, setId } = await draft();
      await verified(author, path);
      const told = await about('Verification failed');
      expect(told.map(({ recipient }) => recipient)).toEqual([author.email]);
      const { text } = told[0]!;
      expect(text).toContain('2 of 4 cells failed.');
      expect(text).toMatch(
        /– “Drift, too tight” on “A breakwater”: fails.*\n– “Drift, too tight” on “B harbour”: fails/,
      );
      expect(text).not.toContain('generous');
      expect(text).toContain(`${PUBLIC_URL}/sets/${setId}/verification?version=1`);
      await verified(author, path); // nothing is left to run: who asks sees the answer at once
      expect(await about('Verification failed')).toHaveLength(1);
      expect(await api.ctx.db.VerificationWatch.count()).toBe(0);
    });

    it('are not written where every cell passes, nor to who does not want them', async () => {
      await buildRequirement(author, ids());
      const { path } = await draft();
      await verified(author, path);
      await buildRequirement(author, ids(), { limit: 1e-6, schedule: { kind: 'every', everyS: 30, forS: 10, firstAfterS: 5 } }); // prettier-ignore
      await author.patch('/me/preferences', { letters: { verificationFailed: false } });
      const { counts } = await verified(author, path);
      expect(counts.fail).toBe(2);
      expect(await about('Verification failed')).toEqual([]);
    });
  });
});

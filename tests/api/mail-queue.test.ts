/** A mail server that is away delays letters; it loses none and holds nobody up. */
import net, { type AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';
import type { QueuedLetter } from '@/shared/contracts/accounts';
import { type Api, startApi, until } from '../support/api';
import { buildMember, buildVehicle } from '../support/api-factories';
import { buildDraft } from '../support/api-verification';

/** A port that nothing listens on just now. */
async function freePort(): Promise<number> {
  const server = net.createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
  const { port } = server.address() as AddressInfo;
  await new Promise((resolve) => server.close(resolve));
  return port;
}

describe('letters while the mail server is away', () => {
  let api: Api;
  let port: number;
  let smtp: SMTPServer | undefined;
  const arrived: string[] = [];
  beforeAll(async () => {
    port = await freePort();
    api = await startApi({ SMTP_URL: `smtp://127.0.0.1:${port}` });
  });
  afterAll(async () => {
    await api.stop();
    await new Promise<void>((resolve) => (smtp ? smtp.close(() => resolve()) : resolve()));
  });

  const mailServerStarts = () => {
    smtp = new SMTPServer({
      authOptional: true,
      disabledCommands: ['AUTH', 'STARTTLS'],
      onData(stream, session, done) {
        stream.resume();
        stream.on('end', () => {
          arrived.push(...session.envelope.rcptTo.map(({ address }) => address));
          done();
        });
      },
    });
    return new Promise<void>((resolve) => smtp!.listen(port, '127.0.0.1', () => resolve()));
  };

  it('wait where the admin sees them, and arrive when it is back; the review goes through at once', async () => {
    const engineer = await buildMember(api, 'engineer');
    const approver = await buildMember(api, 'approver', engineer.workspaceId);
    const admin = await buildMember(api, 'admin', engineer.workspaceId);
    const queue = async (caller = admin) =>
      ((await caller.get('/mail/queue')).body as { items: QueuedLetter[] }).items;
    const { path } = await buildDraft(engineer, (await buildVehicle(engineer)).id);
    expect((await engineer.post(`${path}/submit`)).body).toMatchObject({ state: 'in-review' });

    const [letter] = await until('the letter was tried in vain', async () => {
      const items = await queue();
      return items[0]?.lastError ? items : null;
    });
    expect(letter).toMatchObject({ to: approver.email, state: 'waiting' });
    expect(letter!.attempts).toBeGreaterThan(0);
    expect(letter!.lastError).toContain('ECONNREFUSED');
    expect(JSON.stringify(letter)).not.toContain('http'); // no link out of it
    expect(await queue(await buildMember(api, 'admin'))).toEqual([]);
    expect((await admin.get('/mail')).status).toBe(404);

    const dueAt = new Date(api.ctx.clock().getTime() + 3_600_000);
    await api.ctx.db.MailMessage.update({ state: 'failed', dueAt }, { where: { id: letter!.id } });
    expect(await queue()).toMatchObject([{ state: 'failed', nextTryAt: null }]);
    const outsider = await buildMember(api, 'admin');
    expect((await outsider.post('/mail/queue/retry', { id: letter!.id })).status).toBe(404);
    await mailServerStarts();
    expect((await admin.post('/mail/queue/retry', { id: letter!.id })).status).toBe(204);
    await until('the letter arrives', () => arrived.includes(approver.email));
    await until('the queue is empty', async () => (await queue()).length === 0);
    expect(arrived).toEqual([approver.email]);
    expect((await admin.post('/mail/queue/retry', {})).status).toBe(204);
  });
});

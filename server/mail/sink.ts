/** The local sink: a mail server on loopback that keeps what it gets, for an installation without a mail server. */
import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';
import type { Logger } from 'pino';
import type { Database } from '../models';
import { readLetter } from './read-letter';

const LARGEST_BYTES = 1_000_000;

export interface MailSink {
  url: string;
  stop(): Promise<void>;
}

export async function startMailSink(db: Database, log: Logger): Promise<MailSink> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: LARGEST_BYTES,
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('error', (error: Error) => done(error));
      stream.on('end', () => {
        const recipients = session.envelope.rcptTo.map((to) => to.address.toLowerCase());
        keep(db, recipients, Buffer.concat(chunks)).then(() => done(), done);
      });
    },
  });
  server.on('error', (error) => log.warn({ err: error }, 'mail sink'));
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
  const { port } = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    stop: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

async function keep(db: Database, recipients: string[], raw: Buffer): Promise<void> {
  const letter = raw.toString('latin1');
  const { subject, text } = readLetter(letter);
  const workspaceId = await workspaceOf(db, letter);
  await db.SinkLetter.bulkCreate(recipients.map((recipient) => ({ workspaceId, recipient, subject, text })));
}

/** Of a letter from our own queue, which is named by its row's id. */
async function workspaceOf(db: Database, letter: string): Promise<string | null> {
  const id = /^message-id:\s*<([0-9a-f-]{36})@driftwright>/im.exec(letter)?.[1];
  const row = id && (await db.MailMessage.findByPk(id, { attributes: ['workspaceId'] }));
  return row ? (row.workspaceId ?? null) : null;
}

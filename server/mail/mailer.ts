/**
 * Outgoing mail: a letter is a row first, written in the transaction of the change that it tells of, and sent
 * afterwards. A dead mail server delays letters and neither loses them nor holds anybody up.
 */
import nodemailer, { type Transporter } from 'nodemailer';
import type { Logger } from 'pino';
import { Op, type Transaction } from 'sequelize';
import { isDatabaseAway, pause } from '../database-state';
import { messageOf } from '../error-details';
import type { Database } from '../models';
import type { MailMessage } from '../models/messages';
import type { Letter } from './letters';
import { queueLetter } from './outbox';

const FIRST_RETRY_MS = 5_000;
const LONGEST_RETRY_MS = 3_600_000;
const GIVE_UP_AFTER_MS = 3 * 24 * 3_600_000;
const LOOK_EVERY_MS = 5_000;
/** How long a mail server may take to answer, ms. */
const PATIENCE = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 };
const STOP_WAIT_MS = 3_000;

export interface Mailer {
  /** Queues a letter (outbox.ts); it leaves as soon as the transaction is committed. */
  send(letter: Letter, transaction: Transaction, workspaceId?: string): Promise<void>;
  /** Looks at once for what is due, once `transaction` is committed. */
  wakeAfter(transaction: Transaction): void;
  stop(): Promise<void>;
}

interface MailerOptions {
  db: Database;
  smtpUrl: string;
  from: string;
  log: Logger;
  clock: () => Date;
}

export function startMailer({ db, smtpUrl, from, log, clock }: MailerOptions): Mailer {
  const transport = nodemailer.createTransport({ url: smtpUrl, ...PATIENCE }, { from });
  const stopping = new AbortController();
  let wake = new AbortController();
  const loop = (async () => {
    while (!stopping.signal.aborted) {
      wake = new AbortController();
      try {
        while (!stopping.signal.aborted && (await sendNext(db, transport, log, clock())));
      } catch (error) {
        if (!isDatabaseAway(error)) log.error({ err: error }, 'mail queue');
      }
      await pause(LOOK_EVERY_MS, AbortSignal.any([wake.signal, stopping.signal]));
    }
  })();
  const wakeAfter = (transaction: Transaction) => transaction.afterCommit(() => wake.abort());
  return {
    async send(letter, transaction, workspaceId) {
      await queueLetter(db, letter, { workspaceId: workspaceId ?? null, now: clock() }, transaction);
      wakeAfter(transaction);
    },
    wakeAfter,
    async stop() {
      stopping.abort();
      await Promise.race([loop, pause(STOP_WAIT_MS, AbortSignal.timeout(STOP_WAIT_MS))]);
      transport.close();
    },
  };
}

/** Takes one letter that is due, locked against other servers, and tries it. False when none is due. */
function sendNext(db: Database, transport: Transporter, log: Logger, now: Date): Promise<boolean> {
  return db.transaction(async (transaction) => {
    const letter = await db.MailMessage.findOne({
      where: { state: 'waiting', dueAt: { [Op.lte]: now } },
      order: [['dueAt', 'ASC']],
      lock: transaction.LOCK.UPDATE,
      skipLocked: true,
      transaction,
    });
    if (!letter) return false;
    await attempt(letter, transport, log, now);
    await letter.save({ transaction });
    return true;
  });
}

async function attempt(letter: MailMessage, transport: Transporter, log: Logger, now: Date): Promise<void> {
  letter.attempts += 1;
  try {
    const { recipient: to, subject, text, html, id } = letter;
    await transport.sendMail({ to, subject, text, html, messageId: `<${id}@driftwright>` });
    letter.state = 'sent';
    letter.lastError = null;
  } catch (error) {
    letter.lastError = messageOf(error);
    const waitMs = Math.min(FIRST_RETRY_MS * 2 ** (letter.attempts - 1), LONGEST_RETRY_MS);
    letter.dueAt = new Date(now.getTime() + waitMs);
    if (now.getTime() - letter.createdAt.getTime() > GIVE_UP_AFTER_MS) letter.state = 'failed';
    log.warn({ err: error, letter: letter.id, attempts: letter.attempts }, 'a letter could not be sent');
  }
}

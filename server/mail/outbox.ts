/** The outbox: a letter is written in the transaction of the change that it tells of, by whichever process makes it. */
import type { Transaction } from 'sequelize';
import type { Database } from '../models';
import type { Letter } from './letters';

/** Where the transaction is rolled back, there is no letter. A server sends it within seconds of the commit. */
export async function queueLetter(
  db: Database,
  { to: recipient, subject, text, html }: Letter,
  { workspaceId, now }: { workspaceId: string | null; now: Date },
  transaction: Transaction,
): Promise<void> {
  const row = { workspaceId, recipient, subject, text, html, dueAt: now };
  await db.MailMessage.create(row, { transaction });
}

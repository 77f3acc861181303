import type { SignedInSession } from '@/shared/contracts/accounts';
import type { OpenSession } from '../services/sessions';

export const presentSession = ({ id, current, sess }: OpenSession): SignedInSession => ({
  id,
  current,
  startedAt: timeOf(sess.startedAt),
  seenAt: timeOf(sess.seenAt),
  address: sess.address ?? null,
  browser: sess.userAgent || null,
});

const timeOf = (ms: number | undefined) => (ms === undefined ? null : new Date(ms).toISOString());

import type { Token } from '@/shared/contracts/tokens';
import type { ApiToken } from '../models/api-token';

export const presentToken = (row: ApiToken, now: Date): Token => ({
  id: row.id,
  name: row.name,
  prefix: row.prefix,
  scopes: row.scopes,
  state: stateOf(row, now),
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
  expiresAt: row.expiresAt?.toISOString() ?? null,
  lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
  lastUsedFrom: row.lastUsedFrom ?? null,
  revokedAt: row.revokedAt?.toISOString() ?? null,
});

function stateOf({ revokedAt, expiresAt }: ApiToken, now: Date): Token['state'] {
  if (revokedAt) return 'revoked';
  return expiresAt && expiresAt <= now ? 'expired' : 'active';
}

/** API tokens, kept as hashes alone. */
import type { Migration } from './runner';

export const createApiTokens: Migration = {
  name: '2026-12-01-create-api-tokens',
  up: `
    CREATE TABLE api_tokens (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      created_by_id uuid NOT NULL REFERENCES users,
      name text NOT NULL,
      prefix text NOT NULL,
      token_hash text NOT NULL UNIQUE,
      scopes jsonb NOT NULL,
      expires_at timestamptz,
      last_used_at timestamptz,
      last_used_from text,
      revoked_at timestamptz,
      created_at timestamptz NOT NULL
    );
    CREATE UNIQUE INDEX api_tokens_name ON api_tokens (workspace_id, lower(name)) WHERE revoked_at IS NULL;
  `,
  down: `DROP TABLE api_tokens;`,
};

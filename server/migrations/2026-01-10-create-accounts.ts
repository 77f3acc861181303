import type { Migration } from './runner';

export const createAccounts: Migration = {
  name: '2026-01-10-create-accounts',
  up: `
    CREATE TABLE users (
      id uuid PRIMARY KEY,
      email text NOT NULL UNIQUE CHECK (email = lower(email)),
      name text NOT NULL,
      password_hash text NOT NULL,
      created_at timestamptz NOT NULL
    );
    CREATE TABLE workspaces (
      id uuid PRIMARY KEY,
      name text NOT NULL,
      demo boolean NOT NULL DEFAULT false,
      created_at timestamptz NOT NULL
    );
    CREATE TABLE memberships (
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      role text NOT NULL CHECK (role IN ('viewer', 'engineer', 'approver', 'admin')),
      created_at timestamptz NOT NULL,
      PRIMARY KEY (workspace_id, user_id)
    );
    CREATE INDEX memberships_user ON memberships (user_id);
    CREATE TABLE invitations (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      email text NOT NULL CHECK (email = lower(email)),
      role text NOT NULL CHECK (role IN ('viewer', 'engineer', 'approver', 'admin')),
      token_hash text NOT NULL UNIQUE,
      invited_by_id uuid NOT NULL REFERENCES users,
      expires_at timestamptz NOT NULL,
      accepted_at timestamptz,
      created_at timestamptz NOT NULL
    );
    CREATE UNIQUE INDEX invitations_open ON invitations (workspace_id, email) WHERE accepted_at IS NULL;
    CREATE TABLE password_resets (
      id uuid PRIMARY KEY,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      token_hash text NOT NULL UNIQUE,
      expires_at timestamptz NOT NULL,
      used_at timestamptz,
      created_at timestamptz NOT NULL
    );
    CREATE TABLE sessions (
      sid text PRIMARY KEY,
      sess json NOT NULL,
      expire timestamp(6) NOT NULL
    );
    CREATE INDEX sessions_expire ON sessions (expire);
    CREATE INDEX sessions_user ON sessions ((sess ->> 'userId'));
  `,
  down: `DROP TABLE sessions, password_resets, invitations, memberships, workspaces, users;`,
};

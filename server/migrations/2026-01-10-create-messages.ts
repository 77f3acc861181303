import type { Migration } from './runner';

export const createMessages: Migration = {
  name: '2026-01-10-create-messages',
  up: `
    CREATE TABLE mail_messages (
      id uuid PRIMARY KEY,
      recipient text NOT NULL,
      subject text NOT NULL,
      text text NOT NULL,
      html text NOT NULL,
      state text NOT NULL CHECK (state IN ('waiting', 'sent', 'failed')),
      attempts integer NOT NULL DEFAULT 0,
      due_at timestamptz NOT NULL,
      last_error text,
      created_at timestamptz NOT NULL
    );
    CREATE INDEX mail_messages_waiting ON mail_messages (due_at) WHERE state = 'waiting';
    CREATE TABLE sink_messages (
      id uuid PRIMARY KEY,
      recipient text NOT NULL,
      subject text NOT NULL,
      text text NOT NULL,
      created_at timestamptz NOT NULL
    );
    CREATE INDEX sink_messages_newest ON sink_messages (created_at DESC);
    CREATE TABLE audit_entries (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      actor_id uuid REFERENCES users ON DELETE SET NULL,
      actor_name text NOT NULL,
      action text NOT NULL,
      subject text NOT NULL,
      detail jsonb NOT NULL,
      address text,
      created_at timestamptz NOT NULL
    );
    CREATE INDEX audit_entries_newest ON audit_entries (workspace_id, created_at DESC, id DESC);
  `,
  down: `DROP TABLE audit_entries, sink_messages, mail_messages;`,
};

/** Letters belong to a workspace where they tell of its work; who waits for the end of a verification is kept. */
import type { Migration } from './runner';

export const addLetters: Migration = {
  name: '2026-12-01-add-letters',
  up: `
    ALTER TABLE mail_messages ADD COLUMN workspace_id uuid REFERENCES workspaces ON DELETE CASCADE;
    CREATE INDEX mail_messages_unsent ON mail_messages (created_at DESC, id DESC) WHERE state <> 'sent';
    ALTER TABLE sink_messages ADD COLUMN workspace_id uuid REFERENCES workspaces ON DELETE CASCADE;
    CREATE TABLE verification_watches (
      version_id uuid NOT NULL REFERENCES set_versions ON DELETE CASCADE,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      base_url text NOT NULL,
      created_at timestamptz NOT NULL,
      PRIMARY KEY (version_id, user_id)
    );
  `,
  down: `
    DROP TABLE verification_watches;
    ALTER TABLE sink_messages DROP COLUMN workspace_id;
    ALTER TABLE mail_messages DROP COLUMN workspace_id;
  `,
};

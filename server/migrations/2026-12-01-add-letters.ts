/**
 * Letters belong to a workspace where they tell of its work; who waits for the end of a verification is kept. The sink
 * holds no reference: it takes a letter in while the mailer keeps that letter's row locked, and a deletion of the
 * workspace that waits for the row would make the sink wait for the deletion, and so each for the other, for ever.
 */
import type { Migration } from './runner';

export const addLetters: Migration = {
  name: '2026-12-01-add-letters',
  up: `
    ALTER TABLE mail_messages ADD COLUMN workspace_id uuid REFERENCES workspaces ON DELETE CASCADE;
    CREATE INDEX mail_messages_unsent ON mail_messages (created_at DESC, id DESC) WHERE state <> 'sent';
    ALTER TABLE sink_messages ADD COLUMN workspace_id uuid;
    CREATE INDEX sink_messages_workspace ON sink_messages (workspace_id);
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

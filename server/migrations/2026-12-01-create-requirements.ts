/** Requirements, and the recordings that each is judged on. */
import type { Migration } from './runner';

export const createRequirements: Migration = {
  name: '2026-12-01-create-requirements',
  up: `
    CREATE TABLE requirements (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      vehicle_id uuid REFERENCES vehicles DEFERRABLE,
      created_by_id uuid NOT NULL REFERENCES users,
      name text NOT NULL,
      metric jsonb NOT NULL,
      comparison text NOT NULL CHECK (comparison IN ('at-most', 'at-least', 'inside-bounds')),
      limit_value double precision,
      schedule jsonb NOT NULL,
      created_at timestamptz NOT NULL,
      changed_at timestamptz NOT NULL
    );
    CREATE UNIQUE INDEX requirements_name ON requirements (workspace_id, lower(name));
    CREATE INDEX requirements_vehicle ON requirements (vehicle_id);
    CREATE TABLE requirement_recordings (
      requirement_id uuid NOT NULL REFERENCES requirements ON DELETE CASCADE,
      recording_id uuid NOT NULL REFERENCES recordings ON DELETE CASCADE,
      PRIMARY KEY (requirement_id, recording_id)
    );
    CREATE INDEX requirement_recordings_recording ON requirement_recordings (recording_id);
  `,
  down: `DROP TABLE requirement_recordings, requirements;`,
};

/** Channel maps that are kept with a vehicle. */
import type { Migration } from './runner';

export const createMapTemplates: Migration = {
  name: '2026-12-01-create-map-templates',
  up: `
    CREATE TABLE channel_map_templates (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      vehicle_id uuid NOT NULL REFERENCES vehicles ON DELETE CASCADE,
      created_by_id uuid NOT NULL REFERENCES users,
      name text NOT NULL,
      channel_map jsonb NOT NULL,
      created_at timestamptz NOT NULL
    );
    CREATE UNIQUE INDEX channel_map_templates_name ON channel_map_templates (vehicle_id, lower(name));
  `,
  down: `DROP TABLE channel_map_templates;`,
};

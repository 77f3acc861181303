import type { Migration } from './runner';

export const createRecordings: Migration = {
  name: '2026-01-11-create-recordings',
  up: `
    CREATE TABLE vehicles (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      name text NOT NULL,
      kind text NOT NULL,
      lever_arm_m jsonb NOT NULL,
      axes jsonb NOT NULL,
      notes text NOT NULL,
      created_at timestamptz NOT NULL
    );
    CREATE UNIQUE INDEX vehicles_name ON vehicles (workspace_id, lower(name));
    CREATE TABLE recordings (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      vehicle_id uuid REFERENCES vehicles,
      created_by_id uuid NOT NULL REFERENCES users,
      name text NOT NULL,
      notes text NOT NULL,
      status text NOT NULL CHECK (status IN ('uploaded', 'decoding', 'ready', 'needs-mapping', 'rejected')),
      progress double precision NOT NULL,
      problems jsonb NOT NULL,
      previews jsonb NOT NULL,
      given_map jsonb,
      channel_map jsonb,
      scenario jsonb,
      start_s double precision,
      end_s double precision,
      has_reference boolean NOT NULL,
      time_origin jsonb,
      health jsonb,
      strip jsonb,
      sha256 text,
      generation integer NOT NULL,
      instance_id uuid,
      confirmed_at timestamptz,
      deleted_at timestamptz,
      created_at timestamptz NOT NULL
    );
    CREATE INDEX recordings_newest ON recordings (workspace_id, created_at DESC, id DESC);
    CREATE INDEX recordings_vehicle ON recordings (vehicle_id);
    CREATE INDEX recordings_in_hand ON recordings (instance_id) WHERE instance_id IS NOT NULL;
    CREATE TABLE recording_files (
      recording_id uuid NOT NULL REFERENCES recordings ON DELETE CASCADE,
      role text NOT NULL CHECK (role IN ('imu', 'gnss', 'reference')),
      name text NOT NULL,
      store_key text NOT NULL,
      bytes bigint NOT NULL,
      sha256 text NOT NULL,
      PRIMARY KEY (recording_id, role)
    );
  `,
  down: `DROP TABLE recording_files, recordings, vehicles;`,
};

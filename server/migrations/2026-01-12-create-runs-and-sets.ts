import type { Migration } from './runner';

export const createRunsAndSets: Migration = {
  name: '2026-01-12-create-runs-and-sets',
  up: `
    CREATE TABLE runs (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      recording_id uuid NOT NULL REFERENCES recordings ON DELETE CASCADE,
      created_by_id uuid NOT NULL REFERENCES users,
      bench_id uuid,
      state text NOT NULL
        CHECK (state IN ('queued', 'running', 'done', 'failed', 'cancelled', 'superseded')),
      progress double precision NOT NULL,
      failure text,
      parameters jsonb NOT NULL,
      lever_arm_m jsonb NOT NULL,
      outages jsonb NOT NULL,
      output_rate_hz double precision NOT NULL,
      has_series boolean NOT NULL,
      summary jsonb,
      provenance jsonb,
      instance_id uuid,
      finished_at timestamptz,
      created_at timestamptz NOT NULL
    );
    CREATE INDEX runs_newest ON runs (workspace_id, created_at DESC, id DESC);
    CREATE INDEX runs_recording ON runs (recording_id);
    CREATE INDEX runs_bench ON runs (workspace_id, bench_id, created_at DESC) WHERE bench_id IS NOT NULL;
    CREATE INDEX runs_going ON runs (instance_id) WHERE state IN ('queued', 'running');
    CREATE TABLE parameter_sets (
      id uuid PRIMARY KEY,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      vehicle_id uuid REFERENCES vehicles,
      created_by_id uuid NOT NULL REFERENCES users,
      name text NOT NULL,
      created_at timestamptz NOT NULL
    );
    CREATE UNIQUE INDEX parameter_sets_name ON parameter_sets (workspace_id, lower(name));
    CREATE TABLE set_versions (
      id uuid PRIMARY KEY,
      set_id uuid NOT NULL REFERENCES parameter_sets ON DELETE CASCADE,
      number integer NOT NULL CHECK (number > 0),
      state text NOT NULL
        CHECK (state IN ('draft', 'in-review', 'returned', 'released', 'superseded')),
      note text NOT NULL,
      parameters jsonb NOT NULL,
      outages jsonb NOT NULL,
      run_id uuid REFERENCES runs ON DELETE SET NULL,
      recording_id uuid REFERENCES recordings ON DELETE SET NULL,
      parent_number integer,
      created_by_id uuid NOT NULL REFERENCES users,
      review_comment text,
      reviewed_by_id uuid REFERENCES users,
      reviewed_at timestamptz,
      created_at timestamptz NOT NULL,
      UNIQUE (set_id, number)
    );
    CREATE INDEX set_versions_run ON set_versions (run_id);
    CREATE INDEX set_versions_recording ON set_versions (recording_id);
  `,
  down: `DROP TABLE set_versions, parameter_sets, runs;`,
};

/** Runs made to judge versions by, what was judged, and what an approver waived in writing. */
import type { Migration } from './runner';

export const createVerification: Migration = {
  name: '2026-12-01-create-verification',
  up: `
    CREATE TABLE verification_runs (
      id uuid PRIMARY KEY,
      version_id uuid NOT NULL REFERENCES set_versions ON DELETE CASCADE,
      recording_id uuid NOT NULL REFERENCES recordings ON DELETE CASCADE,
      created_by_id uuid NOT NULL REFERENCES users,
      input_hash text NOT NULL,
      inputs jsonb NOT NULL,
      parameters jsonb NOT NULL,
      state text NOT NULL CHECK (state IN ('waiting', 'running', 'done', 'failed')),
      progress double precision NOT NULL,
      failure text,
      run_id uuid REFERENCES runs ON DELETE SET NULL,
      bias_sigma jsonb,
      instance_id uuid,
      created_at timestamptz NOT NULL,
      finished_at timestamptz,
      UNIQUE (version_id, recording_id, input_hash)
    );
    CREATE INDEX verification_runs_run ON verification_runs (run_id);
    CREATE INDEX verification_runs_in_hand ON verification_runs (instance_id) WHERE instance_id IS NOT NULL;
    CREATE TABLE verification_cells (
      version_id uuid NOT NULL REFERENCES set_versions ON DELETE CASCADE,
      requirement_id uuid NOT NULL REFERENCES requirements ON DELETE CASCADE,
      recording_id uuid NOT NULL REFERENCES recordings ON DELETE CASCADE,
      verification_run_id uuid NOT NULL REFERENCES verification_runs ON DELETE CASCADE,
      requirement_hash text NOT NULL,
      definition jsonb NOT NULL,
      verdict text CHECK (verdict IN ('pass', 'fail', 'not-applicable', 'failed')),
      value double precision,
      bounds jsonb,
      reason text,
      judged_at timestamptz,
      PRIMARY KEY (version_id, requirement_id, recording_id)
    );
    CREATE INDEX verification_cells_run ON verification_cells (verification_run_id);
    CREATE TABLE waivers (
      id uuid PRIMARY KEY,
      version_id uuid NOT NULL REFERENCES set_versions ON DELETE CASCADE,
      requirement_id uuid NOT NULL,
      recording_id uuid NOT NULL,
      requirement_hash text NOT NULL,
      input_hash text NOT NULL,
      text text NOT NULL,
      created_by_id uuid NOT NULL REFERENCES users,
      created_at timestamptz NOT NULL,
      UNIQUE (version_id, requirement_id, recording_id, requirement_hash, input_hash)
    );
    CREATE FUNCTION keep_waivers() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF TG_OP = 'INSERT' THEN
        IF EXISTS (
          SELECT FROM set_versions WHERE id = NEW.version_id
            AND (state <> 'in-review' OR NEW.created_by_id IN (created_by_id, submitted_by_id))
        ) THEN
          RAISE EXCEPTION 'A waiver is given in review, never by who wrote or submitted the version.'
            USING ERRCODE = 'restrict_violation';
        END IF;
        RETURN NEW;
      END IF;
      IF EXISTS (SELECT FROM set_versions WHERE id = OLD.version_id) THEN
        RAISE EXCEPTION 'A waiver is never changed.' USING ERRCODE = 'restrict_violation';
      END IF;
      RETURN coalesce(NEW, OLD);
    END $$;
    CREATE TRIGGER waivers_keep BEFORE INSERT OR UPDATE OR DELETE ON waivers
      FOR EACH ROW EXECUTE FUNCTION keep_waivers();
  `,
  down: `
    DROP TABLE waivers;
    DROP FUNCTION keep_waivers;
    DROP TABLE verification_cells, verification_runs;
  `,
};

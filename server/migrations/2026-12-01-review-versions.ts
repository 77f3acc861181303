/**
 * The life of a version, held by the database itself: draft → in review → returned or released → superseded. What has been
 * submitted is never changed again; one version is released for a vehicle; nobody reviews what they wrote or submitted.
 * Only the deletion of a whole workspace takes submitted versions with it.
 */
import type { Migration } from './runner';

export const reviewVersions: Migration = {
  name: '2026-12-01-review-versions',
  up: `
    ALTER TABLE parameter_sets ADD COLUMN last_number integer NOT NULL DEFAULT 0;
    UPDATE parameter_sets SET last_number =
      coalesce((SELECT max(number) FROM set_versions WHERE set_id = parameter_sets.id), 0);
    ALTER TABLE set_versions
      ADD COLUMN submitted_by_id uuid REFERENCES users,
      ADD COLUMN submitted_at timestamptz,
      ADD COLUMN vehicle_id uuid REFERENCES vehicles DEFERRABLE,
      ADD COLUMN evidence jsonb,
      ADD CONSTRAINT set_versions_submitted CHECK (state = 'draft' OR submitted_by_id IS NOT NULL),
      ADD CONSTRAINT set_versions_four_eyes CHECK (
        state IN ('draft', 'in-review')
        OR (reviewed_by_id IS NOT NULL AND reviewed_by_id <> created_by_id AND reviewed_by_id <> submitted_by_id)
      ),
      ADD CONSTRAINT set_versions_vehicle CHECK (state NOT IN ('released', 'superseded') OR vehicle_id IS NOT NULL);
    -- So that one transaction can delete a workspace with all that hangs together in it.
    ALTER TABLE recordings ALTER CONSTRAINT recordings_vehicle_id_fkey DEFERRABLE;
    ALTER TABLE parameter_sets ALTER CONSTRAINT parameter_sets_vehicle_id_fkey DEFERRABLE;
    CREATE UNIQUE INDEX set_versions_one_released ON set_versions (vehicle_id) WHERE state = 'released';
    CREATE INDEX set_versions_state ON set_versions (state, set_id);

    CREATE FUNCTION keep_versions() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF TG_OP = 'INSERT' THEN
        IF NEW.state <> 'draft' THEN
          RAISE EXCEPTION 'A version begins as a draft.' USING ERRCODE = 'restrict_violation';
        END IF;
        RETURN NEW;
      END IF;
      IF TG_OP = 'DELETE' THEN
        IF OLD.state <> 'draft' AND EXISTS (SELECT FROM parameter_sets WHERE id = OLD.set_id) THEN
          RAISE EXCEPTION 'A version that was submitted is never deleted.' USING ERRCODE = 'restrict_violation';
        END IF;
        RETURN OLD;
      END IF;
      IF NOT EXISTS (
        SELECT FROM parameter_sets s JOIN workspaces w ON w.id = s.workspace_id WHERE s.id = OLD.set_id
      ) THEN
        RETURN NEW; -- the workspace is being deleted
      END IF;
      IF (NEW.id, NEW.set_id, NEW.number, NEW.created_by_id, NEW.created_at)
        IS DISTINCT FROM (OLD.id, OLD.set_id, OLD.number, OLD.created_by_id, OLD.created_at) THEN
        RAISE EXCEPTION 'Number, author and date of a version are never changed.' USING ERRCODE = 'restrict_violation';
      END IF;
      IF (OLD.state, NEW.state) NOT IN (
        ('draft', 'draft'), ('draft', 'in-review'), ('in-review', 'in-review'), ('in-review', 'returned'),
        ('in-review', 'released'), ('returned', 'returned'), ('released', 'released'), ('released', 'superseded'),
        ('superseded', 'superseded')
      ) THEN
        RAISE EXCEPTION 'A version does not go from % to %.', OLD.state, NEW.state
          USING ERRCODE = 'restrict_violation';
      END IF;
      IF OLD.state <> 'draft' AND
        (NEW.note, NEW.parameters, NEW.outages, NEW.run_id, NEW.recording_id, NEW.parent_number,
          NEW.submitted_by_id, NEW.submitted_at)
        IS DISTINCT FROM
        (OLD.note, OLD.parameters, OLD.outages, OLD.run_id, OLD.recording_id, OLD.parent_number,
          OLD.submitted_by_id, OLD.submitted_at) THEN
        RAISE EXCEPTION 'A version that was submitted is never changed.' USING ERRCODE = 'restrict_violation';
      END IF;
      IF OLD.state IN ('returned', 'released', 'superseded') AND
        (NEW.review_comment, NEW.reviewed_by_id, NEW.reviewed_at, NEW.vehicle_id, NEW.evidence)
        IS DISTINCT FROM
        (OLD.review_comment, OLD.reviewed_by_id, OLD.reviewed_at, OLD.vehicle_id, OLD.evidence) THEN
        RAISE EXCEPTION 'A review that was given is never changed.' USING ERRCODE = 'restrict_violation';
      END IF;
      IF NEW.state = 'released' AND NEW.vehicle_id IS DISTINCT FROM
        (SELECT vehicle_id FROM parameter_sets WHERE id = NEW.set_id) THEN
        RAISE EXCEPTION 'A version is released for the vehicle of its set.' USING ERRCODE = 'restrict_violation';
      END IF;
      RETURN NEW;
    END $$;
    CREATE TRIGGER set_versions_keep BEFORE INSERT OR UPDATE OR DELETE ON set_versions
      FOR EACH ROW EXECUTE FUNCTION keep_versions();

    CREATE FUNCTION keep_sets() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF TG_OP = 'DELETE' THEN
        IF EXISTS (SELECT FROM workspaces WHERE id = OLD.workspace_id)
          AND EXISTS (SELECT FROM set_versions WHERE set_id = OLD.id AND state <> 'draft') THEN
          RAISE EXCEPTION 'A set with a submitted version is never deleted.' USING ERRCODE = 'restrict_violation';
        END IF;
        RETURN OLD;
      END IF;
      IF NEW.workspace_id <> OLD.workspace_id OR (NEW.vehicle_id IS DISTINCT FROM OLD.vehicle_id AND EXISTS (
        SELECT FROM set_versions WHERE set_id = OLD.id AND state IN ('in-review', 'released', 'superseded')
      )) THEN
        RAISE EXCEPTION 'A set with a version in review or released keeps its vehicle.'
          USING ERRCODE = 'restrict_violation';
      END IF;
      RETURN NEW;
    END $$;
    CREATE TRIGGER parameter_sets_keep BEFORE UPDATE OR DELETE ON parameter_sets
      FOR EACH ROW EXECUTE FUNCTION keep_sets();

    CREATE TABLE version_comments (
      id uuid PRIMARY KEY,
      version_id uuid NOT NULL REFERENCES set_versions ON DELETE CASCADE,
      created_by_id uuid NOT NULL REFERENCES users,
      path text,
      text text NOT NULL,
      created_at timestamptz NOT NULL
    );
    CREATE INDEX version_comments_version ON version_comments (version_id, created_at);

    ALTER TABLE audit_entries ADD COLUMN subject_id uuid;
    CREATE INDEX audit_entries_subject ON audit_entries (subject_id, created_at) WHERE subject_id IS NOT NULL;
    CREATE FUNCTION keep_audit() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF NOT EXISTS (SELECT FROM workspaces WHERE id = OLD.workspace_id) THEN
        RETURN coalesce(NEW, OLD); -- the workspace is being deleted
      END IF;
      IF TG_OP = 'UPDATE' AND NEW.actor_id IS NULL AND
        (NEW.id, NEW.workspace_id, NEW.actor_name, NEW.action, NEW.subject, NEW.subject_id, NEW.detail,
          NEW.address, NEW.created_at)
        IS NOT DISTINCT FROM
        (OLD.id, OLD.workspace_id, OLD.actor_name, OLD.action, OLD.subject, OLD.subject_id, OLD.detail,
          OLD.address, OLD.created_at) THEN
        RETURN NEW; -- the person's account is deleted; the name stays
      END IF;
      RAISE EXCEPTION 'The audit trail is only ever added to.' USING ERRCODE = 'restrict_violation';
    END $$;
    CREATE TRIGGER audit_entries_keep BEFORE UPDATE OR DELETE ON audit_entries
      FOR EACH ROW EXECUTE FUNCTION keep_audit();
  `,
  down: `
    DROP TRIGGER audit_entries_keep ON audit_entries;
    DROP FUNCTION keep_audit;
    DROP INDEX audit_entries_subject;
    ALTER TABLE audit_entries DROP COLUMN subject_id;
    DROP TABLE version_comments;
    DROP TRIGGER parameter_sets_keep ON parameter_sets;
    DROP FUNCTION keep_sets;
    DROP TRIGGER set_versions_keep ON set_versions;
    DROP FUNCTION keep_versions;
    DROP INDEX set_versions_state, set_versions_one_released;
    ALTER TABLE set_versions
      DROP CONSTRAINT set_versions_vehicle,
      DROP CONSTRAINT set_versions_four_eyes,
      DROP CONSTRAINT set_versions_submitted,
      DROP COLUMN evidence,
      DROP COLUMN vehicle_id,
      DROP COLUMN submitted_at,
      DROP COLUMN submitted_by_id;
    ALTER TABLE parameter_sets DROP COLUMN last_number;
    ALTER TABLE parameter_sets ALTER CONSTRAINT parameter_sets_vehicle_id_fkey NOT DEFERRABLE;
    ALTER TABLE recordings ALTER CONSTRAINT recordings_vehicle_id_fkey NOT DEFERRABLE;
  `,
};

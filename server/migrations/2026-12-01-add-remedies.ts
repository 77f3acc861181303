/** Remedies of the health report that were accepted, in order. */
import type { Migration } from './runner';

export const addRemedies: Migration = {
  name: '2026-12-01-add-remedies',
  up: `ALTER TABLE recordings ADD COLUMN remedies jsonb NOT NULL DEFAULT '[]';`,
  down: `ALTER TABLE recordings DROP COLUMN remedies;`,
};

/** What a person chose for themselves: display units, hints seen. */
import type { Migration } from './runner';

export const addPreferences: Migration = {
  name: '2026-12-01-add-preferences',
  up: `ALTER TABLE users ADD COLUMN preferences jsonb NOT NULL DEFAULT '{}';`,
  down: `ALTER TABLE users DROP COLUMN preferences;`,
};

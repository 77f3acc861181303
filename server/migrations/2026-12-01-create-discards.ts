/** Files that are to be removed from the store: named in the transaction that deletes the rows they belong to. */
import type { Migration } from './runner';

export const createDiscards: Migration = {
  name: '2026-12-01-create-discards',
  up: `
    CREATE TABLE discards (
      prefix text PRIMARY KEY,
      created_at timestamptz NOT NULL
    );
  `,
  down: `DROP TABLE discards;`,
};

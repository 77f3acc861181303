/** What a run was asked for beyond the filter's pass. */
import type { Migration } from './runner';

export const addSmoothingAndBudget: Migration = {
  name: '2026-12-01-add-smoothing-and-budget',
  up: `
    ALTER TABLE runs
      ADD COLUMN smooth boolean NOT NULL DEFAULT false,
      ADD COLUMN error_budget boolean NOT NULL DEFAULT false;
  `,
  down: `ALTER TABLE runs DROP COLUMN smooth, DROP COLUMN error_budget;`,
};

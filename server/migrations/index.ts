/** Every migration, oldest first. A migration is never changed once it has left this machine; write a new one. */
import { createAccounts } from './2026-01-10-create-accounts';
import { createMessages } from './2026-01-10-create-messages';
import { createRecordings } from './2026-01-11-create-recordings';
import { createRunsAndSets } from './2026-01-12-create-runs-and-sets';
import { addRemedies } from './2026-12-01-add-remedies';
import { addSensorModel } from './2026-12-01-add-sensor-model';
import { addSmoothingAndBudget } from './2026-12-01-add-smoothing-and-budget';
import { allowSecondImuFile } from './2026-12-01-allow-second-imu-file';
import { createVerification } from './2026-12-01-create-verification';
import { createApiTokens } from './2026-12-01-create-api-tokens';
import { createDiscards } from './2026-12-01-create-discards';
import { createRequirements } from './2026-12-01-create-requirements';
import { createMapTemplates } from './2026-12-01-create-map-templates';
import { reviewVersions } from './2026-12-01-review-versions';
import { addPreferences } from './2026-12-01-add-preferences';
import { addLetters } from './2026-12-01-add-letters';
import { runMigrations, type Migration } from './runner';

export const MIGRATIONS: readonly Migration[] = [
  createAccounts,
  createMessages,
  createRecordings,
  createRunsAndSets,
  addSmoothingAndBudget,
  addSensorModel,
  allowSecondImuFile,
  addRemedies,
  createMapTemplates,
  addPreferences,
  reviewVersions,
  createRequirements,
  createVerification,
  createApiTokens,
  createDiscards,
  addLetters,
];

/** Brings the database at `url` up to date; answers the names that were applied. */
export const migrate = (url: string) => runMigrations(url, MIGRATIONS);

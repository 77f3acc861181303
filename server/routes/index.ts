/** Every route of the API, version 1. */
import { accountRoutes } from './accounts';
import { mailRoutes } from './mail';
import { mapTemplateRoutes } from './map-templates';
import { auditRoutes } from './audit';
import { exportRoutes } from './exports';
import { parameterSetRoutes } from './parameter-sets';
import { recordingFileRoutes } from './recording-files';
import { recordingRoutes } from './recordings';
import { reportRoutes } from './report';
import { requirementRoutes } from './requirements';
import type { Route } from './route';
import { runRoutes } from './runs';
import { sessionRoutes } from './sessions';
import { statusRoutes } from './status';
import { teamRoutes } from './team';
import { tokenRoutes } from './tokens';
import { vehicleRoutes } from './vehicles';
import { verificationRoutes } from './verification';
import { versionRoutes } from './versions';
import { workspaceRoutes } from './workspace';

export const ROUTES: readonly Route[] = [
  ...statusRoutes,
  ...accountRoutes,
  ...sessionRoutes,
  ...teamRoutes,
  ...mailRoutes,
  ...workspaceRoutes,
  ...tokenRoutes,
  ...auditRoutes,
  ...vehicleRoutes,
  ...mapTemplateRoutes,
  ...recordingRoutes,
  ...recordingFileRoutes,
  ...runRoutes,
  ...parameterSetRoutes,
  ...versionRoutes,
  ...requirementRoutes,
  ...verificationRoutes,
  ...exportRoutes,
  ...reportRoutes,
];

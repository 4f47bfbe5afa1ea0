import type { Router } from 'express';
import { accountRouter } from './account/routes.js';
import { activityRouter } from './activity/routes.js';
import { ActivityService } from './activity/service.js';
import type { AppParts } from './app-parts.js';
import { isDatabaseReady } from './health/database-state.js';
import { healthRouter } from './health/routes.js';
import { itemRouter } from './items/routes.js';
import { ItemService } from './items/service.js';
import { meRouter } from './me/routes.js';
import { measurementRouters } from './measurement-routers.js';
import { projectRouter } from './projects/routes.js';
import { ProjectService } from './projects/service.js';
import { BinService } from './teams/bin.js';
import { teamRouter } from './teams/routes.js';

/** Every router of the API, mounted under /api behind the gate: a route also needs its line in shared/permissions.ts. */
export function apiRouters(parts: AppParts): Router[] {
  const { dataSource, access } = parts;
  return [
    healthRouter(() => isDatabaseReady(dataSource)),
    accountRouter(parts),
    meRouter(parts),
    teamRouter(new BinService(dataSource, access)),
    projectRouter(new ProjectService(dataSource, access)),
    itemRouter(new ItemService(dataSource, access)),
    activityRouter(new ActivityService(dataSource, access)),
    ...measurementRouters(parts),
  ];
}

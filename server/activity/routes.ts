import { Router } from 'express';
import { z } from 'zod';
import { ActivityPageSchema } from '../../shared/contracts/activity.js';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import { answer } from '../middleware/answer.js';
import { actorOf } from '../permissions/actor.js';
import type { ActivityService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const QuerySchema = PageQuerySchema.extend({
  cursor: z.coerce
    .number()
    .int()
    .positive()
    .max(2 ** 31 - 1)
    .optional(),
}); // a sequence

export function activityRouter(activity: ActivityService): Router {
  const router = Router();
  router.get('/projects/:projectId/activity', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const { cursor, limit } = QuerySchema.parse(request.query);
    const page = await activity.list(actorOf(request), projectId, { before: cursor, limit });
    answer(response, ActivityPageSchema, page);
  });
  return router;
}

import { Router } from 'express';
import { z } from 'zod';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import { BinPageSchema } from '../../shared/contracts/team.js';
import { answer } from '../middleware/answer.js';
import { actorOf } from '../permissions/actor.js';
import type { BinService } from './bin.js';

const TeamParamsSchema = z.object({ teamId: z.uuid() });

export function teamRouter(bin: BinService): Router {
  const router = Router();
  router.get('/teams/:teamId/bin', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const page = PageQuerySchema.parse(request.query);
    answer(response, BinPageSchema, await bin.list(actorOf(request), teamId, page));
  });
  return router;
}

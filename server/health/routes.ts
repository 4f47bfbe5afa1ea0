import { Router } from 'express';
import { z } from 'zod';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { answer } from '../middleware/answer.js';

const StateSchema = z.object({ status: z.enum(['alive', 'ready']) });

/** Alive: the process answers. Ready: so does the database, and it has every migration. */
export function healthRouter(isDatabaseReady: () => Promise<boolean>): Router {
  const router = Router();
  router.get('/health', (_request, response) => answer(response, StateSchema, { status: 'alive' }));
  router.get('/ready', async (_request, response) => {
    if (!(await isDatabaseReady())) throw new AppError('not-ready', text.server.notReady);
    answer(response, StateSchema, { status: 'ready' });
  });
  return router;
}

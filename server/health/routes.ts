import { Router } from 'express';
import type { DataSource } from 'typeorm';
import { z } from 'zod';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { answer } from '../middleware/answer.js';

const StateSchema = z.object({ status: z.enum(['alive', 'ready']) });

/** Alive: the process answers. Ready: so does the database, and it has every migration. */
export function healthRouter(dataSource: DataSource): Router {
  const router = Router();
  router.get('/health', (_request, response) => answer(response, StateSchema, { status: 'alive' }));
  router.get('/ready', async (_request, response) => {
    const isBehind = await dataSource.showMigrations().catch((cause: unknown) => {
      throw new AppError('not-ready', text.server.notReady, {}, cause);
    });
    if (isBehind) throw new AppError('not-ready', text.server.notReady);
    answer(response, StateSchema, { status: 'ready' });
  });
  return router;
}

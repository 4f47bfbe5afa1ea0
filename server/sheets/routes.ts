import { Router } from 'express';
import { z } from 'zod';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import { CreateSheetSchema, SheetPageSchema, SheetSchema, UpdateSheetSchema } from '../../shared/contracts/sheet.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import type { SheetService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const SheetParamsSchema = z.object({ sheetId: z.uuid() });

export function sheetRouter(sheets: SheetService): Router {
  const router = Router();
  router.get('/projects/:projectId/sheets', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, SheetPageSchema, await sheets.list(actorOf(request), projectId, query));
  });
  router.post('/projects/:projectId/sheets', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const input = CreateSheetSchema.parse(request.body);
    answer(response, SheetSchema, await sheets.create(actorOf(request), projectId, input), 201);
  });
  router.get('/sheets/:sheetId', async (request, response) => {
    const { sheetId } = SheetParamsSchema.parse(request.params);
    answer(response, SheetSchema, await sheets.one(actorOf(request), sheetId));
  });
  router.patch('/sheets/:sheetId', async (request, response) => {
    const { sheetId } = SheetParamsSchema.parse(request.params);
    const input = UpdateSheetSchema.parse(request.body);
    answer(response, SheetSchema, await sheets.update(actorOf(request), sheetId, versionOf(request), input));
  });
  router.delete('/sheets/:sheetId', async (request, response) => {
    const { sheetId } = SheetParamsSchema.parse(request.params);
    await sheets.remove(actorOf(request), sheetId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/sheets/:sheetId/restore', async (request, response) => {
    const { sheetId } = SheetParamsSchema.parse(request.params);
    answer(response, SheetSchema, await sheets.restore(actorOf(request), sheetId, optionalVersionOf(request)));
  });
  return router;
}

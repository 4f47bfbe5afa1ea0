import { Router } from 'express';
import { z } from 'zod';
import {
  CreateItemSchema,
  ItemPageSchema,
  ItemQuerySchema,
  ItemSchema,
  UpdateItemSchema,
} from '../../shared/contracts/item.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import type { ItemService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const ItemParamsSchema = z.object({ itemId: z.uuid() });

export function itemRouter(items: ItemService): Router {
  const router = Router();
  router.get('/projects/:projectId/items', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const query = ItemQuerySchema.parse(request.query);
    answer(response, ItemPageSchema, await items.list(actorOf(request), projectId, query));
  });
  router.post('/projects/:projectId/items', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const input = CreateItemSchema.parse(request.body);
    answer(response, ItemSchema, await items.create(actorOf(request), projectId, input), 201);
  });
  router.get('/items/:itemId', async (request, response) => {
    const { itemId } = ItemParamsSchema.parse(request.params);
    answer(response, ItemSchema, await items.read(actorOf(request), itemId));
  });
  router.patch('/items/:itemId', async (request, response) => {
    const { itemId } = ItemParamsSchema.parse(request.params);
    const input = UpdateItemSchema.parse(request.body);
    answer(response, ItemSchema, await items.update(actorOf(request), itemId, versionOf(request), input));
  });
  router.delete('/items/:itemId', async (request, response) => {
    const { itemId } = ItemParamsSchema.parse(request.params);
    await items.remove(actorOf(request), itemId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/items/:itemId/restore', async (request, response) => {
    const { itemId } = ItemParamsSchema.parse(request.params);
    answer(response, ItemSchema, await items.restore(actorOf(request), itemId));
  });
  return router;
}

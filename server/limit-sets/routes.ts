import { Router } from 'express';
import { z } from 'zod';
import {
  CreateLimitSetSchema,
  LimitSetPageSchema,
  LimitSetSchema,
  LimitVersionPageSchema,
  PublishLimitsSchema,
  UpdateLimitSetSchema,
} from '../../shared/contracts/limit-set.js';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import type { LimitSetService } from './service.js';

const TeamParamsSchema = z.object({ teamId: z.uuid() });
const LimitSetParamsSchema = z.object({ limitSetId: z.uuid() });

export function limitSetRouter(limitSets: LimitSetService): Router {
  const router = Router();
  router.get('/teams/:teamId/limit-sets', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, LimitSetPageSchema, await limitSets.list(actorOf(request), teamId, query));
  });
  router.post('/teams/:teamId/limit-sets', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const input = CreateLimitSetSchema.parse(request.body);
    answer(response, LimitSetSchema, await limitSets.create(actorOf(request), teamId, input), 201);
  });
  router.get('/limit-sets/:limitSetId', async (request, response) => {
    const { limitSetId } = LimitSetParamsSchema.parse(request.params);
    answer(response, LimitSetSchema, await limitSets.one(actorOf(request), limitSetId));
  });
  router.patch('/limit-sets/:limitSetId', async (request, response) => {
    const { limitSetId } = LimitSetParamsSchema.parse(request.params);
    const { name } = UpdateLimitSetSchema.parse(request.body);
    answer(response, LimitSetSchema, await limitSets.rename(actorOf(request), limitSetId, versionOf(request), name));
  });
  router.delete('/limit-sets/:limitSetId', async (request, response) => {
    const { limitSetId } = LimitSetParamsSchema.parse(request.params);
    await limitSets.remove(actorOf(request), limitSetId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/limit-sets/:limitSetId/restore', async (request, response) => {
    const { limitSetId } = LimitSetParamsSchema.parse(request.params);
    answer(response, LimitSetSchema, await limitSets.restore(actorOf(request), limitSetId, optionalVersionOf(request)));
  });
  router.get('/limit-sets/:limitSetId/versions', async (request, response) => {
    const { limitSetId } = LimitSetParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, LimitVersionPageSchema, await limitSets.versions(actorOf(request), limitSetId, query));
  });
  router.post('/limit-sets/:limitSetId/versions', async (request, response) => {
    const { limitSetId } = LimitSetParamsSchema.parse(request.params);
    const input = PublishLimitsSchema.parse(request.body);
    const version = optionalVersionOf(request);
    answer(response, LimitSetSchema, await limitSets.publish(actorOf(request), limitSetId, version, input), 201);
  });
  return router;
}

import { Router } from 'express';
import { z } from 'zod';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import {
  CreateSetupSchema,
  PublishSetupSchema,
  SetupPageSchema,
  SetupSchema,
  SetupVersionPageSchema,
  UpdateSetupSchema,
} from '../../shared/contracts/setup.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import type { SetupService } from './service.js';

const TeamParamsSchema = z.object({ teamId: z.uuid() });
const SetupParamsSchema = z.object({ setupId: z.uuid() });

export function setupRouter(setups: SetupService): Router {
  const router = Router();
  router.get('/teams/:teamId/setups', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, SetupPageSchema, await setups.list(actorOf(request), teamId, query));
  });
  router.post('/teams/:teamId/setups', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const input = CreateSetupSchema.parse(request.body);
    answer(response, SetupSchema, await setups.create(actorOf(request), teamId, input), 201);
  });
  router.get('/setups/:setupId', async (request, response) => {
    const { setupId } = SetupParamsSchema.parse(request.params);
    answer(response, SetupSchema, await setups.one(actorOf(request), setupId));
  });
  router.patch('/setups/:setupId', async (request, response) => {
    const { setupId } = SetupParamsSchema.parse(request.params);
    const { name } = UpdateSetupSchema.parse(request.body);
    answer(response, SetupSchema, await setups.rename(actorOf(request), setupId, versionOf(request), name));
  });
  router.delete('/setups/:setupId', async (request, response) => {
    const { setupId } = SetupParamsSchema.parse(request.params);
    await setups.remove(actorOf(request), setupId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/setups/:setupId/restore', async (request, response) => {
    const { setupId } = SetupParamsSchema.parse(request.params);
    answer(response, SetupSchema, await setups.restore(actorOf(request), setupId, optionalVersionOf(request)));
  });
  router.get('/setups/:setupId/versions', async (request, response) => {
    const { setupId } = SetupParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, SetupVersionPageSchema, await setups.versions(actorOf(request), setupId, query));
  });
  router.post('/setups/:setupId/versions', async (request, response) => {
    const { setupId } = SetupParamsSchema.parse(request.params);
    const input = PublishSetupSchema.parse(request.body);
    const version = optionalVersionOf(request);
    answer(response, SetupSchema, await setups.publish(actorOf(request), setupId, version, input), 201);
  });
  return router;
}

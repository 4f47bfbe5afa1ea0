import { Router } from 'express';
import { z } from 'zod';
import {
  CreateResultSchema,
  ResultPageSchema,
  ResultQuerySchema,
  ResultSchema,
  UpdateResultSchema,
} from '../../shared/contracts/result.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import type { ResultService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const ResultParamsSchema = z.object({ resultId: z.uuid() });

export function resultRouter(results: ResultService): Router {
  const router = Router();
  router.get('/projects/:projectId/results', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const query = ResultQuerySchema.parse(request.query);
    answer(response, ResultPageSchema, await results.list(actorOf(request), projectId, query));
  });
  router.post('/projects/:projectId/results', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const input = CreateResultSchema.parse(request.body);
    answer(response, ResultSchema, await results.create(actorOf(request), projectId, input), 201);
  });
  router.get('/results/:resultId', async (request, response) => {
    const { resultId } = ResultParamsSchema.parse(request.params);
    answer(response, ResultSchema, await results.one(actorOf(request), resultId));
  });
  router.patch('/results/:resultId', async (request, response) => {
    const { resultId } = ResultParamsSchema.parse(request.params);
    const { name } = UpdateResultSchema.parse(request.body);
    answer(response, ResultSchema, await results.rename(actorOf(request), resultId, versionOf(request), name));
  });
  router.delete('/results/:resultId', async (request, response) => {
    const { resultId } = ResultParamsSchema.parse(request.params);
    await results.remove(actorOf(request), resultId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/results/:resultId/restore', async (request, response) => {
    const { resultId } = ResultParamsSchema.parse(request.params);
    answer(response, ResultSchema, await results.restore(actorOf(request), resultId, optionalVersionOf(request)));
  });
  return router;
}

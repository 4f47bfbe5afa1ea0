import { Router } from 'express';
import { z } from 'zod';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import {
  BatchAnswerSchema,
  RereadSchema,
  SweepPageSchema,
  SweepRevisionPageSchema,
  SweepSchema,
  UpdateSweepSchema,
} from '../../shared/contracts/sweep.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import { isKnownTag, neverChanges } from '../sources/download.js';
import type { BatchService } from './batches.js';
import type { RevisionService } from './revisions.js';
import type { SweepService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const BatchParamsSchema = z.object({ projectId: z.uuid(), batchId: z.uuid() });
const SweepParamsSchema = z.object({ sweepId: z.uuid() });
const RevisionParamsSchema = z.object({ revisionId: z.uuid() });

export function sweepRouter(sweeps: SweepService): Router {
  const router = Router();
  router.get('/projects/:projectId/sweeps', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, SweepPageSchema, await sweeps.list(actorOf(request), projectId, query));
  });
  router.get('/sweeps/:sweepId', async (request, response) => {
    const { sweepId } = SweepParamsSchema.parse(request.params);
    answer(response, SweepSchema, await sweeps.one(actorOf(request), sweepId));
  });
  router.patch('/sweeps/:sweepId', async (request, response) => {
    const { sweepId } = SweepParamsSchema.parse(request.params);
    const input = UpdateSweepSchema.parse(request.body);
    answer(response, SweepSchema, await sweeps.update(actorOf(request), sweepId, versionOf(request), input));
  });
  router.delete('/sweeps/:sweepId', async (request, response) => {
    const { sweepId } = SweepParamsSchema.parse(request.params);
    await sweeps.remove(actorOf(request), sweepId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/sweeps/:sweepId/restore', async (request, response) => {
    const { sweepId } = SweepParamsSchema.parse(request.params);
    answer(response, SweepSchema, await sweeps.restore(actorOf(request), sweepId, optionalVersionOf(request)));
  });
  return router;
}

export function revisionRouter(revisions: RevisionService): Router {
  const router = Router();
  router.get('/sweeps/:sweepId/revisions', async (request, response) => {
    const { sweepId } = SweepParamsSchema.parse(request.params);
    const query = PageQuerySchema.parse(request.query);
    answer(response, SweepRevisionPageSchema, await revisions.list(actorOf(request), sweepId, query));
  });
  router.post('/sweeps/:sweepId/revisions', async (request, response) => {
    const { sweepId } = SweepParamsSchema.parse(request.params);
    const { reading } = RereadSchema.parse(request.body);
    const version = optionalVersionOf(request);
    answer(response, SweepSchema, await revisions.reread(actorOf(request), sweepId, version, reading));
  });
  router.get('/revisions/:revisionId/points', async (request, response) => {
    const { revisionId } = RevisionParamsSchema.parse(request.params);
    const { sha256, content } = await revisions.points(actorOf(request), revisionId);
    response.set(neverChanges(sha256));
    if (isKnownTag(request, sha256)) response.status(304).end();
    else response.type('application/octet-stream').send(content);
  });
  return router;
}

export function batchRouter(batches: BatchService): Router {
  const router = Router();
  router.post('/projects/:projectId/batches/:batchId/undo', async (request, response) => {
    const { projectId, batchId } = BatchParamsSchema.parse(request.params);
    const sweepIds = await batches.undo(actorOf(request), projectId, batchId);
    answer(response, BatchAnswerSchema, { batchId, sweepIds });
  });
  router.post('/projects/:projectId/batches/:batchId/restore', async (request, response) => {
    const { projectId, batchId } = BatchParamsSchema.parse(request.params);
    const sweepIds = await batches.restore(actorOf(request), projectId, batchId);
    answer(response, BatchAnswerSchema, { batchId, sweepIds });
  });
  return router;
}

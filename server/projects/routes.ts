import { Router } from 'express';
import { z } from 'zod';
import { PageQuerySchema } from '../../shared/contracts/paging.js';
import {
  CreateProjectSchema,
  ProjectPageSchema,
  ProjectSchema,
  UpdateProjectSchema,
} from '../../shared/contracts/project.js';
import { answer } from '../middleware/answer.js';
import { optionalVersionOf, versionOf } from '../middleware/if-match.js';
import { actorOf } from '../permissions/actor.js';
import type { ProjectService } from './service.js';

const TeamParamsSchema = z.object({ teamId: z.uuid() });
const ProjectParamsSchema = z.object({ projectId: z.uuid() });

export function projectRouter(projects: ProjectService): Router {
  const router = Router();
  router.get('/teams/:teamId/projects', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const page = PageQuerySchema.parse(request.query);
    answer(response, ProjectPageSchema, await projects.list(actorOf(request), teamId, page));
  });
  router.post('/teams/:teamId/projects', async (request, response) => {
    const { teamId } = TeamParamsSchema.parse(request.params);
    const input = CreateProjectSchema.parse(request.body);
    answer(response, ProjectSchema, await projects.create(actorOf(request), teamId, input), 201);
  });
  router.get('/projects/:projectId', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    answer(response, ProjectSchema, await projects.read(actorOf(request), projectId));
  });
  router.patch('/projects/:projectId', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const input = UpdateProjectSchema.parse(request.body);
    answer(response, ProjectSchema, await projects.update(actorOf(request), projectId, versionOf(request), input));
  });
  router.delete('/projects/:projectId', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    await projects.remove(actorOf(request), projectId, optionalVersionOf(request));
    response.status(204).end();
  });
  router.post('/projects/:projectId/restore', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    answer(response, ProjectSchema, await projects.restore(actorOf(request), projectId));
  });
  return router;
}

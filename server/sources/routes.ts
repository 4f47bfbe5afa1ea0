import { pipeline } from 'node:stream/promises';
import { type Response, Router } from 'express';
import { z } from 'zod';
import {
  CreateSweepSchema,
  KnownSourcesAnswerSchema,
  KnownSourcesSchema,
  UploadedSweepSchema,
} from '../../shared/contracts/sweep.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { answer } from '../middleware/answer.js';
import type { RateLimits } from '../middleware/rate-limits.js';
import { actorOf } from '../permissions/actor.js';
import { attachment, isKnownTag } from './download.js';
import { type UploadLimits, withUpload } from './receive-upload.js';
import type { SourceService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const SourceParamsSchema = z.object({ sourceId: z.uuid() });

export function sourceRouter(sources: SourceService, rates: RateLimits, limits: UploadLimits): Router {
  const router = Router();
  router.post('/projects/:projectId/sources', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const actor = actorOf(request);
    await rates.spend('upload-person', actor.personId);
    const abandoned = whenAbandoned(response);
    const sweep = await withUpload(request, response, limits, ({ file, fields }) =>
      sources.add(actor, projectId, file, sweepOf(fields), abandoned),
    );
    answer(response, UploadedSweepSchema, { sweep }, 201);
  });
  router.post('/projects/:projectId/sources/known', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const { sha256 } = KnownSourcesSchema.parse(request.body);
    const known = await sources.known(actorOf(request), projectId, sha256);
    answer(response, KnownSourcesAnswerSchema, { known });
  });
  router.get('/sources/:sourceId/content', async (request, response) => {
    const { sourceId } = SourceParamsSchema.parse(request.params);
    const { file, open } = await sources.content(actorOf(request), sourceId);
    response.set(attachment(file));
    if (isKnownTag(request, file.sha256)) response.status(304).end();
    else if (request.method === 'HEAD') response.end();
    else await pipeline(open(), response);
  });
  return router;
}

function sweepOf(fields: Readonly<Record<string, string>>) {
  const given = fields.sweep;
  if (given === undefined) {
    const message = text.measurements.sweepMissing;
    throw new AppError('validation-failed', message, { issues: [{ path: 'sweep', message }] });
  }
  try {
    return CreateSweepSchema.parse(JSON.parse(given));
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
    throw new AppError('validation-failed', text.server.bodyUnreadable, {}, error);
  }
}

/** Fires when the sender goes away before the answer: then nothing more is stored. */
function whenAbandoned(response: Response): AbortSignal {
  const abandoned = new AbortController();
  response.once('close', () => {
    if (!response.writableFinished) abandoned.abort();
  });
  return abandoned.signal;
}

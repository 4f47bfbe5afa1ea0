import { once } from 'node:events';
import { Router } from 'express';
import { z } from 'zod';
import { type ProjectEvent, ProjectEventSchema } from '../../shared/contracts/project-event.js';
import { actorOf } from '../permissions/actor.js';
import type { EventService } from './service.js';

const ProjectParamsSchema = z.object({ projectId: z.uuid() });
const LastEventSchema = z.coerce.number().int().nonnegative().optional().catch(undefined);
const RETRY_MS = 3_000;

/** Server-sent events: each carries the sequence of its activity row as its id, so that a browser resumes by itself. */
export function eventRouter(events: EventService): Router {
  const router = Router();
  router.get('/projects/:projectId/events', async (request, response) => {
    const { projectId } = ProjectParamsSchema.parse(request.params);
    const lastSeen = LastEventSchema.parse(request.get('last-event-id'));
    const gone = new AbortController();
    response.once('close', () => gone.abort());
    const stream = await events.follow(actorOf(request), projectId, lastSeen, gone.signal);
    response.set({
      'Content-Type': 'text/event-stream; charset=utf-8',
      'Cache-Control': 'no-cache, no-transform', // no-transform: compression would hold events back
      'X-Accel-Buffering': 'no',
    });
    response.flushHeaders();
    response.write(`retry: ${RETRY_MS}\nid: ${stream.after}\n\n`);
    for await (const event of stream.events) {
      const isFull = !response.write(event === 'beat' ? ': beat\n\n' : frame(event));
      if (isFull && !gone.signal.aborted) await Promise.race([once(response, 'drain'), once(response, 'close')]);
    }
    response.end();
  });
  return router;
}

function frame(event: ProjectEvent): string {
  return `id: ${event.sequence}\ndata: ${JSON.stringify(ProjectEventSchema.parse(event))}\n\n`;
}

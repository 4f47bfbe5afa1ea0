import { Router } from 'express';
import { z } from 'zod';
import { LetterSentSchema, MeSchema, SessionListSchema, UpdateMeSchema } from '../../shared/contracts/account.js';
import type { SessionCookies } from '../account/cookies.js';
import type { AccountService } from '../account/service.js';
import type { Sessions } from '../account/sessions.js';
import { answer } from '../middleware/answer.js';
import { versionOf } from '../middleware/if-match.js';
import type { RateLimits } from '../middleware/rate-limits.js';
import { actorOf } from '../permissions/actor.js';
import type { MeService } from './service.js';

interface Parts {
  readonly me: MeService;
  readonly account: AccountService;
  readonly sessions: Sessions;
  readonly cookies: SessionCookies;
  readonly limits: RateLimits;
}

const SessionParamsSchema = z.object({ sessionId: z.uuid() });

export function meRouter({ me, account, sessions, cookies, limits }: Parts): Router {
  const router = Router();
  router.get('/me', async (request, response) => {
    answer(response, MeSchema, await me.read(actorOf(request).personId));
  });
  router.patch('/me', async (request, response) => {
    const input = UpdateMeSchema.parse(request.body);
    answer(response, MeSchema, await me.update(actorOf(request), versionOf(request), input));
  });
  router.get('/me/sessions', async (request, response) => {
    answer(response, SessionListSchema, { items: await sessions.list(actorOf(request)) });
  });
  router.delete('/me/sessions/:sessionId', async (request, response) => {
    const { sessionId } = SessionParamsSchema.parse(request.params);
    await sessions.endOne(actorOf(request), sessionId);
    response.status(204).end();
  });
  router.post('/me/sign-out-everywhere', async (request, response) => {
    await sessions.endEverywhere(actorOf(request));
    cookies.clear(response);
    response.status(204).end();
  });
  router.post('/me/verification', async (request, response) => {
    const { email } = await me.read(actorOf(request).personId);
    await limits.spend('mail-address', email);
    await account.sendVerification(email);
    answer(response, LetterSentSchema, { email }, 202);
  });
  return router;
}

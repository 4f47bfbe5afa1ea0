import type { RequestHandler } from 'express';
import type { SessionCookies } from '../account/cookies.js';
import type { Sessions } from '../account/sessions.js';

/** Finds out who asks. The session is looked up on every request, so that ending one bites at once. */
export function knowActor(sessions: Sessions, cookies: SessionCookies): RequestHandler {
  return async (request, _response, next) => {
    const token = cookies.accessOf(request);
    if (token !== undefined) {
      request.actor = await sessions.actorOf(token);
      request.sessionHasEnded = request.actor === undefined;
    }
    next();
  };
}

import type { RequestHandler } from 'express';
import type { SessionCookies } from '../account/cookies.js';
import type { Sessions } from '../account/sessions.js';
import { routeOf } from '../permissions/gate.js';

/** Finds out who asks. The session is looked up on every request, so that ending one bites at once. */
export function knowActor(sessions: Sessions, cookies: SessionCookies): RequestHandler {
  return async (request, _response, next) => {
    const isOpen = routeOf(request.method, request.baseUrl + request.path)?.rule === 'open';
    const token = isOpen ? undefined : cookies.accessOf(request); // open routes answer without the database too
    if (token !== undefined) {
      request.actor = await sessions.actorOf(token);
      request.sessionHasEnded = request.actor === undefined;
    }
    next();
  };
}

import type { Request } from 'express';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

/** Who asks, as the database knew them when the request came in. */
export interface Actor {
  readonly personId: string;
  readonly sessionId: string;
  readonly name: string;
  readonly isVerified: boolean;
}

declare global {
  namespace Express {
    interface Request {
      actor?: Actor;
      sessionHasEnded?: boolean; // a session was shown, but it is over
    }
  }
}

export function actorOf(request: Request): Actor {
  if (request.actor) return request.actor;
  if (request.sessionHasEnded) throw new AppError('session-ended', text.server.sessionEnded);
  throw new AppError('not-signed-in', text.server.notSignedIn);
}

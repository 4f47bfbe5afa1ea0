import express, { type RequestHandler } from 'express';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

const SMALL = '32kb'; // what somebody who is not signed in may send
const LARGE = '16mb'; // a result with its curves
const DEEPEST = 40;

/** Reads JSON bodies; nothing deeper than our contracts ever are, so that no later recursion can run away. */
export function jsonBody(): RequestHandler[] {
  const small = express.json({ limit: SMALL });
  const large = express.json({ limit: LARGE });
  return [
    (request, response, next) => (request.actor ? large : small)(request, response, next),
    (request, _response, next) => {
      if (depthOf(request.body) > DEEPEST) throw new AppError('validation-failed', text.server.bodyTooDeep(DEEPEST));
      next();
    },
  ];
}

/** How deep arrays and objects stand in each other; counted level by level, without recursion. */
function depthOf(value: unknown): number {
  let level: unknown[] = [value];
  for (let depth = 0; ; depth += 1) {
    const next: unknown[] = [];
    for (const entry of level) {
      if (typeof entry !== 'object' || entry === null) continue;
      for (const inner of Object.values(entry)) if (typeof inner === 'object' && inner !== null) next.push(inner);
    }
    if (next.length === 0 || depth > DEEPEST) return depth;
    level = next;
  }
}

import compression from 'compression';
import express, { type Express } from 'express';
import { speakInOurWords } from '../shared/schema-words.js';
import { type AppInputs, makeParts } from './app-parts.js';
import { clientPages } from './middleware/client-pages.js';
import { jsonBody } from './middleware/json-body.js';
import { metrics } from './middleware/metrics.js';
import { pagePolicy } from './middleware/page-policy.js';
import { noSuchRoute, problemAnswer } from './middleware/problem.js';
import { requestLog } from './middleware/request-log.js';
import { sameOrigin } from './middleware/same-origin.js';
import { knowActor } from './middleware/session.js';
import { gate } from './permissions/gate.js';
import { apiRouters } from './routers.js';

export interface App {
  readonly http: Express;
  /** Ends open streams and whatever else the app started; twice is once. */
  close(): Promise<void>;
}

/** Puts the server together; it listens to nothing and reads no environment. */
export function createApp(inputs: AppInputs): App {
  speakInOurWords();
  const endings: (() => Promise<void> | void)[] = [];
  const parts = makeParts(inputs, (end) => endings.push(end));
  const { measure, page } = metrics();
  const http = express();
  http.set('trust proxy', parts.trustProxy);
  http.set('case sensitive routing', true);
  http.disable('etag'); // rows carry their version; what never changes names its own tag
  http.use(requestLog(parts.logger), measure, ...pagePolicy(parts.isSecure), compression());
  http.use('/api', (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  http.use('/api', sameOrigin(parts.publicUrl), knowActor(parts.sessions, parts.cookies), gate(parts.access));
  http.use('/api', ...jsonBody(), ...apiRouters(parts), noSuchRoute());
  http.get('/metrics', page);
  http.use(clientPages(parts.clientDir));
  http.use(problemAnswer());
  return {
    http,
    async close() {
      for (const end of endings.splice(0)) await end();
    },
  };
}

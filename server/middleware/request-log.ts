import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { RequestHandler } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** Pages whose address carries a code that opens something: the code is no matter for a log. */
const CODE_IN_PATH = /^\/(verify|reset|invite|s)\/[^/?]+/;

export function loggedUrl(url: string): string {
  return url.replace(CODE_IN_PATH, '/$1/[code]');
}

/** One structured line a request, with an id that the answer carries too and the error page shows. */
export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp<IncomingMessage, ServerResponse>({
    logger,
    genReqId: (_request, response) => {
      const id = randomUUID();
      response.setHeader('X-Request-Id', id);
      return id;
    },
    serializers: {
      req: (request: {
        id: string;
        method: string;
        url: string;
        remoteAddress: string;
        headers: Record<string, string>;
      }) => ({
        id: request.id,
        method: request.method,
        url: loggedUrl(request.url),
        from: request.remoteAddress,
        agent: request.headers['user-agent'],
        cookie: request.headers.cookie,
        authorization: request.headers.authorization,
      }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
    },
    redact: { paths: ['req.cookie', 'req.authorization'], remove: true },
    customLogLevel: (_request, response, error) => {
      if (error || response.statusCode >= 500) return 'error';
      return response.statusCode >= 400 ? 'warn' : 'info';
    },
    customSuccessMessage: () => 'answered',
    customErrorMessage: () => 'failed',
  });
}

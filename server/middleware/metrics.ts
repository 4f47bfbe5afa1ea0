import type { Request, RequestHandler } from 'express';
import { collectDefaultMetrics, Histogram, Registry } from 'prom-client';
import { routeOf } from '../permissions/gate.js';

const LOOPBACK = new Set(['127.0.0.1', '::1', '::ffff:127.0.0.1']);

function isFromThisMachine(request: Request): boolean {
  const wasForwarded = ['x-forwarded-for', 'forwarded', 'via'].some((header) => request.get(header) !== undefined);
  return LOOPBACK.has(request.socket.remoteAddress ?? '') && !wasForwarded;
}

/** Times every request by route, and answers them at /metrics to this machine alone. */
export function metrics(): { measure: RequestHandler; page: RequestHandler } {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry });
  const durations = new Histogram({
    name: 'hummock_request_seconds',
    help: 'Time from a request to the end of its answer.',
    labelNames: ['method', 'route', 'status'],
    buckets: [0.005, 0.02, 0.05, 0.1, 0.3, 1, 3, 10],
    registers: [registry],
  });
  return {
    measure: (request, response, next) => {
      const end = durations.startTimer();
      const route = routeOf(request.method, request.path)?.name ?? 'page'; // as the table names it: no ids in labels
      response.once('close', () => end({ method: request.method, route, status: String(response.statusCode) }));
      next();
    },
    page: async (request, response, next) => {
      if (!isFromThisMachine(request)) return next();
      response.type(registry.contentType).send(await registry.metrics());
    },
  };
}

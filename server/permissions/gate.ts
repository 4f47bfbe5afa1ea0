import type { RequestHandler } from 'express';
import { z } from 'zod';
import { AppError } from '../../shared/errors.js';
import { ROUTES, type RouteRule } from '../../shared/permissions.js';
import { text } from '../../shared/text.js';
import type { Access } from './access.js';
import { actorOf } from './actor.js';
import { PLACE_QUERIES, type Target } from './place.js';

interface KnownRoute {
  name: string; // as the table names it
  method: string;
  pattern: RegExp; // one named group for each parameter
  rule: RouteRule;
}

const KNOWN_ROUTES: readonly KnownRoute[] = Object.entries(ROUTES).map(([name, rule]) => {
  const [method = '', path = ''] = name.split(' ');
  const pattern = new RegExp(`^${path.replace(/:(\w+)/g, '(?<$1>[^/]+)')}$`);
  return { name, method, pattern, rule };
});

export interface MatchedRoute {
  readonly name: string;
  readonly rule: RouteRule;
  readonly params: Record<string, string>;
}

export function routeOf(method: string, path: string): MatchedRoute | undefined {
  const asked = method === 'HEAD' ? 'GET' : method;
  for (const route of KNOWN_ROUTES) {
    const match = route.method === asked ? route.pattern.exec(path) : null;
    if (match) return { name: route.name, rule: route.rule, params: { ...match.groups } };
  }
  return undefined;
}

/** The id that decides: the first parameter of the path that names something in a team. */
function targetOf(params: Record<string, string>): Target | undefined {
  const key = Object.keys(params).find((name) => name in PLACE_QUERIES);
  return key === undefined ? undefined : ({ [key]: params[key] } as unknown as Target);
}

/** Stands before every router: what the table of routes does not name, or does not allow, is not reached. */
export function gate(access: Access): RequestHandler {
  return async (request, _response, next) => {
    const known = routeOf(request.method, request.baseUrl + request.path);
    if (!known) throw new AppError('not-found', text.server.noRoute);
    if (known.rule !== 'open') {
      const actor = actorOf(request);
      const isNamed = Object.values(known.params).every((value) => z.uuid().safeParse(value).success);
      if (!isNamed) throw new AppError('not-found', text.server.notFound);
      if (known.rule !== 'signed-in') {
        const target = targetOf(known.params);
        if (!target) throw new Error(`The route ${request.method} ${request.path} does not say what it is about.`);
        await access.require(actor, known.rule, target);
      }
    }
    next();
  };
}

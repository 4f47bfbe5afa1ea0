import type { Role } from './contracts/team.js';

const EVERYONE: readonly Role[] = ['owner', 'lead', 'member', 'viewer'];
const WRITERS: readonly Role[] = ['owner', 'lead', 'member'];
const LEADS: readonly Role[] = ['owner', 'lead'];

/** Which roles may do what in their team. The server refuses by it; the screens disable by it and say who can. */
export const ACTIONS = {
  'project:read': EVERYONE,
  'project:create': LEADS,
  'project:update': LEADS,
  'project:delete': LEADS,
  'project:restore': LEADS,
  'item:read': EVERYONE,
  'item:create': WRITERS,
  'item:update': WRITERS,
  'item:delete': WRITERS,
  'item:restore': WRITERS,
  'source:read': EVERYONE,
  'source:create': WRITERS,
  'sweep:read': EVERYONE,
  'sweep:create': WRITERS,
  'sweep:update': WRITERS,
  'sweep:delete': WRITERS,
  'sweep:restore': WRITERS,
  'sheet:read': EVERYONE,
  'sheet:create': WRITERS,
  'sheet:update': WRITERS,
  'sheet:delete': WRITERS,
  'sheet:restore': WRITERS,
  'result:read': EVERYONE,
  'result:create': WRITERS,
  'result:update': WRITERS,
  'result:delete': WRITERS,
  'result:restore': WRITERS,
  'setup:read': EVERYONE,
  'setup:create': LEADS,
  'setup:update': LEADS,
  'setup:delete': LEADS,
  'setup:restore': LEADS,
  'limit-set:read': EVERYONE,
  'limit-set:create': LEADS,
  'limit-set:update': LEADS,
  'limit-set:delete': LEADS,
  'limit-set:restore': LEADS,
  'activity:read': EVERYONE,
  'event:read': EVERYONE,
  'bin:read': EVERYONE,
} as const satisfies Record<`${string}:${string}`, readonly Role[]>;
export type Action = keyof typeof ACTIONS;

export function mayDo(role: Role, action: Action): boolean {
  return (ACTIONS[action] as readonly Role[]).includes(role);
}

/** Looking, as against changing: what an address that is not confirmed yet, and a visitor of the demo, may do. */
export function isReading(action: Action): boolean {
  return action.endsWith(':read');
}

/** Open to all, to anyone signed in (the route then reaches only what is theirs), or by role in the team. */
export type RouteRule = 'open' | 'signed-in' | Action;
export type RouteName = `${'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'} /${string}`;

/** Every route of the API. One that is not named here does not exist: the server answers 404 before it is reached. */
export const ROUTES = {
  'GET /api/health': 'open',
  'GET /api/ready': 'open',
  'POST /api/account/register': 'open',
  'POST /api/account/verify': 'open',
  'POST /api/account/sign-in': 'open',
  'POST /api/account/sign-out': 'open',
  'POST /api/account/refresh': 'open',
  'POST /api/account/forgot': 'open',
  'POST /api/account/reset': 'open',
  'GET /api/me': 'signed-in',
  'PATCH /api/me': 'signed-in',
  'GET /api/me/sessions': 'signed-in',
  'DELETE /api/me/sessions/:sessionId': 'signed-in',
  'POST /api/me/sign-out-everywhere': 'signed-in',
  'POST /api/me/verification': 'signed-in',
  'GET /api/teams/:teamId/projects': 'project:read',
  'POST /api/teams/:teamId/projects': 'project:create',
  'GET /api/teams/:teamId/bin': 'bin:read',
  'GET /api/projects/:projectId': 'project:read',
  'PATCH /api/projects/:projectId': 'project:update',
  'DELETE /api/projects/:projectId': 'project:delete',
  'POST /api/projects/:projectId/restore': 'project:restore',
  'GET /api/projects/:projectId/activity': 'activity:read',
  'GET /api/projects/:projectId/items': 'item:read',
  'POST /api/projects/:projectId/items': 'item:create',
  'GET /api/items/:itemId': 'item:read',
  'PATCH /api/items/:itemId': 'item:update',
  'DELETE /api/items/:itemId': 'item:delete',
  'POST /api/items/:itemId/restore': 'item:restore',
  'POST /api/projects/:projectId/sources': 'source:create',
  'POST /api/projects/:projectId/sources/known': 'source:read',
  'GET /api/sources/:sourceId/content': 'source:read',
  'GET /api/projects/:projectId/sweeps': 'sweep:read',
  'GET /api/sweeps/:sweepId': 'sweep:read',
  'PATCH /api/sweeps/:sweepId': 'sweep:update',
  'DELETE /api/sweeps/:sweepId': 'sweep:delete',
  'POST /api/sweeps/:sweepId/restore': 'sweep:restore',
  'GET /api/sweeps/:sweepId/revisions': 'sweep:read',
  'POST /api/sweeps/:sweepId/revisions': 'sweep:update',
  'GET /api/revisions/:revisionId/points': 'sweep:read',
  'POST /api/projects/:projectId/batches/:batchId/undo': 'sweep:delete',
  'POST /api/projects/:projectId/batches/:batchId/restore': 'sweep:restore',
  'GET /api/projects/:projectId/sheets': 'sheet:read',
  'POST /api/projects/:projectId/sheets': 'sheet:create',
  'GET /api/sheets/:sheetId': 'sheet:read',
  'PATCH /api/sheets/:sheetId': 'sheet:update',
  'DELETE /api/sheets/:sheetId': 'sheet:delete',
  'POST /api/sheets/:sheetId/restore': 'sheet:restore',
  'GET /api/projects/:projectId/results': 'result:read',
  'POST /api/projects/:projectId/results': 'result:create',
  'GET /api/results/:resultId': 'result:read',
  'PATCH /api/results/:resultId': 'result:update',
  'DELETE /api/results/:resultId': 'result:delete',
  'POST /api/results/:resultId/restore': 'result:restore',
  'GET /api/teams/:teamId/setups': 'setup:read',
  'POST /api/teams/:teamId/setups': 'setup:create',
  'GET /api/setups/:setupId': 'setup:read',
  'PATCH /api/setups/:setupId': 'setup:update',
  'DELETE /api/setups/:setupId': 'setup:delete',
  'POST /api/setups/:setupId/restore': 'setup:restore',
  'GET /api/setups/:setupId/versions': 'setup:read',
  'POST /api/setups/:setupId/versions': 'setup:update',
  'GET /api/teams/:teamId/limit-sets': 'limit-set:read',
  'POST /api/teams/:teamId/limit-sets': 'limit-set:create',
  'GET /api/limit-sets/:limitSetId': 'limit-set:read',
  'PATCH /api/limit-sets/:limitSetId': 'limit-set:update',
  'DELETE /api/limit-sets/:limitSetId': 'limit-set:delete',
  'POST /api/limit-sets/:limitSetId/restore': 'limit-set:restore',
  'GET /api/limit-sets/:limitSetId/versions': 'limit-set:read',
  'POST /api/limit-sets/:limitSetId/versions': 'limit-set:update',
  'GET /api/projects/:projectId/events': 'event:read',
} as const satisfies Record<RouteName, RouteRule>;

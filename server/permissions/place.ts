import type { Role } from '../../shared/contracts/team.js';

/** Where the thing an id names stands, and what the person ($2) is in that team. */
export interface Place {
  readonly teamId: string;
  readonly projectId: string | null;
  readonly isInvented: boolean; // in the demo
  readonly isDeleted: boolean; // lies in the bin itself
  readonly isGone: boolean; // its project or team lies in the bin
  readonly role: Role | null;
}

const MEMBER = 'LEFT JOIN membership m ON m.team_id = t.id AND m.person_id = $2';

const inProject = (table: string, isDeleted = 'x.deleted_at IS NOT NULL') => `
  SELECT t.id AS "teamId", p.id AS "projectId", p.is_invented AS "isInvented", ${isDeleted} AS "isDeleted",
    p.deleted_at IS NOT NULL OR t.deleted_at IS NOT NULL AS "isGone", m.role
  FROM ${table} x JOIN project p ON p.id = x.project_id JOIN team t ON t.id = p.team_id ${MEMBER} WHERE x.id = $1`;

const inTeam = (table: string, projectId = 'NULL', isInvented = 'false') => `
  SELECT t.id AS "teamId", ${projectId} AS "projectId", ${isInvented} AS "isInvented",
    x.deleted_at IS NOT NULL AS "isDeleted", t.deleted_at IS NOT NULL AS "isGone", m.role
  FROM ${table} x JOIN team t ON t.id = x.team_id ${MEMBER} WHERE x.id = $1`;

/** By the name of the route's parameter. */
export const PLACE_QUERIES = {
  teamId: `SELECT t.id AS "teamId", NULL AS "projectId", false AS "isInvented", false AS "isDeleted",
    t.deleted_at IS NOT NULL AS "isGone", m.role FROM team t ${MEMBER} WHERE t.id = $1`,
  projectId: inTeam('project', 'x.id', 'x.is_invented'),
  itemId: inProject('item'),
  sourceId: inProject('source_file', 'false'), // a source goes with its sweeps
  sweepId: inProject('sweep'),
  revisionId: `SELECT t.id AS "teamId", p.id AS "projectId", p.is_invented AS "isInvented",
    x.deleted_at IS NOT NULL AS "isDeleted", p.deleted_at IS NOT NULL OR t.deleted_at IS NOT NULL AS "isGone", m.role
    FROM sweep_revision r JOIN sweep x ON x.id = r.sweep_id JOIN project p ON p.id = x.project_id
    JOIN team t ON t.id = p.team_id ${MEMBER} WHERE r.id = $1`,
  sheetId: inProject('sheet'),
  resultId: inProject('result'),
  setupId: inTeam('setup'),
  limitSetId: inTeam('limit_set'),
} as const;
export type TargetKey = keyof typeof PLACE_QUERIES;

/** What an action is about: one id, under its name. */
export type Target = { [Key in TargetKey]: { readonly [_ in Key]: string } }[TargetKey];

import type { DataSource } from 'typeorm';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import type { BinEntry } from '../../shared/contracts/team.js';
import { decodeCursor, encodeCursor } from '../database/paging.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';

/** How long deleted things can come back. */
export const BIN_DAYS = 90;

const inProject = (entity: string, table: string) => `
  SELECT '${entity}' AS entity, x.id, x.name, x.deleted_at, p.id AS project_id, p.name AS project_name
  FROM ${table} x JOIN project p ON p.id = x.project_id
  WHERE p.team_id = $1 AND p.deleted_at IS NULL AND x.deleted_at IS NOT NULL`;
const inTeam = (entity: string, table: string) => `
  SELECT '${entity}', x.id, x.name, x.deleted_at, NULL, NULL FROM ${table} x
  WHERE x.team_id = $1 AND x.deleted_at IS NOT NULL`;
const EVERYTHING = [
  inProject('item', 'item'),
  inProject('sweep', 'sweep'),
  inProject('sheet', 'sheet'),
  inProject('result', 'result'),
  inTeam('project', 'project'),
  inTeam('setup', 'setup'),
  inTeam('limit-set', 'limit_set'),
].join(' UNION ALL ');

interface BinRow {
  entity: BinEntry['entity'];
  id: string;
  name: string;
  deleted_at: Date;
  project_id: string | null;
  project_name: string | null;
  actor_id: string | null;
  actor_name: string | null;
}

/** What a team has deleted and can still bring back; a deleted project stands for all that it holds. */
export class BinService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, teamId: string, { cursor, limit }: PageQuery): Promise<Page<BinEntry>> {
    await this.access.require(actor, 'bin:read', { teamId });
    const [time, id] = cursor === undefined ? [null, null] : decodeCursor(cursor);
    const rows: BinRow[] = await this.dataSource.query(
      `SELECT b.*, a.actor_id, person.name AS actor_name FROM (${EVERYTHING}) b
        LEFT JOIN LATERAL (SELECT actor_id FROM activity WHERE entity_id = b.id AND chain_id = $1 AND change = 'deleted'
          ORDER BY sequence DESC LIMIT 1) a ON true
        LEFT JOIN person ON person.id = a.actor_id
        WHERE $2::timestamptz IS NULL OR (b.deleted_at, b.id) < ($2::timestamptz, $3::uuid)
        ORDER BY b.deleted_at DESC, b.id DESC LIMIT $4`,
      [teamId, time, id, limit + 1],
    );
    const items = rows.slice(0, limit).map(toEntry);
    const last = rows.length > limit ? rows[limit - 1] : undefined;
    return { items, next: last ? encodeCursor(last.deleted_at, last.id) : null };
  }
}

function toEntry(row: BinRow): BinEntry {
  return {
    entity: row.entity,
    entityId: row.id,
    name: row.name,
    project: row.project_id === null ? null : { id: row.project_id, name: row.project_name ?? '' },
    deletedAt: row.deleted_at.toISOString(),
    deletedBy: row.actor_id === null ? null : { id: row.actor_id, name: row.actor_name ?? '' },
    purgedAt: new Date(row.deleted_at.getTime() + BIN_DAYS * 86_400_000).toISOString(),
  };
}

import type { DataSource, EntityManager } from 'typeorm';
import { recordChange } from '../activity/record-change.js';
import { PostgresFileStore } from '../files/postgres-file-store.js';
import { purgeSourceFiles } from '../files/purge-source-files.js';
import { BIN_DAYS } from '../teams/bin.js';

const DAY_MS = 86_400_000;
const STEP = 200; // rows of one transaction

interface Kind {
  readonly entity: string;
  readonly table: string;
  readonly team: string; // joins t: the team of row x
  readonly projectId: string;
  readonly kept?: string; // when a row has to stay although its time is over
}
const inProject = (entity: string, table: string): Kind => {
  return {
    entity,
    table,
    team: 'JOIN project p ON p.id = x.project_id JOIN team t ON t.id = p.team_id',
    projectId: 'p.id',
  };
};
const inTeam = (entity: string, table: string, more: Partial<Kind> = {}): Kind => {
  return { entity, table, team: 'JOIN team t ON t.id = x.team_id', projectId: 'NULL::uuid', ...more };
};
/** Results name the setup version they were made with: such a setup stays, out of sight. */
const USED =
  'EXISTS (SELECT 1 FROM setup_version v JOIN result r ON r.setup_version_id = v.id WHERE v.setup_id = x.id)';
const KINDS: readonly Kind[] = [
  inProject('result', 'result'),
  inProject('sheet', 'sheet'),
  inProject('sweep', 'sweep'),
  inProject('item', 'item'),
  inTeam('project', 'project', { projectId: 'x.id' }),
  inTeam('setup', 'setup', { kept: USED }),
  inTeam('limit-set', 'limit_set'),
];

/** Removes for good what has lain in the bin for 90 days: rows, points and the bytes of source files. */
export async function purgeBin(dataSource: DataSource, now: Date): Promise<number> {
  const before = new Date(now.getTime() - BIN_DAYS * DAY_MS);
  let removed = 0;
  for (const kind of KINDS) {
    for (let step = STEP; step === STEP; removed += step) {
      step = await dataSource.transaction((manager) => purgeSome(manager, kind, before));
    }
  }
  await removeLeftovers(dataSource, before, now);
  return removed;
}

async function purgeSome(manager: EntityManager, kind: Kind, before: Date): Promise<number> {
  const rows: { id: string; name: string; version: number; teamId: string; projectId: string | null }[] =
    await manager.query(
      `SELECT x.id, x.name, x.version, t.id AS "teamId", ${kind.projectId} AS "projectId" FROM ${kind.table} x ${kind.team}
        WHERE x.deleted_at < $1 AND NOT ${kind.kept ?? 'false'} ORDER BY t.id, x.id LIMIT ${STEP} FOR UPDATE OF x`,
      [before],
    );
  await manager.query(`DELETE FROM ${kind.table} WHERE id = ANY ($1)`, [rows.map((row) => row.id)]);
  for (const { id, name, version, teamId, projectId } of rows) {
    const about = { entity: kind.entity, entityId: id, version, teamId, projectId };
    await recordChange(manager, { actor: null, action: 'bin:purge', ...about, from: { name }, to: null });
  }
  return rows.length;
}

/** Bytes that no sweep names any more, and what the account pages no longer need. */
async function removeLeftovers(dataSource: DataSource, before: Date, now: Date): Promise<void> {
  const { manager } = dataSource;
  const yesterday = new Date(now.getTime() - DAY_MS); // an upload may be on its way
  await purgeSourceFiles(dataSource, new PostgresFileStore(dataSource), yesterday);
  await manager.query('DELETE FROM mail_code WHERE expires_at < $1', [before]);
  await manager.query('DELETE FROM session WHERE ended_at < $1 OR expires_at < $1', [before]);
  await manager.query('DELETE FROM rate_limit WHERE expire < $1', [yesterday.getTime()]);
}

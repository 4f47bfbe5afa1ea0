import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { recordChange } from '../../../server/activity/record-change.js';
import type { Reading } from '../../../shared/contracts/reading.js';

/** One row of every kind, so that each id of each route has something to name. */
export type World = Record<
  | 'teamId'
  | 'projectId'
  | 'itemId'
  | 'sourceId'
  | 'sweepId'
  | 'revisionId'
  | 'batchId'
  | 'sheetId'
  | 'resultId'
  | 'setupId'
  | 'limitSetId',
  string
>;

const SHA = '0123456789abcdef'.repeat(4);
const READING: Reading = {
  format: 'text',
  encoding: 'utf-8',
  separator: 'tab',
  decimalMark: 'point',
  thousandsMark: 'none',
  headerLines: 0,
  columns: ['frequency', 'magnitude', 'phase'],
  frequencyUnit: 'Hz',
  magnitudeUnit: 'ohm',
  phaseUnit: 'degree',
  phaseSign: 'as-written',
  columnNames: ['', '', ''],
  guesses: {},
  skippedRows: [],
  skippedCount: 0,
  rows: 8,
  comments: [],
};

/** Written as rows, below every service: what stands in the tables after a while of use. */
export async function makeWorld(manager: EntityManager, teamId: string, personId: string): Promise<World> {
  const insert = async (table: string, values: Record<string, unknown>): Promise<string> => {
    const columns = Object.keys(values);
    const places = columns.map((_, i) => `$${i + 1}`);
    const statement = `INSERT INTO ${table} (${columns.join(', ')}) VALUES (${places.join(', ')}) RETURNING *`;
    const rows: { id: string }[] = await manager.query(statement, Object.values(values));
    return rows[0]!.id;
  };
  const by = { created_by_id: personId };
  const row = { version: 1 };
  const projectId = await insert('project', {
    ...row,
    ...by,
    team_id: teamId,
    name: 'P',
    note: '',
    is_invented: false,
  });
  const inProject = { ...row, project_id: projectId };
  const itemId = await insert('item', { ...inProject, kind: 'driver', name: 'D', serial: '', note: '', published: {} });
  const file = { project_id: projectId, file_name: 'a.txt', bytes: 3, sha256: SHA, ...by };
  const sourceId = await insert('source_file', file);
  await insert('source_chunk', { source_file_id: sourceId, position: 0, content: Buffer.from('abc') });
  const batchId = randomUUID();
  const sweep = { conditions: { role: 'sweep' }, group_name: '', tags: ['damp', 'Ω'], newest_revision: 1 };
  const placed = { item_id: itemId, source_file_id: sourceId, batch_id: batchId, name: 'S' };
  const sweepId = await insert('sweep', { ...inProject, ...placed, ...sweep });
  const read = { overrides: {}, reading: READING, findings: '[]', has_phase: true, points: 8 };
  const range = { min_frequency_hz: 10.1, max_frequency_hz: 20_000, points_sha256: SHA };
  const revisionId = await insert('sweep_revision', { sweep_id: sweepId, number: 1, ...read, ...range, ...by });
  await insert('sweep_points', {
    revision_id: revisionId,
    content: Buffer.from(new Float64Array(24).fill(1 / 3).buffer),
  });
  const sheetId = await insert('sheet', { ...inProject, name: 'Sheet', content: { drawn: [] } });
  const setupId = await insert('setup', {
    ...row,
    team_id: teamId,
    name: `Setup ${projectId}`,
    calculator_id: 'driver-fit',
  });
  const version = { number: 1, calculator_id: 'driver-fit', calculator_version: 1, settings: {}, settings_version: 1 };
  const setupVersionId = await insert('setup_version', { setup_id: setupId, ...version, note: '', ...by });
  const limitSetId = await insert('limit_set', { ...row, team_id: teamId, name: `Limits ${projectId}` });
  await insert('limit_version', {
    limit_set_id: limitSetId,
    number: 1,
    content: { figures: [], curves: [] },
    note: '',
    ...by,
  });
  const run = { calculator_id: 'driver-fit', calculator_version: 1, settings: {}, settings_version: 1, seed: 1 };
  const input = { role: 'free-air', sweepId, revisionId, pointsSha256: SHA, keys: {}, prepSteps: [] };
  const output = { figures: [], traces: [], markers: [], findings: [], tables: [] };
  const from = {
    sheet_id: sheetId,
    item_id: itemId,
    setup_version_id: setupVersionId,
    inputs: JSON.stringify([input]),
    inputs_sha256: SHA,
  };
  const resultId = await insert('result', { ...inProject, ...run, ...from, name: 'R', output, ...by });
  const about = { entity: 'project', entityId: projectId, version: 1, teamId, projectId };
  const actor = { personId };
  await recordChange(manager, { actor, action: 'project:create', ...about, from: null, to: { name: 'P' } });
  return { teamId, projectId, itemId, sourceId, sweepId, revisionId, batchId, sheetId, resultId, setupId, limitSetId };
}

const BINNED = ['project', 'item', 'sweep', 'sheet', 'result', 'setup', 'limit_set'];

/** Takes everything out of the bin again. */
export async function emptyBin(manager: EntityManager): Promise<void> {
  for (const table of BINNED) await manager.query(`UPDATE ${table} SET deleted_at = NULL WHERE deleted_at IS NOT NULL`);
}

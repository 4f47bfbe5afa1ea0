import type { EntityManager, SelectQueryBuilder } from 'typeorm';
import { calculatorById } from '../../calculators/index.js';
import type { Result } from '../../shared/contracts/result.js';
import { AppError } from '../../shared/errors.js';
import { type Lineage, outOfDateReasons, type SweepLineage } from '../../shared/out-of-date.js';
import { text } from '../../shared/text.js';
import type { PersonEntity } from '../database/entities/person.entity.js';
import { ResultEntity } from '../database/entities/result.entity.js';

export type LoadedResult = ResultEntity & { createdBy: PersonEntity };

export function loadedResults(manager: EntityManager): SelectQueryBuilder<LoadedResult> {
  return manager
    .createQueryBuilder(ResultEntity, 'x')
    .innerJoinAndSelect('x.createdBy', 'who') as SelectQueryBuilder<LoadedResult>;
}

export async function loadedResult(manager: EntityManager, resultId: string): Promise<Result> {
  const row = await loadedResults(manager).where('x.id = :resultId', { resultId }).getOne();
  if (!row) throw new AppError('not-found', text.server.notFound);
  const [result] = await toResults(manager, [row]);
  if (!result) throw new AppError('not-found', text.server.notFound);
  return result;
}

/** Results as their contract shows them; what is out of date is found at this moment, with two questions for all. */
export async function toResults(manager: EntityManager, rows: readonly LoadedResult[]): Promise<Result[]> {
  const revisions = await revisionsNow(manager, rows);
  const setups = await setupsNow(manager, rows);
  return rows.map((row) => ({ ...viewOf(row), outOfDate: outOfDateReasons(lineageOf(row, revisions, setups)) }));
}

function viewOf(row: LoadedResult): Omit<Result, 'outOfDate'> {
  const { id, version, projectId, sheetId, itemId, name, calculatorId, calculatorVersion, settings } = row;
  const { settingsVersion, setupVersionId, seed, inputs, output, inputsSha256, createdBy } = row;
  return {
    ...{ id, version, projectId, sheetId, itemId, name, calculatorId, calculatorVersion, settings, settingsVersion },
    ...{ setupVersionId, seed, inputs, output, inputsSha256 },
    createdBy: { id: createdBy.id, name: createdBy.name },
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    deletedAt: row.deletedAt?.toISOString() ?? null,
  };
}

type RevisionNow = { id: string } & SweepLineage;
interface SetupNow {
  id: string;
  made: number;
  now: number;
}

async function revisionsNow(manager: EntityManager, rows: readonly LoadedResult[]): Promise<Map<string, SweepLineage>> {
  const ids = [...new Set(rows.flatMap((row) => row.inputs.map((input) => input.revisionId)))];
  if (ids.length === 0) return new Map();
  const found: RevisionNow[] = await manager.query(
    `SELECT used.id, s.id AS "sweepId", s.deleted_at IS NOT NULL AS "isDeleted",
       json_build_object('number', used.number, 'pointsSha256', used.points_sha256) AS made,
       json_build_object('number', newest.number, 'pointsSha256', newest.points_sha256) AS now
     FROM sweep_revision used JOIN sweep s ON s.id = used.sweep_id
     JOIN sweep_revision newest ON newest.sweep_id = s.id AND newest.number = s.newest_revision
     WHERE used.id = ANY($1)`,
    [ids],
  );
  return new Map(found.map(({ id, ...lineage }) => [id, lineage]));
}

async function setupsNow(manager: EntityManager, rows: readonly LoadedResult[]): Promise<Map<string, SetupNow>> {
  const ids = [...new Set(rows.flatMap(({ setupVersionId }) => setupVersionId ?? []))];
  if (ids.length === 0) return new Map();
  const found: SetupNow[] = await manager.query(
    `SELECT used.id, used.number AS made, max(any_version.number) AS now
     FROM setup_version used JOIN setup_version any_version ON any_version.setup_id = used.setup_id
     WHERE used.id = ANY($1) GROUP BY used.id`,
    [ids],
  );
  return new Map(found.map((setup) => [setup.id, setup]));
}

function lineageOf(row: LoadedResult, revisions: Map<string, SweepLineage>, setups: Map<string, SetupNow>): Lineage {
  return {
    calculator: { made: row.calculatorVersion, now: calculatorById(row.calculatorId)?.version },
    setup: row.setupVersionId ? setups.get(row.setupVersionId) : undefined,
    sweeps: row.inputs.map((input) => revisions.get(input.revisionId) ?? goneFor(input)),
  };
}

/** A sweep that the bin has removed for good. */
function goneFor({ sweepId, pointsSha256 }: ResultEntity['inputs'][number]): SweepLineage {
  const unknown = { number: 0, pointsSha256 };
  return { sweepId, isDeleted: true, made: unknown, now: unknown };
}

import { createHash } from 'node:crypto';
import type { DataSource } from 'typeorm';
import type { Page } from '../../shared/contracts/paging.js';
import type { CreateResult, Result, ResultQuery } from '../../shared/contracts/result.js';
import { resultIdentity } from '../../shared/result-identity.js';
import { binRow, changeRow, type EditableKind, recordMade, unbinRow } from '../activity/recorded-edits.js';
import { ResultEntity } from '../database/entities/result.entity.js';
import { pageOfRows } from '../database/paging.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { requireSoundResult } from './checked-result.js';
import { loadedResult, loadedResults, toResults } from './result-rows.js';

const MOST_RESULTS = 50; // of one page: each brings its curves

const RESULT: EditableKind<ResultEntity, Result> = {
  noun: 'result',
  entity: ResultEntity,
  view: loadedResult,
  told: ({ name, calculatorId, calculatorVersion, sheetId, itemId, inputsSha256 }) => ({
    ...{ name, calculatorId, calculatorVersion, sheetId, itemId, inputsSha256 },
  }),
};

export class ResultService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, projectId: string, query: ResultQuery): Promise<Page<Result>> {
    await this.access.require(actor, 'result:read', { projectId });
    const { manager } = this.dataSource;
    const { sheetId, itemId, sweepId, ...page } = query;
    const rows = loadedResults(manager).where('x.projectId = :projectId AND x.deletedAt IS NULL', { projectId });
    if (sheetId) rows.andWhere('x.sheetId = :sheetId', { sheetId });
    if (itemId) rows.andWhere('x.itemId = :itemId', { itemId });
    if (sweepId) rows.andWhere('x.inputs @> :sweep::jsonb', { sweep: JSON.stringify([{ sweepId }]) });
    const limit = Math.min(page.limit, MOST_RESULTS);
    const { items, next } = await pageOfRows(rows, { ...page, limit }, 'newest-first');
    return { items: await toResults(manager, items), next };
  }

  async create(actor: Actor, projectId: string, input: CreateResult): Promise<Result> {
    const grant = await this.access.require(actor, 'result:create', { projectId });
    return this.dataSource.transaction(async (manager) => {
      await requireSoundResult(manager, grant, input);
      const inputsSha256 = createHash('sha256').update(resultIdentity(input)).digest('hex');
      const row = manager.create(ResultEntity, { ...input, projectId, inputsSha256, createdById: actor.personId });
      const kept = await manager.save(row);
      await recordMade(manager, RESULT, { actor, grant }, kept);
      return RESULT.view(manager, kept.id);
    });
  }

  async one(actor: Actor, resultId: string): Promise<Result> {
    await this.access.require(actor, 'result:read', { resultId });
    return RESULT.view(this.dataSource.manager, resultId);
  }

  async rename(actor: Actor, id: string, version: number, name: string): Promise<Result> {
    const grant = await this.access.require(actor, 'result:update', { resultId: id });
    const by = { actor, grant, id, version };
    return this.dataSource.transaction((manager) => changeRow(manager, RESULT, by, { name }));
  }

  async remove(actor: Actor, id: string, version: number | undefined): Promise<Result> {
    const grant = await this.access.require(actor, 'result:delete', { resultId: id });
    return this.dataSource.transaction((manager) => binRow(manager, RESULT, { actor, grant, id, version }));
  }

  async restore(actor: Actor, id: string, version: number | undefined): Promise<Result> {
    const grant = await this.access.require(actor, 'result:restore', { resultId: id });
    return this.dataSource.transaction((manager) => unbinRow(manager, RESULT, { actor, grant, id, version }));
  }
}

import type { DataSource, EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { CreateLimitSet, LimitSet, PublishLimitsSchema } from '../../shared/contracts/limit-set.js';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { publishNext } from '../activity/publish-next.js';
import { binRow, changeRow, type EditableKind, recordMade, unbinRow } from '../activity/recorded-edits.js';
import { LimitSetEntity, LimitVersionEntity } from '../database/entities/limit-set.entity.js';
import { pageOfRows } from '../database/paging.js';
import { violates } from '../database/violates.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { loadedLimitSet, loadedLimitSets, loadedVersions, toLimitSet, toLimitVersion } from './limit-set-rows.js';

type Publish = z.infer<typeof PublishLimitsSchema>;
type LimitVersion = ReturnType<typeof toLimitVersion>;

const LIMIT_SET: EditableKind<LimitSetEntity, LimitSet> = {
  noun: 'limit-set',
  entity: LimitSetEntity,
  view: loadedLimitSet,
  told: ({ name }) => ({ name }),
};

export class LimitSetService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, teamId: string, query: PageQuery): Promise<Page<LimitSet>> {
    await this.access.require(actor, 'limit-set:read', { teamId });
    const rows = loadedLimitSets(this.dataSource.manager).where('s.teamId = :teamId AND s.deletedAt IS NULL', {
      teamId,
    });
    const { items, next } = await pageOfRows(rows, query);
    return { items: items.map(toLimitSet), next };
  }

  async create(actor: Actor, teamId: string, input: CreateLimitSet): Promise<LimitSet> {
    const grant = await this.access.require(actor, 'limit-set:create', { teamId });
    const { name, content, note } = input;
    return this.named(name, async (manager) => {
      const row = await manager.save(manager.create(LimitSetEntity, { teamId, name }));
      const first = { content, note, limitSetId: row.id, number: 1, createdById: actor.personId };
      await manager.save(manager.create(LimitVersionEntity, first));
      await recordMade(manager, LIMIT_SET, { actor, grant }, row);
      return LIMIT_SET.view(manager, row.id);
    });
  }

  async one(actor: Actor, limitSetId: string): Promise<LimitSet> {
    await this.access.require(actor, 'limit-set:read', { limitSetId });
    return LIMIT_SET.view(this.dataSource.manager, limitSetId);
  }

  async versions(actor: Actor, limitSetId: string, query: PageQuery): Promise<Page<LimitVersion>> {
    await this.access.require(actor, 'limit-set:read', { limitSetId });
    const { items, next } = await pageOfRows(loadedVersions(this.dataSource.manager, limitSetId), query);
    return { items: items.map(toLimitVersion), next };
  }

  /** The next number; the earlier ones stay as they are. */
  async publish(actor: Actor, id: string, version: number | undefined, input: Publish): Promise<LimitSet> {
    const grant = await this.access.require(actor, 'limit-set:update', { limitSetId: id });
    return this.dataSource.transaction((manager) =>
      publishNext(manager, LIMIT_SET, { actor, grant, id, version }, async (_, number) => {
        const next = { ...input, limitSetId: id, number, createdById: actor.personId };
        await manager.save(manager.create(LimitVersionEntity, next));
      }),
    );
  }

  async rename(actor: Actor, id: string, version: number, name: string): Promise<LimitSet> {
    const grant = await this.access.require(actor, 'limit-set:update', { limitSetId: id });
    return this.named(name, (manager) => changeRow(manager, LIMIT_SET, { actor, grant, id, version }, { name }));
  }

  async remove(actor: Actor, id: string, version: number | undefined): Promise<LimitSet> {
    const grant = await this.access.require(actor, 'limit-set:delete', { limitSetId: id });
    return this.dataSource.transaction((manager) => binRow(manager, LIMIT_SET, { actor, grant, id, version }));
  }

  async restore(actor: Actor, id: string, version: number | undefined): Promise<LimitSet> {
    const grant = await this.access.require(actor, 'limit-set:restore', { limitSetId: id });
    const { name } = await this.dataSource.manager.findOneByOrFail(LimitSetEntity, { id });
    return this.named(name, (manager) => unbinRow(manager, LIMIT_SET, { actor, grant, id, version }));
  }

  private async named<Answer>(name: string, work: (manager: EntityManager) => Promise<Answer>): Promise<Answer> {
    try {
      return await this.dataSource.transaction(work);
    } catch (error) {
      if (!violates(error, 'limit_set_team_id_name_live_key')) throw error;
      throw new AppError('name-taken', text.measurements.limitsNameTaken(name), { name }, error);
    }
  }
}

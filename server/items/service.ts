import type { DataSource } from 'typeorm';
import type { CreateItem, Item, ItemQuery, UpdateItem } from '../../shared/contracts/item.js';
import type { Page } from '../../shared/contracts/paging.js';
import { changedFields, recordChange } from '../activity/record-change.js';
import { binRow, restoreRow } from '../database/bin-row.js';
import { editRow } from '../database/edit-row.js';
import { ItemEntity } from '../database/entities/item.entity.js';
import { pageOfRows } from '../database/paging.js';
import { rowView } from '../database/row-view.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';

/** The things measured: drivers, boxes, parts and jigs, with their published figures. */
export class ItemService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, projectId: string, query: ItemQuery): Promise<Page<Item>> {
    await this.access.require(actor, 'item:read', { projectId });
    const rows = this.dataSource.manager
      .createQueryBuilder(ItemEntity, 'i')
      .where('i.projectId = :projectId AND i.deletedAt IS NULL', { projectId });
    if (query.kind !== undefined) rows.andWhere('i.kind = :kind', { kind: query.kind });
    const { items, next } = await pageOfRows(rows, query);
    return { items: items.map(toItem), next };
  }

  async read(actor: Actor, itemId: string): Promise<Item> {
    await this.access.require(actor, 'item:read', { itemId });
    return toItem(await this.dataSource.manager.findOneByOrFail(ItemEntity, { id: itemId }));
  }

  async create(actor: Actor, projectId: string, input: CreateItem): Promise<Item> {
    const { teamId } = await this.access.require(actor, 'item:create', { projectId });
    return this.dataSource.transaction(async (manager) => {
      const row = await manager.save(manager.create(ItemEntity, { ...input, projectId, deletedAt: null }));
      await recordChange(manager, {
        actor,
        action: 'item:create',
        ...about(row, teamId),
        from: null,
        to: { ...input },
      });
      return toItem(row);
    });
  }

  async update(actor: Actor, itemId: string, version: number, changes: UpdateItem): Promise<Item> {
    const { teamId } = await this.access.require(actor, 'item:update', { itemId });
    return this.dataSource.transaction(async (manager) => {
      const edit = { entity: ItemEntity, id: itemId, version, changes, view: toItem };
      const { before, after } = await editRow(manager, edit);
      const fields = changedFields(before, changes);
      await recordChange(manager, { actor, action: 'item:update', ...about(after, teamId), ...fields });
      return toItem(after);
    });
  }

  async remove(actor: Actor, itemId: string, version: number | undefined): Promise<void> {
    const { teamId } = await this.access.require(actor, 'item:delete', { itemId });
    await this.dataSource.transaction(async (manager) => {
      const row = await binRow(manager, { entity: ItemEntity, id: itemId, version, view: toItem });
      const from = { kind: row.kind, name: row.name };
      await recordChange(manager, { actor, action: 'item:delete', ...about(row, teamId), from, to: null });
    });
  }

  async restore(actor: Actor, itemId: string): Promise<Item> {
    const { teamId } = await this.access.require(actor, 'item:restore', { itemId });
    return this.dataSource.transaction(async (manager) => {
      const { row, wasInBin } = await restoreRow(manager, ItemEntity, itemId);
      const to = { kind: row.kind, name: row.name };
      if (wasInBin)
        await recordChange(manager, { actor, action: 'item:restore', ...about(row, teamId), from: null, to });
      return toItem(row);
    });
  }
}

function about(row: ItemEntity, teamId: string) {
  return { entity: 'item', entityId: row.id, version: row.version, teamId, projectId: row.projectId };
}

function toItem(row: ItemEntity): Item {
  const { projectId, kind, name, serial, note, published } = row;
  return { ...rowView(row), projectId, kind, name, serial, note, published };
}

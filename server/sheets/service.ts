import type { DataSource } from 'typeorm';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import type { CreateSheet, Sheet, UpdateSheet } from '../../shared/contracts/sheet.js';
import { binRow, changeRow, type EditableKind, recordMade, unbinRow } from '../activity/recorded-edits.js';
import { SheetEntity } from '../database/entities/sheet.entity.js';
import { pageOfRows } from '../database/paging.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';

const SHEET: EditableKind<SheetEntity, Sheet> = {
  noun: 'sheet',
  entity: SheetEntity,
  view: async (manager, id) => toSheet(await manager.findOneByOrFail(SheetEntity, { id })),
  told: ({ name, content }) => ({ name, content }),
};

export class SheetService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, projectId: string, query: PageQuery): Promise<Page<Sheet>> {
    await this.access.require(actor, 'sheet:read', { projectId });
    const rows = this.dataSource.manager
      .createQueryBuilder(SheetEntity, 's')
      .where('s.projectId = :projectId AND s.deletedAt IS NULL', { projectId });
    const { items, next } = await pageOfRows(rows, query);
    return { items: items.map(toSheet), next };
  }

  async create(actor: Actor, projectId: string, input: CreateSheet): Promise<Sheet> {
    const grant = await this.access.require(actor, 'sheet:create', { projectId });
    return this.dataSource.transaction(async (manager) => {
      const row = await manager.save(manager.create(SheetEntity, { ...input, projectId }));
      await recordMade(manager, SHEET, { actor, grant }, row);
      return SHEET.view(manager, row.id);
    });
  }

  async one(actor: Actor, sheetId: string): Promise<Sheet> {
    await this.access.require(actor, 'sheet:read', { sheetId });
    return SHEET.view(this.dataSource.manager, sheetId);
  }

  async update(actor: Actor, id: string, version: number, changes: UpdateSheet): Promise<Sheet> {
    const grant = await this.access.require(actor, 'sheet:update', { sheetId: id });
    const by = { actor, grant, id, version };
    return this.dataSource.transaction((manager) => changeRow(manager, SHEET, by, changes));
  }

  async remove(actor: Actor, id: string, version: number | undefined): Promise<Sheet> {
    const grant = await this.access.require(actor, 'sheet:delete', { sheetId: id });
    return this.dataSource.transaction((manager) => binRow(manager, SHEET, { actor, grant, id, version }));
  }

  async restore(actor: Actor, id: string, version: number | undefined): Promise<Sheet> {
    const grant = await this.access.require(actor, 'sheet:restore', { sheetId: id });
    return this.dataSource.transaction((manager) => unbinRow(manager, SHEET, { actor, grant, id, version }));
  }
}

function toSheet({ id, version, projectId, name, content, createdAt, updatedAt, deletedAt }: SheetEntity): Sheet {
  return {
    ...{ id, version, projectId, name, content },
    createdAt: createdAt.toISOString(),
    updatedAt: updatedAt.toISOString(),
    deletedAt: deletedAt?.toISOString() ?? null,
  };
}

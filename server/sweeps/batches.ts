import { type DataSource, type EntityManager, type FindOptionsWhere, IsNull, Not } from 'typeorm';
import { binRow, unbinRow } from '../activity/recorded-edits.js';
import { SweepEntity } from '../database/entities/sweep.entity.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { SWEEP, sweepTransaction } from './sweep-changes.js';

/** One drop of files is one batch: undo and restore take it whole. */
export class BatchService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  /** Puts every living sweep of the batch into the bin; answers their ids. */
  async undo(actor: Actor, projectId: string, batchId: string): Promise<string[]> {
    const grant = await this.access.require(actor, 'sweep:delete', { projectId });
    return sweepTransaction(this.dataSource, grant, async (manager) => {
      const ids = await idsOf(manager, { projectId, batchId, deletedAt: IsNull() });
      for (const id of ids) await binRow(manager, SWEEP, { actor, grant, id, version: undefined });
      return ids;
    });
  }

  /** The reverse of undo. A sweep whose file was added again meanwhile stays in the bin. */
  async restore(actor: Actor, projectId: string, batchId: string): Promise<string[]> {
    const grant = await this.access.require(actor, 'sweep:restore', { projectId });
    return sweepTransaction(this.dataSource, grant, async (manager) => {
      const restored: string[] = [];
      for (const id of await idsOf(manager, { projectId, batchId, deletedAt: Not(IsNull()) })) {
        const { sourceFileId } = await manager.findOneByOrFail(SweepEntity, { id });
        if (await manager.existsBy(SweepEntity, { sourceFileId, deletedAt: IsNull() })) continue;
        await unbinRow(manager, SWEEP, { actor, grant, id, version: undefined });
        restored.push(id);
      }
      return restored;
    });
  }
}

async function idsOf(manager: EntityManager, where: FindOptionsWhere<SweepEntity>): Promise<string[]> {
  const rows = await manager.find(SweepEntity, { where, select: { id: true }, order: { createdAt: 'ASC', id: 'ASC' } });
  return rows.map((row) => row.id);
}

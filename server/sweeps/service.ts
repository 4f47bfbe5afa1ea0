import type { DataSource } from 'typeorm';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import type { SweepRow, UpdateSweep } from '../../shared/contracts/sweep.js';
import { binRow, changeRow, unbinRow } from '../activity/recorded-edits.js';
import { pageOfRows } from '../database/paging.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { requireNamedItems } from './named-items.js';
import { SWEEP, sweepTransaction } from './sweep-changes.js';
import { loadedSweeps, toSweep } from './sweep-rows.js';

export class SweepService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, projectId: string, query: PageQuery): Promise<Page<SweepRow>> {
    await this.access.require(actor, 'sweep:read', { projectId });
    const rows = loadedSweeps(this.dataSource.manager).where('s.projectId = :projectId', { projectId });
    const { items, next } = await pageOfRows(rows.andWhere('s.deletedAt IS NULL'), query);
    return { items: items.map(toSweep), next };
  }

  async one(actor: Actor, sweepId: string): Promise<SweepRow> {
    await this.access.require(actor, 'sweep:read', { sweepId });
    return SWEEP.view(this.dataSource.manager, sweepId);
  }

  async update(actor: Actor, id: string, version: number, input: UpdateSweep): Promise<SweepRow> {
    const grant = await this.access.require(actor, 'sweep:update', { sweepId: id });
    return sweepTransaction(this.dataSource, grant, async (manager) => {
      await requireNamedItems(manager, grant.projectId ?? '', input);
      const { group: groupName, ...rest } = input;
      return changeRow(manager, SWEEP, { actor, grant, id, version }, { ...rest, groupName });
    });
  }

  async remove(actor: Actor, id: string, version: number | undefined): Promise<SweepRow> {
    const grant = await this.access.require(actor, 'sweep:delete', { sweepId: id });
    return sweepTransaction(this.dataSource, grant, (manager) => binRow(manager, SWEEP, { actor, grant, id, version }));
  }

  /** Refused with `already-here` when the same file was added again meanwhile. */
  async restore(actor: Actor, id: string, version: number | undefined): Promise<SweepRow> {
    const grant = await this.access.require(actor, 'sweep:restore', { sweepId: id });
    return sweepTransaction(this.dataSource, grant, (manager) =>
      unbinRow(manager, SWEEP, { actor, grant, id, version }),
    );
  }
}

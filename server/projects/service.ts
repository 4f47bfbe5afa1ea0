import type { DataSource, EntityManager } from 'typeorm';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import type { CreateProject, Project, UpdateProject } from '../../shared/contracts/project.js';
import { changedFields, recordChange } from '../activity/record-change.js';
import { binRow, restoreRow } from '../database/bin-row.js';
import { editRow } from '../database/edit-row.js';
import { ProjectEntity } from '../database/entities/project.entity.js';
import { pageOfRows } from '../database/paging.js';
import { rowView } from '../database/row-view.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';

type Counts = Project['counts'];
const NOTHING: Counts = { sweeps: 0, sheets: 0, items: 0, results: 0 };

export class ProjectService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, teamId: string, page: PageQuery): Promise<Page<Project>> {
    await this.access.require(actor, 'project:read', { teamId });
    const rows = this.dataSource.manager
      .createQueryBuilder(ProjectEntity, 'p')
      .where('p.teamId = :teamId AND p.deletedAt IS NULL', { teamId });
    const { items, next } = await pageOfRows(rows, page, 'newest-first');
    return { items: await this.views(this.dataSource.manager, items), next };
  }

  async read(actor: Actor, projectId: string): Promise<Project> {
    await this.access.require(actor, 'project:read', { projectId });
    return this.view(
      this.dataSource.manager,
      await this.dataSource.manager.findOneByOrFail(ProjectEntity, { id: projectId }),
    );
  }

  async create(actor: Actor, teamId: string, input: CreateProject): Promise<Project> {
    await this.access.require(actor, 'project:create', { teamId });
    return this.dataSource.transaction(async (manager) => {
      const made = { ...input, teamId, isInvented: false, createdById: actor.personId, deletedAt: null };
      const row = await manager.save(manager.create(ProjectEntity, made));
      const to = { name: row.name, note: row.note };
      await recordChange(manager, { actor, action: 'project:create', ...about(row), from: null, to });
      return this.view(manager, row);
    });
  }

  async update(actor: Actor, projectId: string, version: number, changes: UpdateProject): Promise<Project> {
    await this.access.require(actor, 'project:update', { projectId });
    return this.dataSource.transaction(async (manager) => {
      const view = (row: ProjectEntity) => this.view(manager, row);
      const edit = { entity: ProjectEntity, id: projectId, version, changes, view };
      const { before, after } = await editRow(manager, edit);
      await recordChange(manager, {
        actor,
        action: 'project:update',
        ...about(after),
        ...changedFields(before, changes),
      });
      return this.view(manager, after);
    });
  }

  async remove(actor: Actor, projectId: string, version: number | undefined): Promise<void> {
    await this.access.require(actor, 'project:delete', { projectId });
    await this.dataSource.transaction(async (manager) => {
      const view = (row: ProjectEntity) => this.view(manager, row);
      const row = await binRow(manager, { entity: ProjectEntity, id: projectId, version, view });
      const from = { name: row.name };
      await recordChange(manager, { actor, action: 'project:delete', ...about(row), from, to: null });
    });
  }

  async restore(actor: Actor, projectId: string): Promise<Project> {
    await this.access.require(actor, 'project:restore', { projectId });
    return this.dataSource.transaction(async (manager) => {
      const { row, wasInBin } = await restoreRow(manager, ProjectEntity, projectId);
      const to = { name: row.name };
      if (wasInBin) await recordChange(manager, { actor, action: 'project:restore', ...about(row), from: null, to });
      return this.view(manager, row);
    });
  }

  private async view(manager: EntityManager, row: ProjectEntity): Promise<Project> {
    const [project] = await this.views(manager, [row]);
    return project!;
  }

  private async views(manager: EntityManager, rows: ProjectEntity[]): Promise<Project[]> {
    const counts = await countsOf(
      manager,
      rows.map((row) => row.id),
    );
    return rows.map((row) => ({
      ...rowView(row),
      teamId: row.teamId,
      name: row.name,
      note: row.note,
      isInvented: row.isInvented,
      counts: counts.get(row.id) ?? NOTHING,
    }));
  }
}

function about(row: ProjectEntity) {
  return { entity: 'project', entityId: row.id, version: row.version, teamId: row.teamId, projectId: row.id };
}

/** How many rows each project holds outside the bin. */
async function countsOf(manager: EntityManager, projectIds: string[]): Promise<Map<string, Counts>> {
  const count = (table: string) =>
    `(SELECT count(*)::int FROM ${table} x WHERE x.project_id = p.id AND x.deleted_at IS NULL) AS "${table}s"`;
  const rows: (Counts & { id: string })[] = await manager.query(
    `SELECT p.id, ${['sweep', 'sheet', 'item', 'result'].map(count).join(', ')} FROM project p WHERE p.id = ANY ($1)`,
    [projectIds],
  );
  return new Map(rows.map(({ id, ...counts }) => [id, counts]));
}

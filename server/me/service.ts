import { type DataSource, IsNull } from 'typeorm';
import { type Me, PreferencesSchema, type UpdateMe } from '../../shared/contracts/account.js';
import type { Team } from '../../shared/contracts/team.js';
import { changedFields, recordChange } from '../activity/record-change.js';
import { editRow } from '../database/edit-row.js';
import { PersonEntity } from '../database/entities/person.entity.js';
import { ProjectEntity } from '../database/entities/project.entity.js';
import type { Actor } from '../permissions/actor.js';

/** A person's own account. */
export class MeService {
  constructor(private readonly dataSource: DataSource) {}

  async read(personId: string): Promise<Me> {
    return this.view(await this.dataSource.manager.findOneByOrFail(PersonEntity, { id: personId }));
  }

  async update(actor: Actor, version: number, input: UpdateMe): Promise<Me> {
    await this.dataSource.transaction(async (manager) => {
      const person = await manager.findOneByOrFail(PersonEntity, { id: actor.personId });
      const preferences = input.preferences && { ...person.preferences, ...input.preferences };
      const changes = { name: input.name, preferences };
      const view = (row: PersonEntity) => this.view(row);
      const edit = { entity: PersonEntity, id: person.id, version, changes, view };
      const { before, after } = await editRow(manager, edit);
      const about = { entity: 'person', entityId: after.id, version: after.version, teamId: after.id, projectId: null };
      await recordChange(manager, { actor, action: 'person:update', ...about, ...changedFields(before, changes) });
    });
    return this.read(actor.personId);
  }

  private async view(person: PersonEntity): Promise<Me> {
    const teams: Team[] = await this.dataSource.query(
      `SELECT t.id, t.name, m.role FROM membership m JOIN team t ON t.id = m.team_id
        WHERE m.person_id = $1 AND t.deleted_at IS NULL ORDER BY m.created_at, t.id`,
      [person.id],
    );
    const where = { isInvented: true, deletedAt: IsNull() };
    const demo = await this.dataSource.manager.findOne(ProjectEntity, { where, order: { createdAt: 'ASC' } });
    return {
      id: person.id,
      version: person.version,
      createdAt: person.createdAt.toISOString(),
      updatedAt: person.updatedAt.toISOString(),
      deletedAt: person.deletedAt?.toISOString() ?? null,
      email: person.email,
      name: person.name,
      verified: person.verifiedAt !== null,
      preferences: PreferencesSchema.parse(person.preferences),
      teams,
      demoProjectId: demo?.id ?? null,
    };
  }
}

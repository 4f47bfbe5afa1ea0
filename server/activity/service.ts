import type { DataSource } from 'typeorm';
import type { Activity } from '../../shared/contracts/activity.js';
import type { Page } from '../../shared/contracts/paging.js';
import { ActivityEntity } from '../database/entities/activity.entity.js';
import { PersonEntity } from '../database/entities/person.entity.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';

/** What happened in a project, newest first. */
export class ActivityService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(
    actor: Actor,
    projectId: string,
    page: { before: number | undefined; limit: number },
  ): Promise<Page<Activity>> {
    const { teamId } = await this.access.require(actor, 'activity:read', { projectId });
    const rows = this.dataSource.manager
      .createQueryBuilder(ActivityEntity, 'a')
      .leftJoin(PersonEntity, 'p', 'p.id = a.actorId')
      .addSelect('p.name', 'actor_name')
      .where('a.chainId = :teamId AND a.projectId = :projectId', { teamId, projectId })
      .orderBy('a.sequence', 'DESC')
      .limit(page.limit + 1);
    if (page.before !== undefined) rows.andWhere('a.sequence < :before', { before: page.before });
    const { entities, raw } = await rows.getRawAndEntities<{ actor_name: string | null }>();
    const items = entities.slice(0, page.limit).map((row, i) => toActivity(row, raw[i]?.actor_name ?? null));
    return { items, next: entities.length > page.limit ? String(items.at(-1)?.sequence) : null };
  }
}

function toActivity(row: ActivityEntity, actorName: string | null): Activity {
  const { sequence, action, entity, entityId, projectId, from, to, previousHash, hash } = row;
  const actor = row.actorId === null ? null : { id: row.actorId, name: actorName ?? '' };
  return {
    sequence,
    at: row.at.toISOString(),
    actor,
    action,
    entity,
    entityId,
    projectId,
    from,
    to,
    previousHash,
    hash,
  };
}

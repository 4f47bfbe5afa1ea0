import type { EntityManager } from 'typeorm';
import { type ProjectEvent, ProjectEventSchema } from '../../shared/contracts/project-event.js';
import { ActivityEntity } from '../database/entities/activity.entity.js';

/** The channel of NOTIFY that every server listens on; the payload is an AnnouncedEvent as JSON. */
export const PROJECT_EVENT_CHANNEL = 'hummock_project_event';

export interface AnnouncedEvent {
  readonly teamId: string;
  readonly projectId: string | null; // null: of the whole team, so of each of its projects
  readonly event: ProjectEvent;
}

/** What the stream of a project tells about one change; undefined for what no project shows. */
function projectEventOf(row: ActivityEntity): ProjectEvent | undefined {
  const { sequence, entity, entityId, entityVersion: version, change, actorId } = row;
  return ProjectEventSchema.safeParse({ sequence, entity, entityId, version, change, actorId }).data;
}

/** Queues the event: PostgreSQL delivers it when the transaction commits, and not at all when it does not. */
export async function announce(manager: EntityManager, row: ActivityEntity): Promise<void> {
  const event = projectEventOf(row);
  if (!event) return;
  const announced: AnnouncedEvent = { teamId: row.chainId, projectId: row.projectId, event };
  await manager.query('SELECT pg_notify($1, $2)', [PROJECT_EVENT_CHANNEL, JSON.stringify(announced)]);
}

/** The events of a project after a sequence number, for a stream that was interrupted: the activity rows hold them. */
export async function projectEventsSince(
  manager: EntityManager,
  { teamId, projectId }: { teamId: string; projectId: string },
  sequence: number,
  limit = 1000,
): Promise<ProjectEvent[]> {
  const rows = await manager
    .createQueryBuilder(ActivityEntity, 'a')
    .where('a.chainId = :teamId AND a.sequence > :sequence', { teamId, sequence })
    .andWhere('(a.projectId = :projectId OR a.projectId IS NULL)', { projectId })
    .orderBy('a.sequence')
    .limit(limit)
    .getMany();
  return rows.map(projectEventOf).filter((event) => event !== undefined);
}

/** The newest sequence number of a team's chain: where a new stream begins. */
export async function newestSequence(manager: EntityManager, teamId: string): Promise<number> {
  const rows: { sequence: number }[] = await manager.query('SELECT sequence FROM activity_head WHERE chain_id = $1', [
    teamId,
  ]);
  return rows[0]?.sequence ?? 0;
}

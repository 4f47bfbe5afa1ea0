import type { DataSource } from 'typeorm';
import type { ProjectEvent } from '../../shared/contracts/project-event.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { newestSequence, projectEventsSince } from '../activity/project-events.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import type { EventHub } from './event-hub.js';
import type { EventInbox } from './event-inbox.js';

const MOST_STREAMS = 40; // of one person on one server: tabs, not a flood

export interface EventTimes {
  readonly beatMs: number; // how often a quiet stream says that it lives, and is checked
  readonly now: () => Date;
}
/** A stream that has begun: the sequence it starts after, and what follows. */
export interface EventStream {
  readonly after: number;
  readonly events: AsyncGenerator<ProjectEvent | 'beat'>;
}

/** Tells what changes in a project, from the rows of the activity and as it is announced. */
export class EventService {
  private readonly open = new Map<string, number>();

  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
    private readonly hub: EventHub,
    private readonly times: EventTimes,
  ) {}

  /** `lastSeen`: the sequence a stream that was interrupted had reached. `stop` fires when the reader is gone. */
  async follow(actor: Actor, projectId: string, lastSeen: number | undefined, stop: AbortSignal): Promise<EventStream> {
    const { teamId } = await this.access.require(actor, 'event:read', { projectId });
    const streams = (this.open.get(actor.personId) ?? 0) + 1;
    if (streams > MOST_STREAMS) throw new AppError('too-many-tries', text.measurements.tooManyStreams(MOST_STREAMS));
    this.open.set(actor.personId, streams);
    const leave = () => this.leave(actor.personId);
    try {
      const place = { teamId, projectId };
      const inbox = await this.hub.open(place);
      stop.addEventListener('abort', () => inbox.end(), { once: true });
      const newest = await newestSequence(this.dataSource.manager, teamId);
      const after = Math.min(lastSeen ?? newest, newest);
      return { after, events: this.events(actor, place, inbox, after, leave) };
    } catch (error) {
      leave();
      throw error;
    }
  }

  private async *events(
    actor: Actor,
    place: { teamId: string; projectId: string },
    inbox: EventInbox,
    after: number,
    leave: () => void,
  ): EventStream['events'] {
    let last = after;
    let checkAt = Date.now() + this.times.beatMs;
    try {
      while (!inbox.isOver) {
        const missed = inbox.takeGap() ? await projectEventsSince(this.dataSource.manager, place, last, 10_000) : [];
        for (const event of [...missed, ...inbox.take()]) {
          if (event.sequence <= last && event.change !== 'progress') continue; // told already
          last = Math.max(last, event.sequence);
          yield event;
        }
        await inbox.wait(checkAt - Date.now());
        if (Date.now() < checkAt) continue;
        if (!(await this.mayStillRead(actor, place.projectId))) return;
        yield 'beat';
        checkAt = Date.now() + this.times.beatMs;
      }
    } finally {
      inbox.close();
      leave();
    }
  }

  private leave(personId: string): void {
    const left = (this.open.get(personId) ?? 1) - 1;
    if (left > 0) this.open.set(personId, left);
    else this.open.delete(personId);
  }

  /** Signed out, removed from the team or the project gone: a stream ends at its next check. */
  private async mayStillRead(actor: Actor, projectId: string): Promise<boolean> {
    const sessions: unknown[] = await this.dataSource.query(
      `SELECT 1 FROM session s JOIN person p ON p.id = s.person_id
       WHERE s.id = $1 AND s.ended_at IS NULL AND s.expires_at > $2 AND p.deleted_at IS NULL`,
      [actor.sessionId, this.times.now()],
    );
    if (sessions.length === 0) return false;
    return this.access.require({ ...actor }, 'event:read', { projectId }).then(
      () => true,
      () => false,
    );
  }
}

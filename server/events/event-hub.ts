import pg from 'pg';
import type { Logger } from 'pino';
import { type AnnouncedEvent, PROJECT_EVENT_CHANNEL } from '../activity/project-events.js';
import { EventInbox } from './event-inbox.js';

const RECONNECT_MS = 1_000;

export interface EventPlace {
  readonly teamId: string;
  readonly projectId: string;
}

/**
 * Hears what any server of this database announces, on one connection of its own, and lays it into the inboxes that
 * are open here. A connection that was lost is opened again; every inbox then knows that it may have missed something.
 */
export class EventHub {
  private readonly inboxes = new Map<EventInbox, EventPlace>();
  private listening: Promise<pg.Client> | undefined;
  private isClosed = false;

  constructor(
    private readonly databaseUrl: string,
    private readonly logger: Logger,
  ) {}

  /** What is announced after this has answered is in the inbox. */
  async open(place: EventPlace): Promise<EventInbox> {
    const inbox = new EventInbox(() => this.inboxes.delete(inbox));
    if (this.isClosed) inbox.end();
    else this.inboxes.set(inbox, place);
    try {
      await this.listen();
    } catch (error) {
      inbox.close();
      throw error;
    }
    return inbox;
  }

  async close(): Promise<void> {
    this.isClosed = true;
    for (const inbox of this.inboxes.keys()) inbox.end();
    const client = await this.listening?.catch(() => undefined);
    await client?.end().catch(() => undefined);
  }

  private listen(): Promise<pg.Client> {
    if (this.isClosed) return Promise.reject(new Error('the event hub is closed'));
    this.listening ??= this.connect().catch((error: unknown) => {
      this.listening = undefined;
      throw error;
    });
    return this.listening;
  }

  private async connect(): Promise<pg.Client> {
    const client = new pg.Client({
      connectionString: this.databaseUrl,
      application_name: 'hummock events',
      keepAlive: true,
    });
    client.on('notification', ({ payload }) => this.deliver(payload ?? ''));
    client.on('error', (error) => this.logger.warn({ err: error, part: 'events' }, 'connection lost'));
    await client.connect();
    client.on('end', () => this.lost());
    await client.query(`LISTEN ${PROJECT_EVENT_CHANNEL}`);
    return client;
  }

  private deliver(payload: string): void {
    const { teamId, projectId, event } = JSON.parse(payload) as AnnouncedEvent;
    for (const [inbox, place] of this.inboxes) {
      if (place.teamId === teamId && (projectId === null || projectId === place.projectId)) inbox.put(event);
    }
  }

  private lost(): void {
    this.listening = undefined;
    if (this.isClosed || this.inboxes.size === 0) return;
    setTimeout(() => {
      if (this.isClosed) return;
      this.listen().then(
        () => {
          for (const inbox of this.inboxes.keys()) inbox.noteGap();
        },
        () => this.lost(),
      );
    }, RECONNECT_MS).unref();
  }
}

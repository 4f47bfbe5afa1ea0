import { randomBytes } from 'node:crypto';
import { type DataSource, type EntityManager, IsNull, MoreThan } from 'typeorm';
import type { Session } from '../../shared/contracts/account.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { recordChange } from '../activity/record-change.js';
import type { PersonEntity } from '../database/entities/person.entity.js';
import { SessionEntity } from '../database/entities/session.entity.js';
import type { Actor } from '../permissions/actor.js';
import { SESSION_DAYS, type Tokens } from './cookies.js';
import type { Keys } from './keys.js';
import { claimedBy, provesItself, readAccess, refreshToken, signAccess } from './tokens.js';

/** Two tabs may refresh with the same token at nearly the same time; for this long both get the same successor. */
const GRACE_MS = 10_000;
const DAY_MS = 86_400_000;

/** Devices signed in: opening, checking on every request, refreshing, ending. */
export class Sessions {
  constructor(
    private readonly dataSource: DataSource,
    private readonly keys: Keys,
    private readonly now: () => Date,
  ) {}

  async open(manager: EntityManager, person: PersonEntity, device: string): Promise<Tokens> {
    const now = this.now();
    const session = await manager.save(
      manager.create(SessionEntity, {
        personId: person.id,
        device,
        salt: randomBytes(16).toString('base64url'),
        generation: 1,
        rotatedAt: now,
        lastUsedAt: now,
        expiresAt: new Date(now.getTime() + SESSION_DAYS * DAY_MS),
        endedAt: null,
      }),
    );
    await this.record(manager, 'session:create', session, person.id, { from: null, to: { device } });
    return this.tokensOf(session);
  }

  /** Who holds this access token; undefined when its session is over, by time or by "sign out everywhere". */
  async actorOf(accessToken: string): Promise<Actor | undefined> {
    const claims = await readAccess(this.keys, accessToken, this.now());
    if (!claims) return undefined;
    const rows: { name: string; isVerified: boolean }[] = await this.dataSource.query(
      `SELECT p.name, p.verified_at IS NOT NULL AS "isVerified" FROM session s JOIN person p ON p.id = s.person_id
        WHERE s.id = $1 AND s.person_id = $2 AND s.ended_at IS NULL AND s.expires_at > $3 AND p.deleted_at IS NULL`,
      [claims.sessionId, claims.personId, this.now()],
    );
    return rows[0] && { ...claims, ...rows[0] };
  }

  /**
   * The next pair of tokens. The token before the newest is honoured for a short while with the same successor; an
   * older one means that somebody else holds a copy, and ends the session for both.
   */
  async refresh(token: string | undefined): Promise<Tokens> {
    const claim = token === undefined ? undefined : claimedBy(token);
    const tokens = claim && (await this.dataSource.transaction((manager) => this.rotate(manager, claim)));
    if (!tokens) throw new AppError('session-ended', text.server.sessionEnded);
    return tokens;
  }

  private async rotate(
    manager: EntityManager,
    claim: { sessionId: string; generation: number; proof: string },
  ): Promise<Tokens | undefined> {
    const where = { id: claim.sessionId, endedAt: IsNull(), expiresAt: MoreThan(this.now()) };
    const session = await manager.findOne(SessionEntity, { where, lock: { mode: 'pessimistic_write' } });
    if (!session || !provesItself(this.keys, session, claim)) return undefined;
    const now = this.now();
    if (claim.generation === session.generation) {
      session.generation += 1;
      session.rotatedAt = now;
      session.lastUsedAt = now;
      session.expiresAt = new Date(now.getTime() + SESSION_DAYS * DAY_MS);
      await manager.save(session);
      return this.tokensOf(session);
    }
    const isPredecessor = claim.generation === session.generation - 1;
    if (isPredecessor && now.getTime() - session.rotatedAt.getTime() <= GRACE_MS) return this.tokensOf(session);
    await this.end(manager, session, session.personId);
    return undefined;
  }

  async endByToken(token: string | undefined): Promise<void> {
    const claim = token === undefined ? undefined : claimedBy(token);
    if (!claim) return;
    await this.dataSource.transaction(async (manager) => {
      const where = { id: claim.sessionId, endedAt: IsNull() };
      const session = await manager.findOne(SessionEntity, { where, lock: { mode: 'pessimistic_write' } });
      if (session && provesItself(this.keys, session, claim)) await this.end(manager, session, session.personId);
    });
  }

  async list(actor: Actor): Promise<Session[]> {
    const where = { personId: actor.personId, endedAt: IsNull(), expiresAt: MoreThan(this.now()) };
    const sessions = await this.dataSource.manager.find(SessionEntity, {
      where,
      order: { lastUsedAt: 'DESC', id: 'ASC' },
    });
    return sessions.map((session) => ({
      id: session.id,
      device: session.device,
      createdAt: session.createdAt.toISOString(),
      lastUsedAt: session.lastUsedAt.toISOString(),
      isThisOne: session.id === actor.sessionId,
    }));
  }

  /** Ends one session of the actor; one of somebody else is not there. */
  async endOne(actor: Actor, sessionId: string): Promise<void> {
    await this.dataSource.transaction(async (manager) => {
      const where = { id: sessionId, personId: actor.personId, endedAt: IsNull() };
      const session = await manager.findOne(SessionEntity, { where, lock: { mode: 'pessimistic_write' } });
      if (!session) throw new AppError('not-found', text.server.notFound);
      await this.end(manager, session, actor.personId);
    });
  }

  endEverywhere(actor: Actor): Promise<void> {
    return this.dataSource.transaction((manager) => this.endAll(manager, actor.personId));
  }

  /** Ends every session of a person, the one in hand included. */
  async endAll(manager: EntityManager, personId: string): Promise<void> {
    const where = { personId, endedAt: IsNull() };
    const sessions = await manager.find(SessionEntity, { where, lock: { mode: 'pessimistic_write' } });
    for (const session of sessions) await this.end(manager, session, personId);
  }

  private async end(manager: EntityManager, session: SessionEntity, actorId: string): Promise<void> {
    session.endedAt = this.now();
    await manager.save(session);
    await this.record(manager, 'session:end', session, actorId, { from: { device: session.device }, to: null });
  }

  private async record(
    manager: EntityManager,
    action: 'session:create' | 'session:end',
    session: SessionEntity,
    actorId: string,
    states: { from: Record<string, unknown> | null; to: Record<string, unknown> | null },
  ): Promise<void> {
    const about = { entity: 'session', entityId: session.id, version: 1, teamId: session.personId, projectId: null };
    await recordChange(manager, { actor: { personId: actorId }, action, ...about, ...states });
  }

  private async tokensOf(session: SessionEntity): Promise<Tokens> {
    const claims = { personId: session.personId, sessionId: session.id };
    return {
      access: await signAccess(this.keys, claims, this.now()),
      refresh: refreshToken(this.keys, session, session.generation),
    };
  }
}

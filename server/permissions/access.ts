import type { DataSource } from 'typeorm';
import type { Role } from '../../shared/contracts/team.js';
import { AppError } from '../../shared/errors.js';
import { type Action, isReading, mayDo } from '../../shared/permissions.js';
import { text } from '../../shared/text.js';
import type { Actor } from './actor.js';
import { PLACE_QUERIES, type Place, type Target, type TargetKey } from './place.js';

/** Where the actor may do it: the team and project of the target, and the role there (viewer in the demo). */
export interface Grant {
  readonly teamId: string;
  readonly projectId: string | null;
  readonly role: Role;
}

/**
 * Decides by the table of shared/permissions.ts and by what the database says at this moment. A thing of another team
 * answers as if it were not there.
 */
export class Access {
  /** An actor lives for one request: the gate and the service ask the same question, the database hears it once. */
  private readonly asked = new WeakMap<Actor, Map<string, Promise<Grant>>>();

  constructor(private readonly dataSource: DataSource) {}

  require(actor: Actor, action: Action, target: Target): Promise<Grant> {
    const answers = this.asked.get(actor) ?? new Map<string, Promise<Grant>>();
    this.asked.set(actor, answers);
    const question = `${action} ${JSON.stringify(target)}`;
    const answer = answers.get(question) ?? this.decide(actor, action, target);
    answers.set(question, answer);
    return answer;
  }

  private async decide(actor: Actor, action: Action, target: Target): Promise<Grant> {
    const place = await this.placeOf(actor, target);
    const isOpen = place !== undefined && !place.isGone && (!place.isDeleted || action.endsWith(':restore'));
    if (!isOpen) throw new AppError('not-found', text.server.notFound);
    const role = place.role ?? (place.isInvented ? 'viewer' : null);
    if (role === null) throw new AppError('not-found', text.server.notFound);
    const isVisitor = place.role === null; // of the demo: looks, and no more than that
    if (!mayDo(role, action) || (isVisitor && !isReading(action)))
      throw new AppError('access-denied', text.server.accessDenied(role), { role, action });
    if (!isReading(action) && !actor.isVerified) throw new AppError('not-verified', text.server.notVerified);
    return { teamId: place.teamId, projectId: place.projectId, role };
  }

  private async placeOf(actor: Actor, target: Target): Promise<Place | undefined> {
    const [key, id] = Object.entries(target)[0] as [TargetKey, string];
    const rows: Place[] = await this.dataSource.query(PLACE_QUERIES[key], [id, actor.personId]);
    return rows[0];
  }
}

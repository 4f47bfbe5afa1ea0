import type { DataSource, EntityManager } from 'typeorm';
import type { Register, SignIn } from '../../shared/contracts/account.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { recordChange } from '../activity/record-change.js';
import { PersonEntity } from '../database/entities/person.entity.js';
import { MembershipEntity, TeamEntity } from '../database/entities/team.entity.js';
import { violates } from '../database/violates.js';
import type { Jobs } from '../jobs/jobs.js';
import type { Tokens } from './cookies.js';
import type { Keys } from './keys.js';
import { spendCode, voidCodes } from './mail-codes.js';
import { opens, passwordHash } from './passwords.js';
import { provesRegistration, registrationProof } from './registration-proof.js';
import type { Sessions } from './sessions.js';

export interface SignedIn {
  readonly personId: string;
  readonly tokens: Tokens;
}

/** Shows that whoever opens the letter's link also chose the password: the cookie of the registration, or the password. */
export interface RegistrationProof {
  readonly registration: string | undefined;
  readonly password: string | undefined;
}

const PERSON_EMAIL_KEY = 'person_email_key';

/** Accounts: what is answered never tells whether an address is known. */
export class AccountService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly sessions: Sessions,
    private readonly jobs: Jobs,
    private readonly keys: Keys,
    private readonly now: () => Date,
  ) {}

  /** Answers what the browser keeps to prove that it registered; of a confirmed address, something that proves nothing. */
  async register(input: Register): Promise<string> {
    const hash = await passwordHash(input.password);
    try {
      await this.dataSource.transaction((manager) => this.makePerson(manager, input, hash));
    } catch (error) {
      if (!violates(error, PERSON_EMAIL_KEY)) throw error;
      await this.dataSource.transaction((manager) => this.registerAgain(manager, input, hash));
    }
    return registrationProof(this.keys, input.email, hash);
  }

  private async makePerson(manager: EntityManager, input: Register, hash: string): Promise<void> {
    const { email, name } = input;
    const person = await manager.save(
      manager.create(PersonEntity, {
        email,
        name,
        passwordHash: hash,
        verifiedAt: null,
        preferences: {},
        deletedAt: null,
      }),
    );
    const actor = { personId: person.id };
    const own = { entity: 'person', entityId: person.id, version: 1, teamId: person.id, projectId: null };
    await recordChange(manager, { actor, action: 'person:register', ...own, from: null, to: { email, name } });
    const team = await manager.save(
      manager.create(TeamEntity, { name: input.teamName ?? text.server.firstTeam(name), rules: {}, deletedAt: null }),
    );
    await manager.insert(MembershipEntity, { teamId: team.id, personId: person.id, role: 'owner' });
    const made = { entity: 'team', entityId: team.id, version: 1, teamId: team.id, projectId: null };
    const to = { name: team.name, owner: person.id };
    await recordChange(manager, { actor, action: 'team:create', ...made, from: null, to });
    await this.jobs.add(manager, 'send-letter', { kind: 'register', email });
  }

  /**
   * A known address. As long as it is not confirmed the newest registration counts and the older letters close, so
   * that nobody can prepare an account for a stranger; a confirmed one stays as it is and gets a letter that says so.
   */
  private async registerAgain(manager: EntityManager, input: Register, hash: string): Promise<void> {
    const where = { email: input.email };
    const person = await manager.findOneOrFail(PersonEntity, { where, lock: { mode: 'pessimistic_write' } });
    if (!person.verifiedAt && !person.deletedAt) {
      await voidCodes(manager, person.id, 'verify', this.now());
      await this.sessions.endAll(manager, person.id);
      const from = { name: person.name };
      await manager.save(Object.assign(person, { name: input.name, passwordHash: hash }));
      await this.recordOwn(manager, person, 'person:register', from, { name: input.name });
    }
    await this.jobs.add(manager, 'send-letter', { kind: 'register', email: input.email });
  }

  async sendVerification(email: string): Promise<void> {
    await this.jobs.add(this.dataSource.manager, 'send-letter', { kind: 'verify', email });
  }

  /**
   * Confirms the address, ends every session and opens one here. The letter proves the address only: a stranger may
   * have registered it with a password of their own. So the proof of the registration is asked for too, and without
   * it nothing happens and the code stays open.
   */
  async verify(code: string, proof: RegistrationProof, device: string): Promise<SignedIn> {
    return this.dataSource.transaction(async (manager) => {
      const personId = await spendCode(manager, code, 'verify', this.now());
      const person = await this.livePerson(manager, personId);
      await this.requireProof(person, proof);
      if (!person.verifiedAt) {
        person.verifiedAt = this.now();
        await manager.save(person);
        await this.recordOwn(manager, person, 'person:verify', { verified: false }, { verified: true });
      }
      await this.sessions.endAll(manager, personId);
      return { personId, tokens: await this.sessions.open(manager, person, device) };
    });
  }

  private async requireProof(person: PersonEntity, { registration, password }: RegistrationProof): Promise<void> {
    if (provesRegistration(this.keys, person, registration)) return;
    if (password === undefined) throw new AppError('password-needed', text.server.passwordNeeded);
    if (await opens(person.passwordHash, password)) return;
    throw new AppError('password-needed', text.server.passwordDiffers);
  }

  async signIn({ email, password }: SignIn, device: string): Promise<SignedIn> {
    const person = await this.dataSource.manager.findOneBy(PersonEntity, { email });
    const isRight = await opens(person?.deletedAt ? undefined : person?.passwordHash, password);
    if (!person || !isRight) throw new AppError('sign-in-failed', text.server.signInFailed);
    const tokens = await this.dataSource.transaction((manager) => this.sessions.open(manager, person, device));
    return { personId: person.id, tokens };
  }

  /** The same work for every address: whether it is known is found out when the letter is written. */
  async forgot(email: string): Promise<void> {
    await this.jobs.add(this.dataSource.manager, 'send-letter', { kind: 'reset', email });
  }

  /** Sets the password, ends every session, and opens one here. The letter also proved the address. */
  async reset(code: string, password: string, device: string): Promise<SignedIn> {
    const hash = await passwordHash(password);
    return this.dataSource.transaction(async (manager) => {
      const personId = await spendCode(manager, code, 'reset', this.now());
      const person = await this.livePerson(manager, personId);
      await voidCodes(manager, personId, 'verify', this.now());
      await this.sessions.endAll(manager, personId);
      const from = { verified: person.verifiedAt !== null };
      await manager.save(Object.assign(person, { passwordHash: hash, verifiedAt: person.verifiedAt ?? this.now() }));
      await this.recordOwn(manager, person, 'person:reset-password', from, { verified: true });
      return { personId, tokens: await this.sessions.open(manager, person, device) };
    });
  }

  private async livePerson(manager: EntityManager, id: string): Promise<PersonEntity> {
    const person = await manager.findOne(PersonEntity, { where: { id }, lock: { mode: 'pessimistic_write' } });
    if (!person || person.deletedAt) throw new AppError('link-not-open', text.server.linkNotOpen);
    return person;
  }

  private async recordOwn(
    manager: EntityManager,
    person: PersonEntity,
    action: 'person:register' | 'person:verify' | 'person:reset-password',
    from: Record<string, unknown>,
    to: Record<string, unknown>,
  ): Promise<void> {
    const about = {
      entity: 'person',
      entityId: person.id,
      version: person.version,
      teamId: person.id,
      projectId: null,
    };
    await recordChange(manager, { actor: { personId: person.id }, action, ...about, from, to });
  }
}

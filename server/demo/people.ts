import type { EntityManager } from 'typeorm';
import type { Role } from '../../shared/contracts/team.js';
import { passwordHash } from '../account/passwords.js';
import { recordChange } from '../activity/record-change.js';
import { PersonEntity } from '../database/entities/person.entity.js';
import { MembershipEntity, TeamEntity } from '../database/entities/team.entity.js';
import type { Actor } from '../permissions/actor.js';

export const TEAM_NAME = 'Hillside School';
/** One for all of the demo, printed at the start: it guards nothing but invented data. */
export const DEMO_PASSWORD = 'rehearsal-room-4';
export const DEMO_PEOPLE: readonly { name: string; email: string; role: Role }[] = [
  { name: 'Mara', email: 'mara@hillside.example', role: 'owner' },
  { name: 'Teo', email: 'teo@hillside.example', role: 'lead' },
  { name: 'Ines', email: 'ines@hillside.example', role: 'member' },
  { name: 'Pavel', email: 'pavel@hillside.example', role: 'viewer' },
];

/** Finds the demo's people and their team, or makes them. */
export async function demoPeople(manager: EntityManager): Promise<{ actors: Actor[]; teamId: string }> {
  const actors: Actor[] = [];
  for (const { name, email } of DEMO_PEOPLE) {
    const known = await manager.findOneBy(PersonEntity, { email });
    const person = known ?? (await makePerson(manager, name, email));
    actors.push({ personId: person.id, sessionId: NO_SESSION, name: person.name, isVerified: true });
  }
  return { actors, teamId: await demoTeam(manager, actors) };
}

/** The seed acts for people who are not signed in. */
const NO_SESSION = '00000000-0000-0000-0000-000000000000';

async function makePerson(manager: EntityManager, name: string, email: string): Promise<PersonEntity> {
  const row = { email, name, passwordHash: await passwordHash(DEMO_PASSWORD), preferences: {}, deletedAt: null };
  const person = await manager.save(manager.create(PersonEntity, { ...row, verifiedAt: new Date() }));
  await recordChange(manager, {
    ...{ actor: null, action: 'person:register', entity: 'person', entityId: person.id, version: 1 },
    ...{ teamId: person.id, projectId: null, from: null, to: { email, name } },
  });
  return person;
}

async function demoTeam(manager: EntityManager, actors: readonly Actor[]): Promise<string> {
  const owner = actors[0]!.personId;
  const [known]: { id: string }[] = await manager.query(
    `SELECT t.id FROM team t JOIN membership m ON m.team_id = t.id
     WHERE m.person_id = $1 AND m.role = 'owner' AND t.name = $2`,
    [owner, TEAM_NAME],
  );
  if (known) return known.id;
  const team = await manager.save(manager.create(TeamEntity, { name: TEAM_NAME, rules: {}, deletedAt: null }));
  const members = DEMO_PEOPLE.map(({ role }, i) => ({ teamId: team.id, personId: actors[i]!.personId, role }));
  await manager.save(members.map((member) => manager.create(MembershipEntity, member)));
  await recordChange(manager, {
    ...{ actor: { personId: owner }, action: 'team:create', entity: 'team', entityId: team.id, version: 1 },
    ...{ teamId: team.id, projectId: null, from: null, to: { name: team.name, owner } },
  });
  return team.id;
}

import type { Me } from '../../../shared/contracts/account.js';
import type { Role } from '../../../shared/contracts/team.js';
import type { TestApp } from './app.js';
import type { Client } from './client.js';

export const PASSWORD = 'a quiet passphrase';

/** Somebody with an account, signed in with a client of their own. */
export interface TestPerson {
  readonly client: Client;
  readonly me: Me;
  readonly teamId: string;
}

let count = 0;

/** Registers, opens the letter's link, and so is signed in; `name` also makes the address. */
export async function makePerson(app: TestApp, name = 'Person'): Promise<TestPerson> {
  count += 1;
  const email = `${name.toLowerCase()}-${count}@example.test`;
  const client = app.client();
  await client.post('/api/account/register', { email, name, password: PASSWORD });
  const letter = (await app.letters()).find(({ to }) => to === email);
  const code = letter?.link.split('/').at(-1);
  const { status, body } = await client.post<Me>('/api/account/verify', { code });
  if (status !== 200) throw new Error(`The test person was not verified: ${JSON.stringify(body)}`);
  return { client, me: body, teamId: body.teams[0]!.id };
}

/** Makes a person a member of another's team, as the pages of the team will. */
export async function join(app: TestApp, person: TestPerson, teamId: string, role: Role): Promise<void> {
  await app.dataSource.query('INSERT INTO membership (team_id, person_id, role, version) VALUES ($1, $2, $3, 1)', [
    teamId,
    person.me.id,
    role,
  ]);
}

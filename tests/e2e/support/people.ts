import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, type Page } from '@playwright/test';

export interface Person {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}
let count = 0;

export function newPerson(name = 'Ivo Lindqvist'): Person {
  count += 1;
  return {
    name,
    email: `person-${process.pid}-${Date.now()}-${count}@hillside.example`,
    password: 'lichen-and-heather-7',
  };
}

/** The path of the newest letter's link to this address, as the mail sink kept it. Waits for the letter. */
export async function linkFromLetter(email: string): Promise<string> {
  const folder = process.env.HUMMOCK_E2E_MAIL ?? '';
  let link = '';
  await expect(async () => {
    const letters = readdirSync(folder).filter((file) => file.includes(email));
    const newest = letters.sort().at(-1);
    const written = newest
      ? readFileSync(join(folder, newest), 'utf8')
          .replace(/=\r?\n/g, '')
          .replace(/=3D/g, '=')
      : '';
    const found = /https?:\/\/[^\s"<>]+/.exec(written)?.[0];
    expect(found, `a letter to ${email} with a link`).toBeTruthy();
    link = new URL(found ?? '').pathname;
  }).toPass({ timeout: 15_000 });
  return link;
}

/** Makes an account by the API, verifies it by its letter, and leaves the page signed in. */
export async function signedInPerson(page: Page, person: Person = newPerson()): Promise<Person> {
  await page.goto('/sign-in');
  const origin = new URL(page.url()).origin;
  const answer = await page.request.post('/api/account/register', {
    data: { email: person.email, password: person.password, name: person.name },
    headers: { origin },
  });
  expect(answer.status(), await answer.text()).toBe(202);
  const code = (await linkFromLetter(person.email)).split('/').at(-1);
  const verified = await page.request.post('/api/account/verify', { data: { code }, headers: { origin } });
  expect(verified.status(), await verified.text()).toBe(200);
  await page.evaluate(() => localStorage.setItem('hummock.signed-in', 'yes'));
  return person;
}

/** A project of the person who is signed in on this page. */
export async function newProject(page: Page, name = 'Rehearsal rooms'): Promise<string> {
  const origin = new URL(page.url()).origin;
  const me = (await (await page.request.get('/api/me')).json()) as { teams: { id: string }[] };
  const answer = await page.request.post(`/api/teams/${me.teams[0]?.id}/projects`, {
    data: { name },
    headers: { origin },
  });
  expect(answer.status(), await answer.text()).toBe(201);
  return ((await answer.json()) as { id: string }).id;
}

import { readdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { expect, type Page } from '@playwright/test';

export interface Person {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}
let count = 0;

/** Somebody new; every test works with people and teams of its own. */
export function newPerson(name = 'Ines Brook'): Person {
  count += 1;
  return { name, email: `person-${process.pid}-${Date.now()}-${count}@example.org`, password: 'spruce and heather' };
}

/** The link in the newest letter to this address; waits for the letter. `kind` is the first part of the link's path. */
export async function linkInLetter(email: string, kind: 'verify' | 'reset'): Promise<string> {
  const folder = process.env.HUMMOCK_E2E_MAIL ?? '';
  let link: string | undefined;
  await expect(async () => {
    for (const name of (await readdir(folder)).sort().reverse()) {
      const letter = (await readFile(join(folder, name), 'utf8')).replaceAll(/=\r?\n/g, '').replaceAll('=3D', '=');
      if (!letter.includes(email)) continue;
      link = new RegExp(`https?://[^\\s"<>]*/${kind}/[^\\s"<>]+`).exec(letter)?.[0];
      if (link) break;
    }
    expect(link, `a letter to ${email}`).toBeTruthy();
  }).toPass({ timeout: 20_000 });
  return link ?? '';
}

/** A registered, confirmed and signed-in person, without going through the forms. */
export async function signedIn(page: Page, person = newPerson()): Promise<Person> {
  const { name, email, password } = person;
  const base = new URL(process.env.HUMMOCK_E2E_URL ?? '');
  const options = { headers: { origin: base.origin } };
  const registered = await page.request.post('/api/account/register', { ...options, data: { name, email, password } });
  expect(registered.ok()).toBe(true);
  const code = (await linkInLetter(email, 'verify')).split('/').at(-1);
  expect((await page.request.post('/api/account/verify', { ...options, data: { code } })).ok()).toBe(true);
  expect((await page.request.post('/api/account/sign-in', { ...options, data: { email, password } })).ok()).toBe(true);
  await page.addInitScript(() => localStorage.setItem('hummock.signed-in', 'yes'));
  return person;
}

/** A project of the signed-in person's own team; answers its path. */
export async function newProject(page: Page, name = 'Monitors for room 3'): Promise<string> {
  const { origin } = new URL(process.env.HUMMOCK_E2E_URL ?? '');
  const me = (await (await page.request.get('/api/me')).json()) as { teams: { id: string }[] };
  const made = await page.request.post(`/api/teams/${me.teams[0]?.id}/projects`, {
    headers: { origin },
    data: { name },
  });
  expect(made.ok()).toBe(true);
  return `/p/${((await made.json()) as { id: string }).id}`;
}

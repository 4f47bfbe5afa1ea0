import { expect, test } from '@playwright/test';
import { newPerson, newProject, signedIn } from './support/people.js';
import { complaintsOf, expectGoodScreen } from './support/screens.js';

test('home shows what waits, and it goes as things are done', async ({ page }) => {
  await signedIn(page);
  await page.goto('/home');
  await expect(page.getByText('Nothing waits for you.')).toBeVisible();
  await page.getByRole('button', { name: 'New project' }).click();
  await page.getByLabel('Name', { exact: true }).fill('Cabinets of room 3');
  await page.getByRole('button', { name: 'Make the project' }).click();
  await expect(page.getByRole('heading', { name: 'Cabinets of room 3', level: 1 })).toBeVisible();
  await page.getByRole('link', { name: 'Home' }).click();
  await expect(page.getByText('“Cabinets of room 3” has no sweeps yet.')).toBeVisible();
});

test('a person who has not confirmed the address is told so and can ask for the letter again', async ({ page }) => {
  const { name, email, password } = newPerson('Tove Marsh');
  const headers = { origin: new URL(process.env.HUMMOCK_E2E_URL ?? '').origin };
  await page.request.post('/api/account/register', { headers, data: { name, email, password } });
  await page.goto('/sign-in');
  await page.getByLabel('E-mail address').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByText(`Confirm your address ${email}`)).toBeVisible();
  const make = page.getByRole('button', { name: 'New project' });
  await expect(make).toHaveAttribute('aria-disabled', 'true');
  await expect(make).toHaveAccessibleDescription(/Confirm your e-mail address first/);
  await page.getByRole('button', { name: 'Send the letter again' }).click();
  await expect(page.getByText('A new letter is on its way.')).toBeVisible();
});

test('a project is renamed, deleted and brought back by Undo', async ({ page }) => {
  await signedIn(page);
  await page.goto(await newProject(page));
  await page.getByRole('button', { name: 'Name and note' }).click();
  await page.getByLabel('Name', { exact: true }).fill('Room 4');
  await page.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByRole('heading', { name: 'Room 4', level: 1 })).toBeVisible();
  await page.getByRole('button', { name: 'Name and note' }).click();
  await page.getByRole('button', { name: 'Delete the project' }).click();
  await expect(page.getByText('No projects yet')).toBeVisible();
  await page.getByRole('button', { name: 'Undo' }).click();
  await expect(page.getByRole('link', { name: 'Room 4' })).toBeVisible();
});

test('two edits of different fields at the same time both hold', async ({ page }) => {
  await signedIn(page);
  const project = await newProject(page);
  const id = project.split('/').at(-1);
  await page.goto(project);
  await page.getByRole('button', { name: 'Name and note' }).click();
  const headers = { origin: new URL(process.env.HUMMOCK_E2E_URL ?? '').origin };
  const row = (await (await page.request.get(`/api/projects/${id}`)).json()) as { version: number };
  const renamed = await page.request.patch(`/api/projects/${id}`, {
    headers: { ...headers, 'if-match': `"${row.version}"` },
    data: { note: 'Swept on Monday.' },
  });
  expect(renamed.ok()).toBe(true);
  await page.getByLabel('Name', { exact: true }).fill('Room 5'); // the note was not touched here: both edits hold
  await page.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByRole('heading', { name: 'Room 5', level: 1 })).toBeVisible();
  await expect(page.getByText('Swept on Monday.')).toBeVisible();
});

test('the same field edited twice asks, and saving again keeps one’s own', async ({ page }) => {
  await signedIn(page);
  const project = await newProject(page);
  const id = project.split('/').at(-1);
  await page.goto(project);
  await page.getByRole('button', { name: 'Name and note' }).click();
  const headers = { origin: new URL(process.env.HUMMOCK_E2E_URL ?? '').origin };
  const row = (await (await page.request.get(`/api/projects/${id}`)).json()) as { version: number };
  const renamed = await page.request.patch(`/api/projects/${id}`, {
    headers: { ...headers, 'if-match': `"${row.version}"` },
    data: { name: 'Room 9' },
  });
  expect(renamed.ok()).toBe(true);
  await page.getByLabel('Name', { exact: true }).fill('Room 5');
  await page.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByRole('alert')).toContainText('Room 9');
  await page.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByRole('heading', { name: 'Room 5', level: 1 })).toBeVisible();
});

test('theme, units and spacing hold at once and after a reload, also on another device', async ({ page, browser }) => {
  const person = await signedIn(page);
  await page.goto('/me');
  await page.getByLabel('Theme').selectOption('dark');
  await page.getByLabel('Lengths, areas, volumes and masses').selectOption('inch');
  await page.getByLabel('Spacing').selectOption('workshop');
  await expect(page.locator('html')).toHaveAttribute('data-theme', 'dark');
  await expect(page.locator('html')).toHaveAttribute('data-density', 'workshop');
  await page.getByLabel('Your name').fill('Ines Brookfield');
  const button = page.getByRole('button', { name: 'Save' });
  await button.click();
  await expect(page.getByText('Saved.')).toBeVisible();
  await expect(async () => expect((await button.boundingBox())?.height).toBeGreaterThanOrEqual(47.5)).toPass();
  await page.reload();
  await expect(page.locator('html')).toHaveAttribute('data-theme', 'dark');
  await expect(page.getByLabel('Lengths, areas, volumes and masses')).toHaveValue('inch');
  const other = await browser.newContext({ baseURL: process.env.HUMMOCK_E2E_URL ?? '' });
  const elsewhere = await other.newPage();
  await elsewhere.goto('/sign-in');
  await elsewhere.getByLabel('E-mail address').fill(person.email);
  await elsewhere.getByLabel('Password', { exact: true }).fill(person.password);
  await elsewhere.getByRole('button', { name: 'Sign in' }).click();
  await expect(elsewhere.locator('html')).toHaveAttribute('data-theme', 'dark');
  await other.close();
});

test('an item keeps its published figures in the units they are printed in', async ({ page }) => {
  await signedIn(page);
  const project = await newProject(page);
  await page.goto(`${project}/items`);
  await page.getByRole('button', { name: 'New item' }).click();
  await page.getByLabel('Name', { exact: true }).fill('Mid-woofer 1');
  await page.getByRole('button', { name: 'Make the item' }).click();
  await expect(page.getByRole('heading', { name: 'Mid-woofer 1', level: 1 })).toBeVisible();
  await page.getByLabel('Figure', { exact: true }).selectOption('Vas');
  await page.getByLabel('Value').fill('0.5 ft³');
  await expect(page.getByText('Understood as 14.16 L')).toBeVisible(); // 0.5 · 0.3048³ m³, the foot by definition
  await page.getByLabel('Tolerance (%)').fill('15');
  await page.getByRole('button', { name: 'Add a figure' }).click();
  await expect(page.getByRole('row', { name: /Equivalent volume/ })).toContainText(/14\.16\sL ±\s15\s%/);
  await page.reload();
  await expect(page.getByRole('row', { name: /Equivalent volume/ })).toContainText(/14\.16\sL/);
});

test('without a connection the page says so and takes it back when it returns', async ({ page, context }) => {
  await signedIn(page);
  await page.goto('/home');
  await page.getByRole('heading', { level: 1 }).waitFor();
  await context.setOffline(true);
  await expect(page.getByText('No connection.')).toBeVisible();
  await context.setOffline(false);
  await expect(page.getByText('No connection.')).toBeHidden();
});

test('an unknown project is a page with words, a way on and the reference of the request', async ({ page }) => {
  await signedIn(page);
  await page.goto('/p/00000000-0000-4000-8000-000000000000');
  await expect(page.getByRole('alert')).toContainText(/Reference [0-9a-f-]{20,}/);
  await page.getByRole('link', { name: 'Home' }).last().click();
  await expect(page.getByRole('heading', { name: 'Home', level: 1 })).toBeVisible();
});

test('home, settings, project and items are accessible in both themes and narrow windows', async ({ page }) => {
  const complaints = complaintsOf(page);
  await signedIn(page);
  const project = await newProject(page);
  for (const path of ['/home', '/me', project, `${project}/items`, `${project}/add`]) {
    await page.goto(path);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page.waitForLoadState('networkidle', { timeout: 3000 }).catch(() => {}); // the event stream never ends
    await expectGoodScreen(page);
  }
  expect(complaints).toEqual([]);
});

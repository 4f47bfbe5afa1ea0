import { expect, test } from '@playwright/test';
import { linkInLetter, newPerson, newProject, signedIn } from './support/people.js';
import { complaintsOf, expectGoodScreen } from './support/screens.js';

test('a person registers, confirms the address by its letter, signs in and lands at home', async ({ page }) => {
  const complaints = complaintsOf(page);
  const { name, email, password } = newPerson();
  await page.goto('/register');
  await page.getByLabel('Your name').fill(name);
  await page.getByLabel('E-mail address').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByLabel('Name of your team').fill('Rehearsal rooms');
  await page.getByRole('button', { name: 'Make the account' }).click();
  await expect(page.getByRole('status').filter({ hasText: email })).toBeVisible();
  const link = await linkInLetter(email, 'verify');
  await page.goto(link);
  await page.getByRole('button', { name: 'Confirm the address' }).click();
  await expect(page.getByText('The address is confirmed.')).toBeVisible();
  await page.getByRole('link', { name: 'Sign in' }).last().click();
  await page.getByLabel('E-mail address').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByRole('heading', { name: 'Home', level: 1 })).toBeVisible();
  await expect(page.getByText('Rehearsal rooms')).toBeVisible();
  await page.goto(link); // a code works once
  await page.getByRole('button', { name: 'Confirm the address' }).click();
  await expect(page.getByRole('alert')).toContainText('This link is not open');
  expect(complaints).toEqual([]);
});

test('everything up to the account is reached by keyboard alone', async ({ page }) => {
  const { name, email, password } = newPerson();
  await page.goto('/register');
  await page.getByRole('heading', { level: 1 }).waitFor();
  await page.keyboard.press('Tab');
  await expect(page.getByRole('link', { name: 'Skip to the content' })).toBeFocused();
  await page.keyboard.press('Enter');
  for (const value of [name, email, password]) {
    await page.keyboard.press('Tab');
    while ((await page.evaluate(() => document.activeElement?.tagName)) !== 'INPUT') await page.keyboard.press('Tab');
    await page.keyboard.type(value);
  }
  await page.keyboard.press('Enter');
  await expect(page.getByRole('status').filter({ hasText: email })).toBeVisible();
});

test('what is missing is listed on top, tied to its field, and said in words', async ({ page }) => {
  await page.goto('/register');
  await page.getByRole('button', { name: 'Make the account' }).click();
  const list = page.getByRole('alert');
  await expect(list).toContainText('3 things are still needed');
  await list.getByRole('link', { name: /E-mail address/ }).click();
  const field = page.getByLabel('E-mail address');
  await expect(field).toBeFocused();
  await expect(field).toHaveAttribute('aria-invalid', 'true');
  await expect(page.locator(`#${await field.getAttribute('aria-describedby')}`)).toContainText('needed');
});

test('a wrong password is answered in words, and the password can be shown', async ({ page }) => {
  const person = await signedIn(page);
  await page.context().clearCookies();
  await page.goto('/sign-in');
  await page.getByLabel('E-mail address').fill(person.email);
  const password = page.getByLabel('Password', { exact: true });
  await password.fill('not the password');
  await page.getByRole('button', { name: 'Show password' }).click();
  await expect(password).toHaveAttribute('type', 'text');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByRole('alert')).toContainText('E-mail and password do not match');
});

test('a forgotten password is replaced by letter, and the link works once', async ({ page }) => {
  const person = await signedIn(page);
  await page.context().clearCookies();
  await page.goto('/forgot');
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByRole('button', { name: 'Send the letter' }).click();
  await expect(page.getByRole('status').filter({ hasText: person.email })).toBeVisible();
  const link = await linkInLetter(person.email, 'reset');
  await page.goto(link);
  await page.getByLabel('New password').fill('lichen on granite');
  await page.getByRole('button', { name: 'Set the password' }).click();
  await expect(page.getByText('The new password is set.')).toBeVisible();
  await page.goto(link);
  await page.getByLabel('New password').fill('another one of mine');
  await page.getByRole('button', { name: 'Set the password' }).click();
  await expect(page.getByRole('alert')).toContainText('This link is not open');
  await page.goto('/sign-in');
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill('lichen on granite');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByRole('heading', { name: 'Home', level: 1 })).toBeVisible();
});

test('the answer is the same for a known and an unknown address', async ({ page }) => {
  const known = await signedIn(page);
  const answers: string[] = [];
  for (const email of [known.email, 'nobody-at-all@example.org']) {
    await page.goto('/forgot');
    await page.getByLabel('E-mail address').fill(email);
    await page.getByRole('button', { name: 'Send the letter' }).click();
    const said = page.getByRole('status').filter({ hasText: email });
    await expect(said).toBeVisible();
    answers.push(((await said.textContent()) ?? '').replace(email, '…'));
  }
  expect(answers[0]).toBe(answers[1]);
});

test('a person whose session ends while working signs in over the page and loses nothing', async ({ page }) => {
  const person = await signedIn(page);
  await page.goto(await newProject(page));
  await page.getByRole('button', { name: 'Name and note' }).click();
  await page.getByLabel('Name', { exact: true }).fill('Monitors for room 7');
  await page.context().clearCookies();
  await page.getByRole('button', { name: 'Save' }).click();
  const form = page.getByRole('dialog', { name: 'You were signed out' });
  await form.getByLabel('E-mail address').fill(person.email);
  await form.getByLabel('Password', { exact: true }).fill(person.password);
  await form.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByRole('heading', { name: 'Monitors for room 7', level: 1 })).toBeVisible();
});

test('a page of the account asks for the sign-in first and then shows itself', async ({ page }) => {
  const person = await signedIn(page);
  const project = await newProject(page);
  await page.context().clearCookies();
  await page.addInitScript(() => localStorage.removeItem('hummock.signed-in'));
  await page.goto(project);
  await expect(page).toHaveURL(/sign-in/);
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill(person.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page).toHaveURL(new RegExp(`${project}$`));
});

test('every device can be signed out at once', async ({ page, browser }) => {
  const person = await signedIn(page);
  const other = await browser.newContext({ baseURL: process.env.HUMMOCK_E2E_URL ?? '' });
  const elsewhere = await other.newPage();
  await elsewhere.goto('/sign-in');
  await elsewhere.getByLabel('E-mail address').fill(person.email);
  await elsewhere.getByLabel('Password', { exact: true }).fill(person.password);
  await elsewhere.getByRole('button', { name: 'Sign in' }).click();
  await expect(elsewhere.getByRole('heading', { name: 'Home', level: 1 })).toBeVisible();
  await page.goto('/me');
  await expect(page.getByText('this one')).toBeVisible();
  await page.getByRole('button', { name: 'Sign out everywhere' }).click();
  await expect(page).toHaveURL(/sign-in/);
  expect((await elsewhere.request.get('/api/me')).status()).toBe(401);
  await other.close();
});

for (const path of ['/', '/register', '/sign-in', '/forgot', '/reset/a-code-that-nobody-made', '/nowhere']) {
  test(`${path} is accessible in both themes and narrow windows`, async ({ page }) => {
    const complaints = complaintsOf(page);
    await page.goto(path);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await expectGoodScreen(page);
    expect(complaints).toEqual([]);
  });
}

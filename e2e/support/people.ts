import { randomUUID } from 'node:crypto';
import { type Browser, type BrowserContext, expect, type Page } from '@playwright/test';
import { linkMailedTo } from './mail.js';

export interface Person {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/** Somebody whom no other test knows: mail and companies of all tests are in one database. */
export function somebody(name: string): Person {
  const word = name.toLowerCase().replace(/[^a-z]+/g, '.');
  return { name, email: `${word}.${randomUUID().slice(0, 8)}@example.com`, password: 'lanterns at dusk' };
}

/** Signs up with a new company through the form. */
export async function signUp(page: Page, person: Person, companyName: string): Promise<void> {
  await page.goto('/sign-up');
  await page.getByLabel('Company', { exact: true }).fill(companyName);
  await page.getByLabel('Your name').fill(person.name);
  await page.getByLabel('E-mail').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill(person.password);
  await page.getByRole('button', { name: 'Create the company' }).click();
  await expect(page).toHaveURL('/jobs');
}

export async function signIn(page: Page, { email, password }: Person): Promise<void> {
  await page.goto('/sign-in');
  await fillSignIn(page, { email, password });
  await expect(page).not.toHaveURL(/sign-in/);
}

export async function fillSignIn(page: Page, { email, password }: Omit<Person, 'name'>): Promise<void> {
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

/** A new company and its owner, for tests that are about something else: signed in without the form. */
export async function ownerOfNewCompany(page: Page, companyName = 'Test Garden Lights'): Promise<Person> {
  const person = somebody('Robin Owner');
  const answer = await page.request.post('/api/auth/sign-up', {
    data: { companyName, region: 'us', ...person },
  });
  expect(answer.status(), await answer.text()).toBe(201);
  return person;
}

export type Role = 'Owner' | 'Designer' | 'Crew';

/** Invites by the form of an owner who is signed in. Gives the link of the mail. */
export async function invite(page: Page, email: string, role: Role): Promise<string> {
  await page.goto('/company/people');
  const form = page.getByRole('form', { name: 'Invite somebody' });
  await form.getByLabel('E-mail').fill(email);
  await form.getByText(role, { exact: true }).click();
  await form.getByRole('button', { name: 'Send the invitation' }).click();
  await expect(page.getByText(`The invitation to ${email} is on its way.`)).toBeVisible();
  return linkMailedTo(page.request, email, /invites you/);
}

/** Accepts an invitation as somebody new, in a browser of their own. */
export async function join(page: Page, link: string, person: Person): Promise<void> {
  await page.goto(link);
  await page.getByLabel('Your name').fill(person.name);
  await page.getByRole('textbox', { name: 'Choose a password' }).fill(person.password);
  await page.getByRole('button', { name: /^Join / }).click();
  await expect(page).toHaveURL('/jobs');
}

/** Another person's browser: nothing is shared with the first one. */
export function anotherBrowser(browser: Browser): Promise<BrowserContext> {
  return browser.newContext();
}

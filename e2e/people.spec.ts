import { randomUUID } from 'node:crypto';
import { expect, test } from '@playwright/test';
import { yardPhotoFile } from './support/files.js';
import { jobWithSheet } from './support/jobs.js';
import { linkMailedTo } from './support/mail.js';
import {
  anotherBrowser,
  fillSignIn,
  invite,
  join,
  ownerOfNewCompany,
  signIn,
  somebody,
} from './support/people.js';
import { PlanPage } from './support/plan-page.js';

test('crew see jobs and plans, and change neither', async ({ page, browser }) => {
  await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, yardPhotoFile, 'photo');
  const hand = somebody('Casey Crew');
  const link = await invite(page, hand.email, 'Crew');
  const context = await anotherBrowser(browser);
  const theirs = await context.newPage();
  await join(theirs, link, hand);

  await expect(theirs.getByRole('link', { name: 'Mill Lane' })).toBeVisible();
  await expect(theirs.getByRole('link', { name: 'New job' })).toHaveCount(0);
  await theirs.goto('/jobs/new');
  await expect(theirs.getByRole('heading', { name: 'Not part of your role' })).toBeVisible();

  await theirs.goto(`/jobs/${jobId}`);
  await expect(theirs.getByRole('heading', { name: 'Mill Lane', level: 1 })).toBeVisible();
  await expect(theirs.getByLabel(/Add yard photos/)).toHaveCount(0);
  await expect(theirs.getByRole('button', { name: /^More for/ })).toHaveCount(0);
  await expect(theirs.getByRole('link', { name: 'Fill in the site walk' })).toBeVisible();

  await test.step('the plan opens to look at', async () => {
    const plan = new PlanPage(theirs);
    await plan.open(jobId);
    await expect(theirs.getByText('View only')).toBeVisible();
    await expect(theirs.getByRole('toolbar', { name: 'Tools' }).getByRole('button')).toHaveText(['Select']);
    await expect(theirs.getByRole('button', { name: 'Undo' })).toHaveCount(0);
    await theirs.keyboard.press('f');
    await expect(theirs.getByRole('radio')).toHaveCount(0);
  });

  await test.step('until the owner makes them a designer', async () => {
    await page.goto('/company/people');
    await page.getByLabel(`Role of ${hand.name}`).selectOption({ label: 'Designer' });
    await expect(page.getByRole('button', { name: 'Undo' })).toBeVisible();
    await theirs.reload();
    await expect(theirs.getByRole('toolbar', { name: 'Tools' }).getByRole('button')).toHaveCount(12);
  });
  await context.close();
});

test('signing out everywhere ends every other session', async ({ page, browser }) => {
  const owner = await ownerOfNewCompany(page);
  const context = await anotherBrowser(browser);
  const phone = await context.newPage();
  await signIn(phone, owner);
  await expect(phone.getByRole('heading', { name: 'Jobs', level: 1 })).toBeVisible();

  await page.goto('/account');
  await page.getByRole('button', { name: 'Sign out everywhere' }).click();
  await expect(page).toHaveURL(/\/sign-in/);

  await phone.goto('/clients');
  await expect(phone).toHaveURL('/sign-in?to=%2Fclients');
  await test.step('and signing in leads back to where one was', async () => {
    await fillSignIn(phone, owner);
    await expect(phone).toHaveURL('/clients');
  });
  await context.close();
});

test('a forgotten password is replaced through the mail, once', async ({ page }) => {
  const owner = await ownerOfNewCompany(page);
  await page.context().clearCookies();
  await page.goto('/sign-in');
  await page.getByRole('link', { name: 'Forgotten your password?' }).click();
  await page.getByLabel('E-mail').fill(owner.email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await expect(page.getByText(`If ${owner.email} has an account`)).toBeVisible();

  const link = await linkMailedTo(page.request, owner.email, /password/i);
  const chosen = 'a new one for autumn';
  await page.goto(link);
  await expect(page).toHaveURL('/reset-password');
  await page.getByRole('textbox', { name: 'New password' }).fill(chosen);
  await page.getByRole('button', { name: 'Set the password' }).click();
  await expect(page).toHaveURL('/sign-in');
  await fillSignIn(page, owner);
  await expect(page.getByRole('alert')).toBeVisible();
  await page.getByLabel('Password', { exact: true }).fill(chosen);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page).toHaveURL('/jobs');

  await test.step('the link works no second time', async () => {
    await page.context().clearCookies();
    await page.goto(link);
    await page.getByRole('textbox', { name: 'New password' }).fill('yet another for winter');
    await page.getByRole('button', { name: 'Set the password' }).click();
    await expect(page.getByRole('alert')).toContainText(/link/i);
  });
});

test('an address without an account is answered like one with', async ({ page }) => {
  const email = `nobody.${randomUUID().slice(0, 8)}@example.com`;
  await page.goto('/forgot-password');
  await page.getByLabel('E-mail').fill(email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await expect(page.getByText(`If ${email} has an account`)).toBeVisible();
});

test('after ten failed sign-ins even the right password has to wait', async ({ page }) => {
  const owner = await ownerOfNewCompany(page);
  await page.context().clearCookies();
  for (let i = 0; i < 9; i++) {
    const answer = await page.request.post('/api/auth/sign-in', {
      data: { email: owner.email, password: 'not this one' },
    });
    expect(answer.status()).toBe(401);
  }
  await page.goto('/sign-in');
  await fillSignIn(page, { email: owner.email, password: 'nor this one' });
  await expect(page.getByRole('alert')).toBeVisible();
  await expect(page.getByText(/too many failed attempts/)).toHaveCount(0);
  await fillSignIn(page, owner);
  await expect(
    page.getByText(
      /There were too many failed attempts\. Please wait \d+ minutes, or use “Forgotten password”\./,
    ),
  ).toBeVisible();
  await expect(page).toHaveURL('/sign-in');
});

test('links that are wrong, used or taken back say so', async ({ page, browser }) => {
  await page.goto('/invitation');
  await expect(page.getByText('This link is not complete. Open it from the mail again.')).toBeVisible();
  await page.goto(`/invitation#token=${'A'.repeat(43)}`);
  await page.reload();
  await expect(page.getByRole('alert')).toBeVisible();
  await page.goto('/reset-password');
  await expect(page.getByRole('link', { name: 'Ask for a new link' })).toBeVisible();
  await page.goto('/confirm-email');
  await expect(page.getByText('This link is not complete. Open it from the mail again.')).toBeVisible();

  await ownerOfNewCompany(page, 'Copper & Dusk');
  const guest = somebody('Gale Guest');
  const link = await invite(page, guest.email, 'Crew');
  await page.getByRole('button', { name: 'Take back' }).click();
  await expect(page.getByText(`The invitation to ${guest.email} is taken back.`)).toBeVisible();
  const context = await anotherBrowser(browser);
  const theirs = await context.newPage();
  await theirs.goto(link);
  await expect(theirs.getByRole('alert')).toBeVisible();
  await expect(theirs.getByRole('button', { name: /^Join/ })).toHaveCount(0);
  await context.close();
});

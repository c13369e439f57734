import { expect, test } from '@playwright/test';
import { phone } from './playwright.config.js';
import { HomePage } from './support/home-page.js';
import { jobIdOf, newJob } from './support/jobs.js';
import { ownerOfNewCompany, signIn } from './support/people.js';
import { PlanPage } from './support/plan-page.js';
import { sendProposal } from './support/proposals.js';
import { Complaints, look } from './support/screen.js';

/** Every screen on a desk and on a phone; their pictures are in test-results/screens. */
test.describe.configure({ timeout: 240_000 });

const demo = (who: 'owner' | 'designer' | 'crew') => ({
  name: who,
  email: `${who}@fernhollow.example`,
  password: 'fernhollow-demo',
});

test('the pages before the sign-in', async ({ page }) => {
  const complaints = new Complaints(page);
  const token = `#token=${'A'.repeat(43)}`;
  const screens = [
    ['sign-in', '/sign-in'],
    ['sign-up', '/sign-up'],
    ['forgot-password', '/forgot-password'],
    ['reset-password', `/reset-password${token}`],
    ['confirm-email', `/confirm-email${token}`],
    ['invitation-wrong', `/invitation${token}`],
  ] as const;
  for (const [name, path] of screens) {
    await page.goto('about:blank');
    await page.goto(path);
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
    if (name === 'invitation-wrong') await expect(page.getByRole('alert')).toBeVisible();
    await look(page, complaints, name, name === 'invitation-wrong' ? { expected: /status of 4\d\d/ } : {});
  }

  await page.goto('/sign-up');
  await page.getByRole('button', { name: 'Create the company' }).click();
  await expect(page.getByLabel('Company', { exact: true })).toHaveAttribute('aria-invalid', 'true');
  await look(page, complaints, 'sign-up-faults');
});

test('a company that begins', async ({ page }) => {
  const complaints = new Complaints(page);
  await ownerOfNewCompany(page, 'Lantern & Leaf');
  const screens = [
    ['jobs-empty', '/jobs'],
    ['jobs-none-archived', '/jobs?archived=true'],
    ['clients-empty', '/clients'],
    ['company', '/company'],
    ['people', '/company/people'],
    ['account', '/account'],
    ['new-job', '/jobs/new'],
    ['catalogue-new-fixture', '/catalogue/new/fixture'],
    ['catalogue-new-transformer', '/catalogue/new/transformer'],
    ['not-found', '/no-such-page'],
  ] as const;
  for (const [name, path] of screens) {
    await page.goto(path);
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
    await look(page, complaints, name);
  }

  await page.goto('/jobs/5b1c8f4e-9f3e-4a3b-8d57-2f0c8a7b6a10');
  await expect(page.getByRole('alert')).toBeVisible();
  await look(page, complaints, 'job-not-found', { expected: /status of 404/ });
  await page.goto('/jobs/5b1c8f4e-9f3e-4a3b-8d57-2f0c8a7b6a10/plan');
  await expect(page.getByRole('alert')).toBeVisible();
  await look(page, complaints, 'plan-not-found', { expected: /status of 404/ });

  const jobId = await newJob(page, 'Mill Lane');
  await look(page, complaints, 'job-empty');
  await page.goto(`/jobs/${jobId}/plan`);
  await expect(page.getByRole('heading', { name: 'No sheet yet' })).toBeVisible();
  await look(page, complaints, 'plan-no-sheet');
  await page.goto(`/jobs/${jobId}/site-walk`);
  await expect(page.getByRole('button', { name: 'Save the site walk' })).toBeVisible();
  await look(page, complaints, 'site-walk');
});

test('a company at work', async ({ page }) => {
  const complaints = new Complaints(page);
  await signIn(page, demo('designer'));
  const screens = [
    ['jobs', '/jobs'],
    ['jobs-no-match', '/jobs?search=nothing+like+it'],
    ['clients', '/clients'],
    ['catalogue', '/catalogue'],
    ['catalogue-transformers', '/catalogue?category=transformer'],
    ['people-as-designer', '/company/people'],
    ['company-as-designer', '/company'],
  ] as const;
  for (const [name, path] of screens) {
    await page.goto(path);
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
    await look(page, complaints, name);
  }

  await page.goto('/jobs');
  await page.getByRole('button', { name: /^Account of/ }).click();
  await expect(page.getByRole('menuitem', { name: 'Sign out' })).toBeVisible();
  await look(page, complaints, 'account-menu', { menuOpen: true });
  await page.keyboard.press('Escape');

  for (const [name, job] of [
    ['job-photo', /^Harrow Bank/],
    ['job-plot', /^Sandpiper Row/],
    ['job-demo-empty', /^Weir/],
  ] as const) {
    await page.goto('/jobs');
    await page.getByRole('link', { name: job }).click();
    await expect(page.getByRole('heading', { level: 1, name: job })).toBeVisible();
    await look(page, complaints, name);
  }

  await page.goto('/clients');
  await page.getByRole('link', { name: 'Maren Holloway' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Maren Holloway' })).toBeVisible();
  await look(page, complaints, 'client');

  for (const [name, category, item] of [
    ['catalogue-fixture', 'fixture', 'Brass path light, 3 W'],
    ['catalogue-transformer', 'transformer', 'Multi-tap transformer, 300 VA'],
    ['catalogue-cable', 'cable', '12 AWG landscape cable, 2-core'],
  ] as const) {
    await page.goto(`/catalogue?category=${category}`);
    await page.getByRole('link', { name: item, exact: true }).click();
    await expect(page.getByRole('heading', { level: 1, name: item })).toBeVisible();
    await look(page, complaints, name);
  }
});

test('the plans of a company at work', async ({ page }) => {
  const complaints = new Complaints(page);
  await signIn(page, demo('designer'));
  const plan = new PlanPage(page);
  for (const [name, job] of [
    ['plan-plot', /^Sandpiper Row/],
    ['plan-photo', /^Harrow Bank/],
  ] as const) {
    await page.goto('/jobs');
    await page.getByRole('link', { name: job }).click();
    await page.getByRole('link', { name: 'Open the plan' }).click();
    await plan.isOpen();
    await expect(plan.faultsButton).toBeVisible();
    await look(page, complaints, name);
  }

  await test.step('what is chosen', async () => {
    await plan.line(/^T1/).click();
    await look(page, complaints, 'plan-transformer', { sizes: [{ width: 1440, height: 900 }] });
    await plan.line(/^Run 1/).click();
    await look(page, complaints, 'plan-run', { sizes: [{ width: 1440, height: 900 }] });
    await plan.line(/^P\d/).first().click();
    await look(page, complaints, 'plan-fixture', { sizes: [{ width: 1440, height: 900 }] });
  });

  await test.step('panels', async () => {
    await plan.faultsButton.click();
    await look(page, complaints, 'plan-faults');
    await page.getByRole('button', { name: 'History' }).click();
    await expect(page.getByRole('heading', { name: 'History' })).toBeVisible();
    await look(page, complaints, 'plan-history');
    await page.getByRole('button', { name: 'Close: History' }).click();
    await page.getByRole('button', { name: 'As a table' }).click();
    await look(page, complaints, 'plan-profile-table', { sizes: [{ width: 1440, height: 900 }] });
  });

  await test.step('tools', async () => {
    for (const tool of ['Transformer', 'Fixture', 'Cable', 'Hub', 'Area', 'Scale'] as const) {
      await plan.tool(tool);
      await look(page, complaints, `plan-tool-${tool.toLowerCase()}`);
    }
    await plan.tool('Select');
  });

  await test.step('drawers of the phone', async () => {
    await page.setViewportSize(phone);
    const drawers = page.getByRole('region', { name: 'Panels' });
    for (const drawer of ['Ledger', 'Profile'] as const) {
      await drawers.getByRole('button', { name: drawer }).click();
      await look(page, complaints, `plan-drawer-${drawer.toLowerCase()}`, { sizes: [phone] });
      await page.setViewportSize(phone);
      await drawers.getByRole('button', { name: drawer }).click();
    }
  });
});

test('the way from plan to yes', async ({ page }) => {
  test.setTimeout(300_000);
  const complaints = new Complaints(page);
  await signIn(page, demo('owner'));
  await page.getByRole('link', { name: /^Sandpiper Row/ }).click();
  await expect(page.getByRole('heading', { level: 1, name: /^Sandpiper Row/ })).toBeVisible();
  const jobId = jobIdOf(page);
  const shown = async (name: string, path: string) => {
    await page.goto(path);
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
    await look(page, complaints, name);
  };

  await test.step('price', async () => {
    for (const part of ['lines', 'groups', 'terms', 'faults', 'schedule'])
      await shown(`price-${part}`, `/jobs/${jobId}/price?part=${part}`);
    await page.goto(`/jobs/${jobId}/price`);
    await page.getByRole('button', { name: 'Add a line by hand' }).click();
    await expect(page.getByRole('dialog')).toBeVisible();
    await look(page, complaints, 'price-line-by-hand');
  });

  await test.step('what the company sets once', async () => {
    await shown('price-book', '/company/prices');
    await shown('proposal-texts', '/company/proposals');
    await shown('catalogue-import', '/catalogue/import');
  });

  await test.step('proposal', async () => {
    await shown('proposal-in-the-way', `/jobs/${jobId}/proposal`);
    const link = await sendProposal(page.request, jobId);
    await shown('proposal-sent', `/jobs/${jobId}/proposal`);

    const home = new HomePage(page);
    await page.goto(link);
    await home.isOpen();
    await look(page, complaints, 'home-open');
    await home.pressLight('U1');
    await expect(home.card('U1')).toBeVisible();
    await look(page, complaints, 'home-light');
    await home.main.getByRole('button', { name: 'Decline this proposal' }).click();
    await expect(home.main.getByRole('heading', { level: 1, name: /^Decline/ })).toBeVisible();
    await look(page, complaints, 'home-decline');
    await page.goBack();
    await home.main.getByRole('button', { name: 'Review and approve' }).click();
    await expect(home.main.getByRole('heading', { level: 1, name: 'Review and approve' })).toBeVisible();
    await home.main.getByRole('button', { name: /^Approve for/ }).click();
    await expect(home.main.getByText('Please confirm that you approve.')).toBeVisible();
    await look(page, complaints, 'home-review');
    await home.main.getByRole('checkbox', { name: /^I approve/ }).check();
    await home.main.getByRole('checkbox', { name: /^I agree to sign electronically/ }).check();
    await home.main.getByLabel('Your full name, as your signature').fill('Ines Calder');
    await home.main.getByRole('button', { name: /^Approve for/ }).click();
    await expect(home.main.getByRole('heading', { name: 'Thank you, Ines Calder' })).toBeVisible();
    await look(page, complaints, 'home-approved');
    await page.goto(`/p/${'A'.repeat(43)}`);
    await expect(page.getByRole('heading', { name: 'There is no proposal at this address' })).toBeVisible();
    await look(page, complaints, 'home-unknown', { expected: /status of 404/ });
  });

  await test.step('after the yes', async () => {
    await shown('proposal-approved', `/jobs/${jobId}/proposal`);
    await shown('job-approved', `/jobs/${jobId}`);
    await shown('board', '/board');
    await shown('numbers', '/numbers');
  });
});

test('as the crew sees it', async ({ page }) => {
  const complaints = new Complaints(page);
  await signIn(page, demo('crew'));
  await look(page, complaints, 'jobs-as-crew');
  await page.getByRole('link', { name: /^Harrow Bank/ }).click();
  await expect(page.getByRole('link', { name: 'Open the plan' })).toBeVisible();
  await look(page, complaints, 'job-as-crew');
  await page.getByRole('link', { name: 'Open the plan' }).click();
  await new PlanPage(page).isOpen();
  await look(page, complaints, 'plan-as-crew');
  await page.goto('/jobs/new');
  await expect(page.getByRole('heading', { name: 'Not part of your role' })).toBeVisible();
  await look(page, complaints, 'not-for-you');
});

test('by night', async ({ page }) => {
  const complaints = new Complaints(page);
  await page.emulateMedia({ colorScheme: 'dark' });
  await page.goto('/sign-in');
  await look(page, complaints, 'dark-sign-in');
  await signIn(page, demo('designer'));
  await page.goto('/jobs');
  await expect(page.getByRole('link', { name: /^Harrow Bank/ })).toBeVisible();
  await look(page, complaints, 'dark-jobs');
  await page.getByRole('link', { name: /^Harrow Bank/ }).click();
  await expect(page.getByRole('link', { name: 'Open the plan' })).toBeVisible();
  await look(page, complaints, 'dark-job');
  await page.getByRole('link', { name: 'Open the plan' }).click();
  await new PlanPage(page).isOpen();
  await look(page, complaints, 'dark-plan');
});

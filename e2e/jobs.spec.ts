import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { expect, test } from '@playwright/test';
import { plotPlanFile } from './support/files.js';
import { choosePhoto, choosePlotPlan, newJob, sheetIsReady } from './support/jobs.js';
import { ownerOfNewCompany } from './support/people.js';

test('jobs are made, found, filtered and put away', async ({ page }) => {
  await ownerOfNewCompany(page);
  await page.goto('/jobs');
  await page.getByRole('link', { name: 'New job' }).click();
  await page.getByRole('button', { name: 'Create the job' }).click();
  await expect(page.getByLabel('Job', { exact: true })).toHaveAttribute('aria-invalid', 'true');

  await newJob(page, 'Heron House, front', 'Maud Heron');
  await page.getByLabel('Stage').selectOption({ label: '2. Plan' });
  await expect(page.getByText('Heron House, front is in Plan.')).toBeVisible();
  await newJob(page, 'Tern Cottage', 'Ilse Tern');
  await page.goto('/jobs');
  const rows = page
    .getByRole('table', { name: 'Jobs' })
    .getByRole('row')
    .filter({ has: page.getByRole('link') });
  await expect(rows).toHaveCount(2);

  await test.step('by letters of job, client or address', async () => {
    await page.getByLabel('Search jobs, clients, addresses').fill('ilse');
    await expect(rows).toHaveCount(1);
    await expect(rows).toContainText('Tern Cottage');
    await page.getByLabel('Search jobs, clients, addresses').fill('no such thing');
    await expect(page.getByRole('heading', { name: 'No job matches' })).toBeVisible();
    await page.getByRole('button', { name: 'Show all current jobs' }).click();
    await expect(rows).toHaveCount(2);
  });

  await test.step('by stage, and the address of the page keeps it', async () => {
    await page.getByLabel('Stage', { exact: true }).selectOption({ label: 'Plan' });
    await expect(rows).toHaveCount(1);
    await expect(rows).toContainText('Heron House, front');
    await page.reload();
    await expect(rows).toHaveCount(1);
    await page.getByLabel('Stage', { exact: true }).selectOption({ label: 'Every stage' });
    await expect(rows).toHaveCount(2);
  });

  await test.step('archiving can be undone at once', async () => {
    await page.getByRole('link', { name: 'Tern Cottage' }).click();
    await page.getByRole('button', { name: 'More for Tern Cottage' }).click();
    await page.getByRole('menuitem', { name: 'Archive the job' }).click();
    await expect(page.getByText('Tern Cottage is archived.')).toBeVisible();
    await expect(page.getByText(/It can be looked at, not changed\./)).toBeVisible();
    await page.getByRole('region', { name: 'Messages' }).getByRole('button', { name: 'Undo' }).click();
    await expect(page.getByText(/It can be looked at, not changed\./)).toBeHidden();
  });

  await test.step('or later, from among the archived', async () => {
    await page.getByRole('button', { name: 'More for Tern Cottage' }).click();
    await page.getByRole('menuitem', { name: 'Archive the job' }).click();
    await expect(page.getByText(/It can be looked at, not changed\./)).toBeVisible();
    await page.goto('/jobs');
    await expect(rows).toHaveCount(1);
    await page.getByLabel('Which jobs').selectOption({ label: 'Archived jobs' });
    await expect(rows).toContainText(['Tern Cottage']);
    await page.getByRole('link', { name: 'Tern Cottage' }).click();
    await page.getByRole('button', { name: 'Restore' }).click();
    await page.goto('/jobs');
    await expect(rows).toHaveCount(2);
  });
});

test('a file that is no picture is refused in a sentence, and the next one is taken', async ({ page }) => {
  await ownerOfNewCompany(page);
  await newJob(page, 'Mill Lane');
  await choosePhoto(page, {
    name: 'patio.jpg',
    mimeType: 'image/jpeg',
    buffer: Buffer.from('These are only words, whatever the name says.\n'.repeat(50)),
  });
  const refusal = page.getByRole('alert');
  await expect(refusal).toBeVisible();
  await expect(refusal).toContainText(/JPEG|picture|photo|image/i);
  await page.getByRole('button', { name: 'Close' }).click();
  await expect(refusal).toHaveCount(0);
  await choosePlotPlan(page, plotPlanFile);
  await sheetIsReady(page, 'plot-plan');
});

test('of a PDF with several pages one is chosen', async ({ page }) => {
  await ownerOfNewCompany(page);
  await newJob(page, 'Mill Lane');
  await choosePlotPlan(page, { name: 'set.pdf', mimeType: 'application/pdf', buffer: await threePages() });
  await page.getByRole('button', { name: 'Choose the page' }).click();
  const dialog = page.getByRole('dialog', { name: 'Which page is the plot plan?' });
  await expect(dialog.getByRole('button', { name: /^Page \d$/ })).toHaveCount(3);
  await expect
    .poll(() =>
      dialog
        .locator('img')
        .evaluateAll((all) => all.map((img) => (img as HTMLImageElement).naturalWidth > 0)),
    )
    .toEqual([true, true, true]);
  await dialog.getByRole('button', { name: 'Page 2' }).click();
  await expect(dialog).toBeHidden();
  await sheetIsReady(page, 'set');
});

test('what was typed on a site walk is back after a reload', async ({ page }) => {
  await ownerOfNewCompany(page);
  await newJob(page, 'Mill Lane');
  await page.getByRole('link', { name: 'Fill in the site walk' }).click();
  await page.getByLabel(/^Line volts under load/).fill('118.5');
  await page.getByLabel(/^Anything else/).fill('Owl box in the oak: no light there.');
  await page.reload();
  await expect(page.getByText(/What you typed on .* and did not save yet is back\./)).toBeVisible();
  await expect(page.getByLabel(/^Line volts under load/)).toHaveValue('118.5');
  await expect(page.getByLabel(/^Anything else/)).toHaveValue('Owl box in the oak: no light there.');
  await page.getByRole('button', { name: 'Save the site walk' }).click();
  await expect(page.getByText('The site walk is saved.')).toBeVisible();
  await expect(page.getByText('118.5 V')).toBeVisible();
  await page.getByRole('link', { name: 'Edit the site walk' }).click();
  await expect(page.getByLabel(/^Line volts under load/)).toHaveValue('118.5');
  await expect(page.getByText(/did not save yet is back/)).toHaveCount(0);
});

/** The sample plan three times over, as a set of drawings is one file. */
async function threePages(): Promise<Buffer> {
  const folder = await mkdtemp(join(tmpdir(), 'three-pages-'));
  try {
    const out = join(folder, 'set.pdf');
    await promisify(execFile)('pdfunite', [plotPlanFile, plotPlanFile, plotPlanFile, out]);
    return await readFile(out);
  } finally {
    await rm(folder, { recursive: true });
  }
}

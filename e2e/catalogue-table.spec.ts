import { expect, test } from '@playwright/test';
import { ownerOfNewCompany } from './support/people.js';
import { Complaints, look } from './support/screen.js';

test.describe.configure({ timeout: 120_000 });

const list = [
  'Category,Description,Ways,Our cost,List price,SKU,Vendor,Shelf',
  'hub,Ring hub,6,21.40,38.00,RH-6,Oakrow Supply,A3',
  'hub,Deck hub,three,12.00,20.00,DH-3,Oakrow Supply,A4',
  'hub,Pond hub,4,31.00,55.00,PH-4,Oakrow Supply,A5',
  'widget,Wall plug,,1.00,2.00,WP-1,Oakrow Supply,C1',
  'hub,"Buried junction hub, 4-way",,19.90,36.00,BH-4,Oakrow Supply,A1',
].join('\n');
const file = { name: 'oakrow-spring.csv', mimeType: 'text/csv', buffer: Buffer.from(list) };

test('a supplier’s list is looked through, taken in but for a row, and taken back', async ({ page }) => {
  const complaints = new Complaints(page);
  await ownerOfNewCompany(page);
  await page.goto('/catalogue');
  await page.getByRole('button', { name: 'More for the catalogue' }).click();
  await page.getByRole('menuitem', { name: /^Take in a table/ }).click();
  await expect(page.getByRole('heading', { name: 'Take in a table', level: 1 })).toBeVisible();
  await look(page, complaints, 'catalogue-import');
  const input = page.getByLabel('Table of items');

  await test.step('a file that is no table is refused in words', async () => {
    await input.setInputFiles({ ...file, name: 'torn.csv', buffer: Buffer.from('Name\n"never closed\n') });
    await expect(page.getByRole('alert')).toContainText(
      'A quotation mark in line 2 of the file is not closed.',
    );
    await look(page, complaints, 'catalogue-import-refused', { expected: /status of 400/ });
  });

  const rows = page.getByRole('table', { name: 'Rows of the table' });
  const row = (name: string) => rows.getByRole('row').filter({ hasText: name });
  const columns = page.getByRole('table', { name: 'Columns of the table' });

  await test.step('columns are known by their heads, and faults told by row', async () => {
    await input.setInputFiles(file);
    await expect(page.getByText('oakrow-spring.csv, 5 rows below the heads')).toBeFocused();
    await expect(columns.getByLabel('What Description holds')).toHaveValue('name');
    await expect(columns.getByLabel('What Shelf holds')).toHaveValue('');
    await expect(row('Deck hub')).toContainText('Ways: “three” is no number.');
    await expect(row('Wall plug')).toContainText('“widget” is none of');
    await expect(row('Ring hub')).toContainText('New');
    await expect(row('Buried junction hub')).toContainText('Cost: nothing');
    await expect(rows.getByRole('checkbox')).toHaveCount(3);
    await expect(page.getByText('2 rows can’t be taken and will be left out.')).toBeVisible();
    await look(page, complaints, 'catalogue-import-rows');
  });

  await test.step('rows are left out one after another without asking each time', async () => {
    let asked = 0;
    page.on('request', (request) => {
      if (request.url().endsWith('/imports/preview')) asked += 1;
    });
    const pond = rows.getByRole('checkbox', { name: 'Take row 3, Pond hub' });
    for (const taken of [false, true, false]) await pond.setChecked(taken);
    await expect(row('Pond hub')).toContainText('Left out');
    await expect(page.getByRole('button', { name: 'Take in 2 items' })).toBeEnabled();
    expect(asked).toBe(1);
    await page.getByRole('button', { name: /^New 1/ }).click();
    await expect(row('Buried junction hub')).toHaveCount(0);
    // It stays where it was unticked, to be ticked again.
    await expect(pond).not.toBeChecked();
    await page.getByRole('button', { name: /^All 5/ }).click();
  });

  await page.getByRole('button', { name: 'Take in 2 items' }).click();
  await expect(page.getByText('1 new and 1 changed items are in the catalogue.')).toBeVisible();

  await test.step('its item is in the catalogue, with a price that names the file', async () => {
    await page.goto('/catalogue?category=hub');
    await expect(page.getByRole('link', { name: 'Pond hub' })).toHaveCount(0);
    await page.getByRole('link', { name: 'Ring hub', exact: true }).click();
    const history = page.getByRole('table', { name: 'Prices so far' });
    await expect(history.getByRole('row').nth(1)).toContainText('$21.40');
    await expect(history.getByRole('row').nth(1)).toContainText('from oakrow-spring.csv');
  });

  await test.step('taken back, the catalogue is as it was', async () => {
    await page.goto('/catalogue/import');
    const past = page.getByRole('table', { name: 'Earlier imports' });
    await expect(past.getByRole('row').nth(1)).toContainText('1 new, 1 changed, 2 rows not taken');
    await look(page, complaints, 'catalogue-import-earlier');
    await past.getByRole('button', { name: 'Take back oakrow-spring.csv' }).click();
    await expect(page.getByText('oakrow-spring.csv is taken back.')).toBeVisible();
    await expect(past.getByRole('row').nth(1)).toContainText('Taken back');
    await page.goto('/catalogue?category=hub');
    await expect(page.getByRole('link', { name: 'Buried junction hub, 4-way', exact: true })).toBeVisible();
    await expect(page.getByRole('link', { name: 'Ring hub' })).toHaveCount(0);
    await page.getByRole('link', { name: 'Buried junction hub, 4-way', exact: true }).click();
    await expect(page.getByRole('heading', { name: 'Price', level: 2 })).toBeVisible();
    await expect(page.getByText('from oakrow-spring.csv')).toHaveCount(0);
  });
});

test('the catalogue is saved as a table that is taken in again without a change', async ({ page }) => {
  await ownerOfNewCompany(page);
  for (const format of ['CSV', 'XLSX']) {
    await page.goto('/catalogue');
    const saving = page.waitForEvent('download');
    await page.getByRole('button', { name: 'More for the catalogue' }).click();
    await page.getByRole('menuitem', { name: `Save as ${format}` }).click();
    const saved = await saving;
    expect(saved.suggestedFilename()).toBe(`catalogue.${format.toLowerCase()}`);
    await page.goto('/catalogue/import');
    const path = await saved.path();
    await page.getByLabel('Table of items').setInputFiles(path);
    await expect(page.getByText(/rows below the heads/)).toBeVisible({ timeout: 30_000 });
    await expect(page.getByRole('table', { name: 'Rows of the table' })).toBeVisible();
    await expect(page.getByRole('button', { name: 'Nothing to take in' })).toBeDisabled();
    const shown = page.getByRole('group', { name: 'Which rows to show' }).getByRole('button');
    await expect(shown).toHaveText([/^All \d+$/, /^As they are \d+$/]);
  }
});

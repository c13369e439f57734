import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import { expect, type Page } from '@playwright/test';

/** A new job through the form. Gives its id. */
export async function newJob(page: Page, name: string, clientName = 'Ann Client'): Promise<string> {
  await page.goto('/jobs/new');
  await page.getByLabel('Job', { exact: true }).fill(name);
  await page.getByLabel('Name', { exact: true }).fill(clientName);
  await page.getByLabel('Address', { exact: true }).fill('4 Mill Lane, Marlow Bend');
  await page.getByRole('button', { name: 'Create the job' }).click();
  await expect(page.getByRole('heading', { name, level: 1 })).toBeVisible();
  return jobIdOf(page);
}

export function jobIdOf(page: Page): string {
  const id = /\/jobs\/([^/?]+)/.exec(page.url())?.[1];
  if (id === undefined || id === 'new') throw new Error(`There is no job in ${page.url()}.`);
  return id;
}

/** Chooses files in the job page's zone for yard photos. */
export async function choosePhoto(page: Page, file: string | FilePayload): Promise<void> {
  await page.getByLabel(/Add yard photos/).setInputFiles(file);
}

/** Chooses files in the job page's zone for plot plans. */
export async function choosePlotPlan(page: Page, file: string | FilePayload): Promise<void> {
  await page.getByLabel(/Add a plot plan/).setInputFiles(file);
}

export interface FilePayload {
  readonly name: string;
  readonly mimeType: string;
  readonly buffer: Buffer;
}

/** Waits until the server has made a sheet ready: its picture leads to the plan then. */
export async function sheetIsReady(page: Page, name: string): Promise<void> {
  await expect(page.getByRole('link', { name: `Open ${name} in the plan` })).toBeVisible({ timeout: 30_000 });
}

/** A job with one sheet for tests that are about its plan: made without the forms. Gives the job's id. */
export async function jobWithSheet(page: Page, file: string, view: 'photo' | 'plan'): Promise<string> {
  const { request } = page;
  const made = await request.post('/api/jobs', {
    data: {
      name: 'Mill Lane',
      client: { name: 'Ann Client' },
      property: { name: '4 Mill Lane', address: '4 Mill Lane, Marlow Bend' },
    },
  });
  expect(made.status(), await made.text()).toBe(201);
  const { id } = (await made.json()) as { id: string };
  const sent = await request.post(`/api/jobs/${id}/sheets`, {
    multipart: {
      view,
      name: view === 'photo' ? 'Yard photo' : 'Plot plan',
      file: {
        name: basename(file),
        mimeType: view === 'photo' ? 'image/jpeg' : 'application/pdf',
        buffer: await readFile(file),
      },
    },
  });
  expect(sent.ok(), await sent.text()).toBe(true);
  await expect
    .poll(
      async () => {
        const answer = await request.get(`/api/jobs/${id}/sheets`);
        const { items } = (await answer.json()) as { items: { status: string }[] };
        return items[0]?.status;
      },
      { message: 'the sheet to be made ready', timeout: 30_000 },
    )
    .toBe('ready');
  return id;
}

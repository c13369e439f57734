import { expect, type Page, test } from '@playwright/test';
import { plotPlanFile } from './support/files.js';
import { jobWithSheet } from './support/jobs.js';
import { anotherBrowser, ownerOfNewCompany, type Person, signIn } from './support/people.js';
import { PlanPage, type Point } from './support/plan-page.js';

/** Open ground of the plot plan, and apart from one another. */
const spots: readonly Point[] = [1, 2, 3, 4].map((i) => ({ x: 300 + 400 * i, y: 2900 }));

const saveNote = (page: Page) => page.getByRole('banner');

async function placeFixtures(plan: PlanPage, places: readonly Point[]): Promise<void> {
  await plan.tool('Fixture');
  for (const place of places) await plan.click(place);
  await plan.tool('Select');
}

/** What the server has, as somebody sees it who opens the plan in a browser that has never had it. */
async function fixturesElsewhere(page: Page, owner: Person, jobId: string): Promise<Point[]> {
  const context = await anotherBrowser(page.context().browser()!);
  const elsewhere = await context.newPage();
  await signIn(elsewhere, owner);
  const plan = new PlanPage(elsewhere);
  await plan.open(jobId);
  const places = await plan.places('fixture');
  await context.close();
  return places;
}

const byPlace = (places: readonly Point[]): Point[] => [...places].sort((a, b) => a.x - b.x);

test('edits made offline arrive, each once, after the tab was closed', async ({ page, context }) => {
  const owner = await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const plan = new PlanPage(page);
  await plan.open(jobId);

  await context.setOffline(true);
  await placeFixtures(plan, spots.slice(0, 3));
  await expect(saveNote(page)).toContainText('Offline, 3 unsent');
  const drawn = byPlace(await plan.places('fixture'));
  expect(drawn).toHaveLength(3);
  await page.close();
  await context.setOffline(false);

  const later = new PlanPage(await context.newPage());
  await later.open(jobId);
  expect(byPlace(await later.places('fixture'))).toEqual(drawn);
  await later.saved();
  expect(byPlace(await fixturesElsewhere(later.page, owner, jobId))).toEqual(drawn);
});

test('while the server takes nothing, a reload keeps what is unsent', async ({ page, context }) => {
  const owner = await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const plan = new PlanPage(page);
  await plan.open(jobId);
  const deaf = '**/api/**/plan/changes';
  await context.route(deaf, (route) => route.abort('connectionrefused'));

  await placeFixtures(plan, spots.slice(0, 2));
  await expect(saveNote(page)).toContainText('Offline, 2 unsent');
  const drawn = byPlace(await plan.places('fixture'));
  await page.reload();
  await plan.isOpen();
  await expect(saveNote(page)).toContainText('Offline, 2 unsent');
  expect(byPlace(await plan.places('fixture'))).toEqual(drawn);

  await context.unroute(deaf);
  await plan.saved();
  await placeFixtures(plan, spots.slice(2, 3));
  await plan.saved();
  const places = await fixturesElsewhere(page, owner, jobId);
  expect(places).toHaveLength(3);
  expect(byPlace(places).slice(0, 2)).toEqual(drawn);
});

test('an edit is kept even if the tab dies in the midst of saving it', async ({ page, context }) => {
  const owner = await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const plan = new PlanPage(page);
  await plan.open(jobId);
  // The server has the change but its answer never comes: the tab dies not knowing.
  let reached = false;
  await context.route('**/api/**/plan/changes', async (route) => {
    await route.fetch();
    reached = true;
  });
  await placeFixtures(plan, spots.slice(0, 1));
  const drawn = await plan.places('fixture');
  await expect.poll(() => reached).toBe(true);
  await page.close();
  await context.unrouteAll({ behavior: 'ignoreErrors' });

  const later = new PlanPage(await context.newPage());
  await later.open(jobId);
  await later.saved();
  expect(await later.places('fixture')).toEqual(drawn);
  expect(await fixturesElsewhere(later.page, owner, jobId)).toEqual(drawn);
});

test('two people on different things see each other’s work as it is done', async ({ page, browser }) => {
  const owner = await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const mine = new PlanPage(page);
  await mine.open(jobId);
  const context = await anotherBrowser(browser);
  const other = await context.newPage();
  await signIn(other, owner);
  const theirs = new PlanPage(other);
  await theirs.open(jobId);

  await placeFixtures(mine, spots.slice(0, 2));
  await expect.poll(() => theirs.ofKind('fixture')).toHaveLength(2);
  const [first, second] = await mine.places('fixture');
  await mine.click(first!);
  await theirs.click(second!);
  await mine.fill('Name', 'By the gate');
  await theirs.fill('Name', 'By the pond');
  for (const plan of [mine, theirs]) {
    await expect(plan.line(/By the gate/)).toBeVisible();
    await expect(plan.line(/By the pond/)).toBeVisible();
    await plan.saved();
  }
  await context.close();
});

test('of two edits to the same thing the later person sees both and chooses', async ({ page, browser }) => {
  const owner = await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const mine = new PlanPage(page);
  await mine.open(jobId);
  await placeFixtures(mine, spots.slice(0, 2));
  await mine.saved();
  const [first, second] = await mine.places('fixture');
  const context = await anotherBrowser(browser);
  const other = await context.newPage();
  await signIn(other, owner);
  const theirs = new PlanPage(other);
  await theirs.open(jobId);

  await page.context().setOffline(true);
  await mine.click(first!);
  await mine.fill('Name', 'Mine by the gate');
  await mine.click(second!);
  await mine.fill('Name', 'Untouched by others');
  await theirs.click(first!);
  await theirs.fill('Name', 'Theirs by the gate');
  await theirs.saved();
  await page.context().setOffline(false);

  const choose = page.getByRole('button', { name: 'Needs your choice' });
  await choose.click();
  await expect(page.getByRole('heading', { name: 'Changed by two people' })).toBeVisible();
  await expect(page.getByText('name “Mine by the gate”')).toBeVisible();
  await expect(page.getByText('name “Theirs by the gate”')).toBeVisible();
  await page.getByRole('button', { name: 'Keep mine' }).click();
  await mine.saved();
  await expect(theirs.line(/Mine by the gate/)).toBeVisible();
  await expect(theirs.line(/Untouched by others/)).toBeVisible();
  await context.close();
});

test('undo and redo go step by step, and a reload keeps where they got to', async ({ page }) => {
  await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const plan = new PlanPage(page);
  await plan.open(jobId);
  await placeFixtures(plan, spots.slice(0, 3));
  const all = await plan.places('fixture');
  await page.keyboard.press('Control+z');
  await expect.poll(() => plan.ofKind('fixture')).toHaveLength(2);
  await plan.undo();
  await expect.poll(() => plan.ofKind('fixture')).toHaveLength(1);
  await page.keyboard.press('Control+Shift+z');
  await expect.poll(() => plan.places('fixture')).toEqual(all.slice(0, 2));
  await plan.saved();

  await page.reload();
  await plan.isOpen();
  expect(await plan.places('fixture')).toEqual(all.slice(0, 2));
  await expect(page.getByRole('button', { name: 'Undo' })).toBeDisabled();

  await test.step('the history leads back as well, and makes a new version', async () => {
    await page.getByRole('button', { name: 'History' }).click();
    const versions = page.getByRole('region', { name: 'History' }).getByRole('listitem');
    await expect(versions.first()).toBeVisible();
    const before = await versions.count();
    await versions
      .nth(1)
      .getByRole('button', { name: /^Restore/ })
      .click();
    await expect.poll(() => plan.ofKind('fixture')).toHaveLength(1);
    await expect(versions).toHaveCount(before + 1);
  });
});

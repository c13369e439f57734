import { expect, type Page, test } from '@playwright/test';
import { phone } from './playwright.config.js';
import { plotPlanFile } from './support/files.js';
import { Fingers } from './support/fingers.js';
import { jobWithSheet } from './support/jobs.js';
import { ownerOfNewCompany } from './support/people.js';
import { zoomOf } from './support/plan-handle.js';
import { PlanPage, type Point } from './support/plan-page.js';
import { bareSpot } from './support/plan-view.js';
import { pool } from './support/plot.js';

/** Feet on the plot plan, from a corner of open ground. */
const PIXELS_PER_FOOT = 20;
const feet = (x: number, y: number): Point => ({
  x: 300 + x * PIXELS_PER_FOOT,
  y: 2400 + y * PIXELS_PER_FOOT,
});

async function openScaledPlot(page: Page): Promise<PlanPage> {
  await ownerOfNewCompany(page);
  const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
  const plan = new PlanPage(page);
  await plan.open(jobId);
  await plan.tool('Scale');
  await page.getByLabel('Drawing scale').fill('1 in = 10 ft');
  await page.getByLabel('Drawing scale').press('Enter');
  await expect(page.getByText('No scale yet.')).toBeHidden();
  await plan.tool('Select');
  return plan;
}

/** A transformer, and fixtures in a chain from it. */
async function drawRun(plan: PlanPage, from: Point, fixtures: readonly Point[]): Promise<void> {
  await plan.tool('Transformer');
  await plan.pick('Multi-tap transformer, 300 VA');
  await plan.click(from);
  await plan.tool('Fixture');
  await plan.pick('Brass path light, 3 W');
  for (const place of fixtures) await plan.click(place);
  await plan.drawCable([from, ...fixtures]);
}

/** "12′ 6″" in feet. */
function feetIn(text: string | null): number {
  const [, whole, inches] = /(\d+)′ (\d+)/.exec(text ?? '') ?? [];
  if (whole === undefined) throw new Error(`There is no length in “${text}”.`);
  return Number(whole) + Number(inches) / 12;
}

test('choosing and moving: cable follows, and each drag is one step', async ({ page }) => {
  const plan = await openScaledPlot(page);
  const places = [feet(20, 10), feet(40, 10), feet(60, 10)];
  await drawRun(plan, feet(0, 10), places);
  await plan.tool('Select');
  const ids = (await plan.ofKind('fixture')).sort((a, b) => a.number! - b.number!).map((f) => f.id);

  await plan.click(places[0]!);
  expect(await plan.selection()).toEqual([ids[0]]);
  await plan.click(places[1]!, { shift: true });
  expect(new Set(await plan.selection())).toEqual(new Set(ids.slice(0, 2)));
  await plan.drag(feet(30, 0), feet(70, 20));
  expect(await plan.selection()).toEqual(expect.arrayContaining(ids.slice(1)));
  expect(await plan.selection()).not.toContain(ids[0]);

  const run = plan.line(/^Run 1/);
  const before = feetIn(await run.textContent());
  const drawn = await plan.places('fixture');
  await plan.drag(places[2]!, feet(60, 30));
  await expect.poll(async () => feetIn(await run.textContent())).toBeGreaterThan(before + 1);
  const moved = await plan.places('fixture');
  expect(moved[0]).toEqual(drawn[0]);
  for (const i of [1, 2]) expect(moved[i]!.y - drawn[i]!.y).toBeCloseTo(20 * PIXELS_PER_FOOT, -1);
  await plan.undo();
  await expect.poll(() => plan.places('fixture')).toEqual(drawn);
  await expect.poll(async () => feetIn(await run.textContent())).toBe(before);
});

test('a hub shares out to its leads', async ({ page }) => {
  const plan = await openScaledPlot(page);
  const lamps = [feet(40, 0), feet(50, 10), feet(40, 20)];
  await drawRun(plan, feet(0, 10), []);
  await plan.tool('Fixture');
  for (const place of lamps) await plan.click(place);
  await plan.tool('Hub');
  await plan.click(feet(30, 10));
  await plan.drawCable([feet(0, 10), feet(30, 10)]);
  for (const place of lamps) await plan.drawCable([feet(30, 10), place]);
  await expect(plan.line(/^H1/)).toBeVisible();
  await expect(plan.line(/not wired yet$/)).toHaveCount(0);
  const volts = Object.values(await plan.volts());
  expect(volts).toHaveLength(3);
  for (const v of volts) expect(v).toBeGreaterThan(10.5);
});

test('ground means something: a lamp near water, cable through a building', async ({ page }) => {
  const plan = await openScaledPlot(page);
  const lamp = { x: pool.nearLeft.x - 5 * PIXELS_PER_FOOT, y: 940 };
  await drawRun(plan, feet(0, 10), [feet(20, 10)]);
  await plan.tool('Fixture');
  await plan.click(lamp);

  await plan.tool('Area');
  for (const corner of Object.values(pool)) await plan.clickClose(corner);
  await page.keyboard.press('Enter');
  const ask = page.getByRole('form', { name: 'New area' });
  await ask.getByRole('combobox', { name: 'Is' }).selectOption({ label: 'Water' });
  await ask.getByLabel('Name').fill('Pool');
  await ask.getByRole('button', { name: 'Add area' }).click();
  await expect(plan.inspector).toContainText('308 ft²');
  await expect(plan.inspector).toContainText('22′ 0″');

  await plan.fit();
  await plan.tool('Area');
  for (const corner of [feet(8, 0), feet(14, 0), feet(14, 20), feet(8, 20)])
    await plan.clickClose(corner, 0.5);
  await page.keyboard.press('Enter');
  await ask.getByRole('combobox', { name: 'Is' }).selectOption({ label: 'Building' });
  await ask.getByLabel('Name').fill('Shed');
  await ask.getByRole('button', { name: 'Add area' }).click();

  await plan.fit();
  await plan.tool('Area');
  for (const corner of [feet(2, 4), feet(6, 4), feet(6, 16), feet(2, 16)]) await plan.clickClose(corner, 0.5);
  await page.keyboard.press('Enter');
  await ask.getByRole('combobox', { name: 'Is' }).selectOption({ label: 'Paved' });
  await ask.getByLabel('Name').fill('Walk');
  await ask.getByRole('button', { name: 'Add area' }).click();
  await plan.tool('Select');
  await plan.click(feet(4, 10));
  // Four feet of paving, to the click.
  await expect(plan.inspector).toContainText(/(3′ 1[01]″|4′ [01]″) of it runs under paving: conduit/);

  await plan.faultsButton.click();
  const near = page.getByRole('button', { name: /from Pool; keep 10′ 0″/ });
  await expect(near).toBeVisible();
  expect(feetIn(await near.textContent())).toBeCloseTo(5, 0);
  await expect(page.getByRole('button', { name: /runs through Shed; lead it around/ })).toBeVisible();
});

test('a loop is drawn only marked to marked', async ({ page }) => {
  const plan = await openScaledPlot(page);
  const lamps = [feet(20, 0), feet(40, 10), feet(20, 20)];
  await drawRun(plan, feet(0, 10), lamps);
  const cables = (await plan.ofKind('cable')).length;
  await plan.drawCable([lamps[2]!, feet(0, 10)]);
  const ask = page.getByRole('alertdialog', { name: 'Marked to marked' });
  await expect(ask).toContainText('or the tap is shorted');
  await expect(ask.getByRole('button', { name: 'Draw it' })).toBeDisabled();
  expect(await plan.ofKind('cable')).toHaveLength(cables);
  await ask.getByRole('checkbox').check();
  await ask.getByRole('button', { name: 'Draw it' }).click();
  await expect(ask).toBeHidden();
  const drawn = await plan.ofKind('cable');
  expect(drawn).toHaveLength(cables + 1);
  expect(drawn.filter((cable) => cable.markedToMarked)).toHaveLength(1);
  expect(Object.values(await plan.volts())).toHaveLength(3);
});

test('runs of two transformers are not joined, and the plan says why', async ({ page }) => {
  const plan = await openScaledPlot(page);
  await drawRun(plan, feet(0, 0), [feet(20, 0)]);
  await drawRun(plan, feet(0, 25), [feet(20, 25)]);
  const cables = (await plan.ofKind('cable')).length;
  await plan.drawCable([feet(20, 0), feet(20, 25)]);
  await expect(page.getByText('Runs of different transformers are never joined')).toBeVisible();
  expect(await plan.ofKind('cable')).toHaveLength(cables);
});

test('a length measured on site takes the place of the drawn one', async ({ page }) => {
  const plan = await openScaledPlot(page);
  await drawRun(plan, feet(0, 10), [feet(40, 10)]);
  await plan.tool('Select');
  await plan.click(feet(20, 10));
  const before = Object.values(await plan.volts())[0]!;
  await expect(plan.inspector).toContainText('drawn');
  await plan.fill('Measured', 'quite a way');
  await expect(plan.inspector.getByRole('alert')).toContainText('12');
  await plan.fill('Measured', "120'");
  await expect(plan.inspector).toContainText('120′ 0″ measured');
  // 120 ft, 3 ft of slack at the transformer and 2 at the fixture.
  await expect(plan.line(/^Run 1/)).toContainText('125′ 0″');
  await expect.poll(async () => Object.values(await plan.volts())[0]).toBeLessThan(before);
  await plan.fill('Measured', '');
  await expect(plan.line(/^Run 1/)).toContainText('45′');
});

test('a fixture is placed and wired without a pointer', async ({ page }) => {
  const plan = await openScaledPlot(page);
  const { keyboard } = page;
  /** Tab goes on until it is there, as somebody without a mouse would. */
  const tabTo = async (name: RegExp) => {
    for (let i = 0; i < 60; i++) {
      await keyboard.press('Tab');
      const reached = await page.evaluate(() => {
        const at = document.activeElement;
        const labelled =
          at instanceof HTMLSelectElement || at instanceof HTMLInputElement ? at.labels?.[0] : null;
        return labelled?.textContent ?? at?.getAttribute('aria-label') ?? at?.textContent ?? '';
      });
      if (name.test(reached)) return;
    }
    throw new Error(`Tab never came to ${name}.`);
  };
  await keyboard.press('t');
  await tabTo(/^Place in the middle/);
  await keyboard.press('Enter');
  await expect.poll(() => plan.ofKind('transformer')).toHaveLength(1);
  for (let i = 0; i < 6; i++) await keyboard.press('Alt+Shift+ArrowLeft');
  await keyboard.press('f');
  await tabTo(/^Place in the middle/);
  await keyboard.press('Enter');
  await expect.poll(() => plan.ofKind('fixture')).toHaveLength(1);
  await keyboard.press('Escape');

  await test.step('the ledger chooses it, the inspector wires it', async () => {
    await tabTo(/not wired yet$|^T1/);
    await keyboard.press('End');
    // Under it stand the times of the plan, with a head of their own.
    await keyboard.press('ArrowUp');
    await keyboard.press('ArrowUp');
    await keyboard.press('Enter');
    expect(await plan.selection()).toEqual([(await plan.ofKind('fixture'))[0]!.id]);
    await tabTo(/^Other end/);
    await keyboard.press('T');
    await tabTo(/^Wire$/);
    await keyboard.press('Enter');
    await expect(plan.line(/^Run 1/)).toBeVisible();
    await expect(plan.line(/not wired yet$/)).toHaveCount(0);
  });
});

test.describe('on a phone', () => {
  test.use({ viewport: phone, hasTouch: true });

  test('two fingers zoom and never draw; one tap does', async ({ page }) => {
    await ownerOfNewCompany(page);
    const jobId = await jobWithSheet(page, plotPlanFile, 'plan');
    const plan = new PlanPage(page);
    await plan.open(jobId);
    await page.getByRole('toolbar', { name: 'Tools' }).getByRole('button', { name: 'Area' }).tap();
    const middle = await bareSpot(page);
    const fingers = await Fingers.of(page);
    const zoom = await zoomOf(page);
    const apart = (by: number): Point[] => [
      { x: middle.x - by, y: middle.y },
      { x: middle.x + by, y: middle.y },
    ];
    await fingers.put(apart(25)[0]!);
    await fingers.put(...apart(25));
    for (const by of [35, 50, 75]) await fingers.move(...apart(by));
    await fingers.lift();
    await expect.poll(() => zoomOf(page)).toBeGreaterThan(zoom * 2);
    await expect(page.getByRole('form', { name: 'New area' })).toHaveCount(0);
    expect(await plan.ofKind('area')).toHaveLength(0);

    await page.getByRole('toolbar', { name: 'Tools' }).getByRole('button', { name: 'Hub' }).tap();
    const spot = await bareSpot(page);
    await page.touchscreen.tap(spot.x, spot.y);
    await expect.poll(() => plan.ofKind('junction')).toHaveLength(1);
  });
});

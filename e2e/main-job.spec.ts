import { expect, test } from '@playwright/test';
import { type Branch, type Gauge, voltsByHand } from './support/by-hand.js';
import { yardPhotoFile } from './support/files.js';
import { choosePhoto, newJob, sheetIsReady } from './support/jobs.js';
import { anotherBrowser, invite, join, signUp, somebody } from './support/people.js';
import { dimBlue, pixelsOf } from './support/pixels.js';
import { windowPointOf } from './support/plan-handle.js';
import { CLOSE, PlanPage } from './support/plan-page.js';
import { patio, pixelOf, pond, supplyBox } from './support/yard.js';

/** Eight lamps in a row over the lawn, and the way of the home run down beside the patio to their middle. */
const row = [0, 1, 2, 3, 4, 5, 6, 7].map((i) => ({ x: -3 + i * 0.8, y: 5 }));
const bend = { x: 2.75, y: 7.6 };
const tee = { x: -0.2, y: 5 };

const FIXTURE_SLACK = 0.6096;
const TRANSFORMER_SLACK = 0.9144;
const JUNCTION_SLACK = 0.3048;

const distance = (a: { x: number; y: number }, b: { x: number; y: number }): number =>
  Math.hypot(a.x - b.x, a.y - b.y);

/** The run as it lies on the modelled ground; nothing of it is read from the product. */
function runByHand(homeRun: Gauge): Branch {
  const arm = (order: readonly number[], first: number): Branch[] => {
    let branch: Branch[] = [];
    for (let k = order.length - 1; k >= 0; k--) {
      const meters = k === 0 ? first : 0.8 + 2 * FIXTURE_SLACK;
      branch = [{ awg: 12, meters, fixture: `U${order[k]}`, beyond: branch }];
    }
    return branch;
  };
  const toTee = 0.4 + FIXTURE_SLACK + JUNCTION_SLACK;
  const length = distance(supplyBox.ground, bend) + distance(bend, tee) + TRANSFORMER_SLACK + JUNCTION_SLACK;
  return { awg: homeRun, meters: length, beyond: [...arm([4, 3, 2, 1], toTee), ...arm([5, 6, 7, 8], toTee)] };
}

const supply = { tapVolts: 12, ratedVA: 600, regulationPercent: 3 };
const lamp = { watts: 20, ratedVolts: 12, lead: { awg: 18, meters: 0.9 } } as const;

test('from a yard photo to eight lamps in their window', async ({ page, browser }) => {
  test.setTimeout(150_000);
  const owner = somebody('Olive Owner');
  const designer = somebody('Dana Designer');

  const theirs = await test.step('sign up, invite a designer by mail', async () => {
    await signUp(page, owner, 'Tallow Lane Lighting');
    await expect(page.getByRole('heading', { name: 'No jobs yet' })).toBeVisible();
    const link = await invite(page, designer.email, 'Designer');
    const context = await anotherBrowser(browser);
    const designers = await context.newPage();
    await join(designers, link, designer);
    await expect(designers.getByText('You have joined Tallow Lane Lighting.')).toBeVisible();
    return designers;
  });
  await page.close();

  await test.step('a job with the yard photo', async () => {
    await newJob(theirs, 'Harrow garden');
    await choosePhoto(theirs, yardPhotoFile);
    await sheetIsReady(theirs, 'yard-photo');
    await theirs.getByRole('link', { name: 'Open yard-photo in the plan' }).click();
  });
  const plan = new PlanPage(theirs);
  await plan.isOpen();

  await test.step('scale from the patio and the pond', async () => {
    await plan.tool('Scale');
    for (const known of [patio, pond]) {
      for (const { pixel } of known.corners) await plan.clickClose(pixel);
      await theirs.getByLabel('First to second corner').fill(`${known.widthMeters} m`);
      await theirs.getByLabel('Second to third corner').fill(`${known.depthMeters} m`);
      await theirs.getByRole('button', { name: 'Use it' }).click();
    }
    await expect(theirs.getByText('The references agree as well as clicks can.')).toBeVisible();
  });

  await test.step('transformer at the supply box', async () => {
    await plan.tool('Transformer');
    await plan.pick('Multi-tap transformer, 600 VA');
    await plan.clickClose(supplyBox.pixel);
    await expect(plan.line(/^T1/)).toBeVisible();
  });

  await test.step('eight halogen fixtures', async () => {
    await plan.tool('Fixture');
    await plan.pick('Bullet up-light, GU5.3 lamp');
    await theirs.getByLabel('Lamp', { exact: true }).selectOption({ label: 'Halogen lamp GU5.3, 20 W, 36°' });
    await plan.lookAt(pixelOf(tee), 1);
    for (const place of row) await plan.click(pixelOf(place));
    await expect(plan.line(/not wired yet$/)).toHaveCount(8);
  });

  const fixtures = await plan.ofKind('fixture');
  const idOf = (tag: string): string => fixtures.find((f) => `U${f.number}` === tag)!.id;

  await test.step('a chain, and the home run to its middle', async () => {
    await plan.tool('Cable');
    await plan.chooseCable('12 AWG landscape cable, 2-core');
    await plan.drawCable(row.map(pixelOf));
    await plan.tool('Cable');
    await plan.fit();
    await plan.click(supplyBox.pixel);
    await plan.click(pixelOf(bend));
    await plan.clickClose(pixelOf(tee));
    await theirs.keyboard.press('Enter');
    await expect(plan.line(/^Run 1/)).toBeVisible();
    await expect(plan.line(/not wired yet$/)).toHaveCount(0);
  });

  await test.step('the ends of the chain are dim, and everything says so', async () => {
    const volts = await plan.volts();
    const byHand = voltsByHand(supply, runByHand(12), lamp);
    for (const [tag, expected] of byHand) expect(volts[idOf(tag)], tag).toBeCloseTo(expected, 1);
    expect(byHand.get('U8')).toBeLessThan(10.8);

    const shown = await plan.line(/^U8/).textContent();
    const figure = Number(/([\d.]+) V$/.exec(shown ?? '')?.[1]);
    expect(Math.abs(figure - byHand.get('U8')!)).toBeLessThanOrEqual(0.1);

    await expect(plan.faultsButton).toHaveText(/^\d+ faults before sharing$/);
    await expect(theirs.getByRole('list', { name: 'What is on this sheet' })).toContainText(/Dim \d/);
    await plan.tool('Select');
    await plan.line(/^U8/).click();
    await expect(
      plan.inspector.getByRole('heading', { name: /^U8 is dim: [\d.]+ V, rated from 10\.8 V$/ }),
    ).toBeVisible();
    await plan.faultsButton.click();
    await expect(theirs.getByRole('heading', { name: 'What stands in the way' })).toBeVisible();
    await expect(theirs.getByRole('button', { name: /8.*(dim|10\.8)/i }).first()).toBeVisible();
    await theirs.keyboard.press('Escape');

    await plan.lookAt(row.map(pixelOf)[7]!, CLOSE);
    const mark = await windowPointOf(theirs, pixelOf(row[7]!));
    await expect
      .poll(() => pixelsOf(theirs, dimBlue, mark, 11), { message: 'a mark filled blue' })
      .toBeGreaterThan(50);
    const label = { x: mark.x + 50, y: mark.y };
    await expect
      .poll(() => pixelsOf(theirs, dimBlue, label, 30), { message: 'the edge of its label' })
      .toBeGreaterThan(20);
  });

  await test.step('a heavier home run brings all into their window', async () => {
    const [transformer] = await plan.ofKind('transformer');
    const homeRun = (await plan.ofKind('cable')).find(
      (c) => c.fromId === transformer!.id || c.toId === transformer!.id,
    );
    await plan.line(/^Cable, \d+ lengths/).click();
    await plan.line(/^T1 to /).click();
    expect(await plan.selection()).toEqual([homeRun!.id]);
    await plan.inspector.getByLabel('Gauge').selectOption({ label: '8 AWG landscape cable, 2-core' });
    await expect(plan.faultsButton).toHaveText(/^No faults/);
    await expect(theirs.getByRole('list', { name: 'What is on this sheet' })).toHaveText('In window 8');
    const byHand = voltsByHand(supply, runByHand(8), lamp);
    const volts = await plan.volts();
    for (const [tag, expected] of byHand) expect(volts[idOf(tag)], tag).toBeCloseTo(expected, 1);
  });

  await test.step('after a reload all is there', async () => {
    const before = { records: await plan.records(), volts: await plan.volts() };
    await plan.saved();
    await theirs.reload();
    await plan.isOpen();
    await expect.poll(() => plan.volts()).toEqual(before.volts);
    expect(new Map((await plan.records()).map((r) => [r.id, r]))).toEqual(
      new Map(before.records.map((r) => [r.id, r])),
    );
    await expect(plan.faultsButton).toHaveText(/^No faults/);
    await theirs.context().close();
  });
});

import { expect, test } from '@playwright/test';
import { phone } from './playwright.config.js';
import { bareGarden } from './support/bare-garden.js';
import { seenAt, seenAtRest } from './support/brightness.js';
import { HomePage } from './support/home-page.js';
import { litAt } from './support/night-handle.js';
import { signIn } from './support/people.js';
import { PlanPage } from './support/plan-page.js';
import { sendProposal } from './support/proposals.js';
import { textOf } from './support/sums.js';

const designer = {
  name: 'Corin Aldous',
  email: 'designer@fernhollow.example',
  password: 'fernhollow-demo',
};

/** On the yard photo: the foot of the house, its eaves over the left end, the tree and its crown. */
const foot = [
  { x: 416, y: 706 },
  { x: 1961, y: 726 },
];
const eaves = { x: 400, y: 458 };
const trunk = { x: 2196, y: 822 };
const crown = [
  { x: 1925, y: 330 },
  { x: 2050, y: 446 },
  { x: 2385, y: 468 },
  { x: 2385, y: 30 },
  { x: 2100, y: 20 },
];

/** Two up-lights by the tree, and places that tell of them: amid the crown, on the path, on the far lawn. */
const uplights = [
  { x: 2106, y: 784 },
  { x: 2238, y: 799 },
];
const amidCrown = { x: 2230, y: 330 };
/** On the wall over the wall wash, and on the roof, under which the ground of the house lies. */
const onHouse = { x: 1560, y: 640 };
const insideHouse = { x: 1200, y: 420 };
const onPath = { x: 1130, y: 1100 };
const farLawn = { x: 300, y: 1500 };

test('from a house face and a tree to the homeowner’s evening', async ({ page, browser }) => {
  test.setTimeout(240_000);
  const plan = new PlanPage(page);

  const jobId = await test.step('a garden on a photo, nothing marked yet', async () => {
    await signIn(page, designer);
    return bareGarden(page);
  });
  await plan.open(jobId);

  await test.step('mark the house face', async () => {
    await plan.tool('Wall face');
    for (const place of foot) await plan.clickClose(place);
    await page.keyboard.press('Enter');
    await plan.clickClose(eaves);
    const form = page.getByRole('form', { name: 'New wall face' });
    // As the photo's own camera tells it: some three metres to the eaves.
    const told = await form.getByLabel('Height').inputValue();
    expect(metersIn(told)).toBeGreaterThan(2.6);
    expect(metersIn(told)).toBeLessThan(3.3);
    await form.getByLabel('Height').fill('2.95 m');
    await form.getByLabel('Name').fill('House');
    await form.getByRole('button', { name: 'Add wall face' }).click();
    const [face] = await plan.ofKind('face');
    expect(face).toMatchObject({ name: 'House', heightMeters: 2.95 });
  });

  await test.step('mark the tree', async () => {
    await plan.tool('Tree');
    await plan.clickClose(trunk);
    await plan.fit();
    for (const place of crown) await plan.click(place);
    await page.keyboard.press('Enter');
    const form = page.getByRole('form', { name: 'New tree' });
    await form.getByLabel('Top').fill('6 m');
    await form.getByLabel('Crown from').fill('3 m');
    await form.getByRole('button', { name: 'Add tree' }).click();
    await expect.poll(async () => (await plan.ofKind('tree')).length).toBe(1);
  });

  await test.step('aim two up-lights at its crown, in one step', async () => {
    await plan.tool('Aim');
    await plan.fit();
    await plan.click(uplights[0]!);
    await plan.click(uplights[1]!, { shift: true });
    await plan.click(amidCrown);
    const aimed = (await plan.ofKind('fixture')).filter((f) => f.aim?.kind === 'point');
    expect(aimed).toHaveLength(2);
    for (const { aim } of aimed) expect(aim!.heightMeters).toBeGreaterThan(3);
    await plan.undo();
    expect((await plan.ofKind('fixture')).filter((f) => f.aim !== null)).toHaveLength(0);
    await plan.redo();
    await plan.saved();
  });

  await test.step('the designer sees it lit', async () => {
    await page.getByRole('button', { name: 'Night' }).click();
    await expect(page.getByRole('slider', { name: 'Time of the evening' })).toBeVisible();
    await expect(page.getByRole('region', { name: 'Light', exact: true })).toContainText('Zones');
    // Not among the groups that are offered at first.
    const group = page.getByRole('checkbox', { name: 'Wall and tree' });
    await expect(group).not.toBeChecked();
    expect(await litAt(page, [amidCrown])).toEqual([0]);
    await group.check();
    await expect.poll(async () => (await litAt(page, [amidCrown]))[0]).toBeGreaterThan(1);
    const lit = await litAt(page, [amidCrown, onHouse, insideHouse]);
    const [, houseLit, insideLit] = lit as [number, number, number];
    expect(houseLit).toBeGreaterThan(1);
    // Nothing shines through the house: what lies behind its face, over the eaves, is ground with no light on it.
    expect(insideLit).toBe(0);
  });

  const link = await sendProposal(page.request, jobId);
  const context = await browser.newContext({ viewport: phone, hasTouch: true, isMobile: true });
  const home = new HomePage(await context.newPage());
  await home.page.goto(link);
  await home.isOpen();
  const evening = home.picture.getByRole('slider', { name: 'Time of the evening' });

  await test.step('the homeowner’s page opens as an evening, and says what it is', async () => {
    await expect(home.night).toBeVisible();
    await expect(home.picture).toContainText('Artist’s impression');
    await expect(evening).toHaveAttribute('aria-valuetext', /dark.*on/i);
    await home.group('Wall and tree').tap();
  });

  await test.step('the evening line goes from daylight through dusk to lights-out', async () => {
    const look = async (minute: number | 'end') => {
      const end = Number(await evening.getAttribute('max'));
      await evening.fill(String(minute === 'end' ? end : minute));
      const [tree, lawn] = await seenAtRest(home.frame, amidCrown, farLawn);
      return { tree: tree!, lawn: lawn! };
    };
    const start = await look(0);
    const night = await look(240);
    await expect(evening).toHaveAttribute('aria-valuetext', /on/i);
    const out = await look('end');
    await expect(evening).toHaveAttribute('aria-valuetext', /off/i);
    expect(start.lawn.light).toBeGreaterThan(2 * night.lawn.light);
    expect(out.lawn.light).toBeLessThan(start.lawn.light / 2);
    // By night the lamps make the crown bright and warm; after lights-out it is as dark as all else.
    expect(night.tree.light).toBeGreaterThan(2 * out.tree.light);
    expect(night.tree.red).toBeGreaterThan(night.tree.blue);
    await evening.fill('240');
  });

  await test.step('a group is switched: price and picture follow, and nothing else changes', async () => {
    const group = home.group('Wall and tree');
    const [treeOn, pathOn] = await seenAtRest(home.frame, amidCrown, onPath);
    const dear = await textOf(home.total);
    await group.tap();
    await expect(home.total).not.toHaveText(dear);
    await expect
      .poll(async () => (await seenAt(home.frame, amidCrown))[0]!.light)
      .toBeLessThan(treeOn!.light / 2);
    const [, pathOff] = await seenAtRest(home.frame, amidCrown, onPath);
    expect(Math.abs(pathOff!.light - pathOn!.light)).toBeLessThan(3);
    await group.tap();
    await expect(home.total).toHaveText(dear);
    await expect
      .poll(async () => Math.abs((await seenAt(home.frame, amidCrown))[0]!.light - treeOn!.light))
      .toBeLessThan(3);
  });
  await context.close();
});

/** Metres of "8′ 10″" or "2.70 m". */
function metersIn(text: string): number {
  const metric = /([\d.]+)\s*m\b/.exec(text);
  if (metric) return Number(metric[1]);
  const [, feet = '0', inches = '0'] = /(?:(\d+)\s*['′])?\s*(?:([\d.]+)[^\d]*["″])?/.exec(text) ?? [];
  return Number(feet) * 0.3048 + Number(inches) * 0.0254;
}

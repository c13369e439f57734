import { expect, test } from '@playwright/test';
import { plotPlanFile } from './support/files.js';
import { choosePlotPlan, newJob, sheetIsReady } from './support/jobs.js';
import { ownerOfNewCompany } from './support/people.js';
import { CLOSE, PlanPage } from './support/plan-page.js';
import { pool } from './support/plot.js';

/** Feet of "22′ 0″ ± 1″": what is shown of a length, and its expected error. */
function shownFeet(text: string): { feet: number; error: number } {
  const [length = '', error = ''] = text.split('±');
  const feetOf = (part: string): number => {
    const feet = /([\d.]+)\s*′/.exec(part)?.[1] ?? '0';
    const inches = /([\d.]+)(?:\s+(\d)\/(\d))?\s*″/.exec(part);
    const whole = Number(inches?.[1] ?? 0);
    const broken = inches?.[2] === undefined ? 0 : Number(inches[2]) / Number(inches[3]);
    return Number(feet) + (whole + broken) / 12;
  };
  return { feet: feetOf(length), error: feetOf(error) };
}

test('a plot plan is true to its typed drawing scale', async ({ page }) => {
  await ownerOfNewCompany(page);
  await newJob(page, 'Plot at Marlow Bend');
  await choosePlotPlan(page, plotPlanFile);
  await sheetIsReady(page, 'plot-plan');
  await page.getByRole('link', { name: 'Open plot-plan in the plan' }).click();
  const plan = new PlanPage(page);
  await plan.isOpen();

  await plan.tool('Scale');
  await expect(page.getByText('No scale yet.')).toBeVisible();
  const scale = page.getByLabel('Drawing scale');
  await scale.fill('an inch is ten');
  await scale.press('Enter');
  await expect(page.getByRole('alert')).toContainText('1 in = 10 ft');
  await scale.fill('1 in = 10 ft');
  await scale.press('Enter');
  await expect(page.getByText('No scale yet.')).toBeHidden();

  await plan.tool('Cable');
  await plan.clickClose(pool.farLeft);
  await plan.lookAt(pool.farRight, CLOSE);
  await plan.hover(pool.farRight);
  await test.step('the length along the pool’s long side, as it is drawn', async () => {
    const { feet, error } = shownFeet((await page.getByText(/^Drawn so far: /).textContent()) ?? '');
    expect(Math.abs(feet - 22)).toBeLessThanOrEqual(0.1);
    expect(error).toBeGreaterThan(0);
    expect(error).toBeLessThan(0.2);
  });
  await page.keyboard.press('Escape');
  await page.keyboard.press('Escape');

  await plan.tool('Measure');
  await plan.clickClose(pool.farLeft);
  await plan.clickClose(pool.farRight);
  await page.keyboard.press('Enter');
  await expect.poll(() => plan.ofKind('measurement')).toHaveLength(1);
  await test.step('and as it was measured', async () => {
    const told = plan.inspector.getByText(/′ .*±/);
    expect(Math.abs(shownFeet((await told.textContent()) ?? '').feet - 22)).toBeLessThanOrEqual(0.1);
  });
  await plan.saved();
  await page.reload();
  await plan.isOpen();
  await expect(plan.line('Measurement')).toBeVisible();
});

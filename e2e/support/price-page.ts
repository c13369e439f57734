import { expect, type Locator, type Page } from '@playwright/test';
import { centsOf, sumOf } from './sums.js';

/** The screen of a job's materials and price. */
export class PricePage {
  readonly sums: Locator;
  readonly total: Locator;
  /** A link once nothing stands in the way. */
  readonly onward: Locator;

  constructor(readonly page: Page) {
    this.sums = page.getByRole('complementary', { name: 'Sums' });
    this.total = sumOf(this.sums, /^Total$/);
    this.onward = this.sums.getByRole('link', { name: 'Make the proposal' });
  }

  async isOpen(): Promise<void> {
    await expect(this.page.getByRole('heading', { name: 'Materials and price', level: 1 })).toBeVisible();
    await expect(this.total).toBeVisible();
  }

  async part(name: 'Lines' | 'Stages and additions' | 'Faults'): Promise<void> {
    await this.page
      .getByRole('navigation', { name: 'Parts of the price' })
      .getByRole('link', { name })
      .click();
  }

  line(name: string): Locator {
    return this.page
      .getByRole('table', { name: 'Lines of the price' })
      .getByRole('row')
      .filter({ has: this.page.getByRole('button', { name: `Change ${name}`, exact: true }) });
  }

  priceOf(name: string): Locator {
    return this.line(name).getByRole('cell').nth(-3);
  }

  async saved(): Promise<void> {
    await expect(this.page.getByText('Saved', { exact: true })).toBeVisible();
  }

  /** Puts a price of one's own in place of the plan's. */
  async override(name: string, price: string, why: string): Promise<void> {
    await this.line(name)
      .getByRole('button', { name: `Change ${name}` })
      .click();
    const form = this.page.getByRole('form', { name: `Change ${name}` });
    await form.getByLabel('Price of the line').fill(price);
    await form.getByLabel(/^Why/).fill(why);
    await form.getByRole('button', { name: 'Change the line' }).click();
  }

  async addLabourByHand(name: string, price: string): Promise<void> {
    await this.page.getByRole('button', { name: 'Add a line by hand' }).click();
    const form = this.page.getByRole('form', { name: 'A line by hand' });
    await form.getByLabel('What it is').fill(name);
    await form.getByText('Labour', { exact: true }).click();
    await form.getByLabel(/^Price of one/).fill(price);
    await form.getByRole('button', { name: 'Add the line' }).click();
    await expect(form).toBeHidden();
  }

  /** Waits until the sums follow what was edited. Gives the new total in cents. */
  async totalOtherThan(cents: number): Promise<number> {
    await expect.poll(() => centsOf(this.total)).not.toBe(cents);
    return centsOf(this.total);
  }

  openFaults(): Locator {
    return this.page.getByRole('button', { name: /^Accept in writing/ });
  }

  /** Accepts the first open fault. */
  async acceptFirst(why: string): Promise<void> {
    const accepted = this.page.getByRole('button', { name: /^Withdraw/ });
    const before = await accepted.count();
    await this.openFaults().first().click();
    await this.page.getByLabel('Why is it acceptable?').fill(why);
    await this.page.getByRole('button', { name: 'Accept the fault' }).click();
    await expect(accepted).toHaveCount(before + 1);
  }
}

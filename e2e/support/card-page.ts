import { expect, type Page } from '@playwright/test';

/** The page that stands in for the card service's. */
export class CardPage {
  constructor(readonly page: Page) {}

  async asksFor(amount: string): Promise<void> {
    await expect(this.page).toHaveTitle('Pay by card (local stand-in)');
    await expect(this.page.getByText(amount, { exact: true })).toBeVisible();
  }

  async pay(card: string): Promise<void> {
    await this.page.getByRole('button', { name: card }).tap();
  }
}

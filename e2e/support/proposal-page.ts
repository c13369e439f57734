import { expect, type Locator, type Page } from '@playwright/test';

/** The company's screen of a job's proposal. */
export class ProposalPage {
  readonly standing: Locator;
  readonly preview: Locator;
  readonly questions: Locator;
  readonly payments: Locator;

  constructor(readonly page: Page) {
    this.standing = page.getByRole('region', { name: 'How it stands' });
    this.preview = this.section('What the client gets');
    this.questions = this.section('Questions');
    this.payments = this.section('Payments');
  }

  async open(jobId: string): Promise<void> {
    await this.page.goto(`/jobs/${jobId}/proposal`);
    await expect(this.standing).toBeVisible();
  }

  /** The words at the head of how it stands. */
  async stands(word: string): Promise<void> {
    await expect(this.standing.getByText(word, { exact: true }).first()).toBeVisible();
  }

  /** Makes the next revision, and waits for its paper. */
  async make(revision: number, changeOrder = false): Promise<void> {
    const label = changeOrder ? `Make change order, revision ${revision}` : `Make revision ${revision}`;
    await this.standing.getByRole('button', { name: label, exact: true }).click();
    await expect(this.standing.getByRole('progressbar', { name: 'The PDF is being made.' })).toBeVisible();
    await expect(this.page.getByText(`Revision ${revision} of `)).toBeVisible();
    await expect(this.sendButton(revision, changeOrder)).toBeVisible({ timeout: 30_000 });
  }

  /** Sends it to whom the form names by itself. */
  async send(revision: number, changeOrder = false): Promise<void> {
    await this.sendButton(revision, changeOrder).click();
    const form = this.page.getByRole('form', { name: 'Send the proposal' });
    await form.getByRole('button', { name: `Send revision ${revision}` }).click();
    await expect(form).toBeHidden();
    await this.stands('Sent');
  }

  /** A sum of the newest revision: "Total", "Deposit". */
  sum(name: RegExp): Locator {
    return this.preview
      .getByRole('table', { name: /^Price of revision/ })
      .getByRole('row')
      .filter({ has: this.page.getByRole('rowheader', { name }) })
      .getByRole('cell');
  }

  private sendButton(revision: number, changeOrder: boolean): Locator {
    return this.standing.getByRole('button', {
      name: changeOrder ? 'Send the change order…' : `Send revision ${revision}…`,
    });
  }

  section(title: string): Locator {
    return this.page.getByRole('region', { name: title, exact: true });
  }
}

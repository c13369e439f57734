import { expect, type Locator, type Page } from '@playwright/test';
import { sumOf } from './sums.js';

/** The page that a homeowner's link opens, worked with a finger. */
export class HomePage {
  readonly main: Locator;
  readonly picture: Locator;
  /** The evening drawn over the photo. */
  readonly night: Locator;
  /** The frame in which the picture is, all of it while nobody has zoomed. */
  readonly frame: Locator;
  readonly total: Locator;
  /** What is other than in the version that was approved. */
  readonly changes: Locator;

  constructor(readonly page: Page) {
    this.main = page.getByRole('main');
    this.picture = page.getByRole('region', { name: 'Your garden with its lights' });
    this.changes = page.getByRole('region', { name: 'What changed since you approved' });
    this.night = this.picture.locator('[data-drawn]');
    this.frame = this.picture.getByRole('group', { name: /picture with \d+ lights/ });
    this.total = sumOf(this.main, /^Total$/);
  }

  async isOpen(): Promise<void> {
    await expect(this.main.getByRole('heading', { name: /after dark$/, level: 1 })).toBeVisible();
    await expect
      .poll(() => this.picture.locator('img').evaluate((img: HTMLImageElement) => img.naturalWidth))
      .toBeGreaterThan(0);
  }

  /** The mark of a light in the picture, by its tag. */
  light(tag: string): Locator {
    return this.picture.getByRole('button', { name: new RegExp(`^${tag}, `) });
  }

  /** Puts a finger on the middle of a light's mark, whatever else is close to it. */
  async tapLight(tag: string): Promise<void> {
    const { x, y } = await this.middleOf(tag);
    await this.page.touchscreen.tap(x, y);
  }

  /** The same with a mouse. Crowded marks are small dots, and a press there takes the nearest. */
  async pressLight(tag: string): Promise<void> {
    const { x, y } = await this.middleOf(tag);
    await this.page.mouse.click(x, y);
  }

  private async middleOf(tag: string): Promise<{ x: number; y: number }> {
    await this.light(tag).scrollIntoViewIfNeeded();
    const box = await this.light(tag).boundingBox();
    if (box === null) throw new Error(`${tag} is nowhere to be seen.`);
    return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
  }

  /** What the card of a tapped light says. */
  card(tag: string): Locator {
    return this.picture.getByRole('region', { name: new RegExp(`\\b${tag}\\b`) });
  }

  group(name: string): Locator {
    return this.main.getByRole('checkbox', { name: new RegExp(`^${name}`) });
  }

  sum(term: RegExp): Locator {
    return sumOf(this.main, term);
  }

  thread(about: RegExp): Locator {
    return this.main
      .getByRole('listitem')
      .filter({ has: this.page.getByRole('heading', { name: about, level: 3 }) });
  }

  async review(): Promise<void> {
    await this.main.getByRole('button', { name: 'Review and approve' }).tap();
    await expect(this.main.getByRole('heading', { name: 'Review and approve', level: 1 })).toBeVisible();
  }

  /** On the review screen. */
  async sign(name: string, total: string): Promise<void> {
    await this.main.getByRole('checkbox', { name: /^I approve/ }).tap();
    await this.main.getByRole('checkbox', { name: /^I agree to sign electronically/ }).tap();
    await this.main.getByLabel('Your full name, as your signature').fill(name);
    await this.main.getByRole('button', { name: `Approve for ${total}` }).tap();
    await expect(this.main.getByRole('heading', { name: `Thank you, ${name}` })).toBeVisible();
  }
}

import { expect, type Locator, type Page } from '@playwright/test';
import {
  type PlanRecord,
  type Point,
  recordsOf,
  selectionOf,
  settledVolts,
  whenOpen,
  windowPointOf,
  zoomOf,
} from './plan-handle.js';
import { isBare, lookAt } from './plan-view.js';

export type { PlanRecord, Point } from './plan-handle.js';

export type Tool =
  | 'Select'
  | 'Transformer'
  | 'Fixture'
  | 'Cable'
  | 'Hub'
  | 'Aim'
  | 'Area'
  | 'Wall face'
  | 'Tree'
  | 'Measure'
  | 'Note'
  | 'Scale';

/** Close enough that the clicks of a mouse, whole pixels of the window, are good to half a pixel of the sheet. */
export const CLOSE = 2;

/** The plan page as a person works with it: tools, clicks on places of the sheet, ledger, panels. */
export class PlanPage {
  readonly ledger: Locator;
  readonly inspector: Locator;
  readonly faultsButton: Locator;
  readonly messages: Locator;
  private side = 25;

  constructor(readonly page: Page) {
    this.ledger = page.getByRole('tree', { name: 'What is on the plan' });
    this.inspector = page.getByRole('region', { name: 'What is chosen' });
    this.faultsButton = page.getByRole('banner').getByRole('button', { name: /faults?\b/i });
    this.messages = page.locator('[aria-live="polite"]');
  }

  async open(jobId: string): Promise<void> {
    await this.page.goto(`/jobs/${jobId}/plan`);
    await this.isOpen();
  }

  async isOpen(): Promise<void> {
    await whenOpen(this.page);
    await expect(this.page.getByText('Loading the sheet…')).toBeHidden();
  }

  async tool(name: Tool): Promise<void> {
    await this.page
      .getByRole('toolbar', { name: 'Tools' })
      .getByRole('button', { name, exact: true })
      .click();
  }

  /** Chooses an item in the card of the tool at work. */
  async pick(name: string): Promise<void> {
    await this.page.getByRole('main').getByText(name, { exact: true }).click();
    await expect(this.page.getByRole('radio', { name })).toBeChecked();
  }

  /** Clicks a place of the sheet where it is in the window now. */
  async click(place: Point, options: { shift?: boolean } = {}): Promise<void> {
    const at = await this.clear(place);
    if (options.shift) await this.page.keyboard.down('Shift');
    await this.page.mouse.click(at.x, at.y);
    if (options.shift) await this.page.keyboard.up('Shift');
  }

  /** Goes close to a place of the sheet, then clicks it. */
  async clickClose(place: Point, zoom = CLOSE): Promise<void> {
    // Quicker than any person, two clicks on one spot of the window would count as a double click.
    this.side = -this.side;
    await lookAt(this.page, place, zoom, this.side);
    await this.click(place);
  }

  async hover(place: Point): Promise<void> {
    const at = await this.clear(place);
    await this.page.mouse.move(at.x, at.y);
  }

  async drag(from: Point, to: Point): Promise<void> {
    const a = await this.clear(from);
    const b = await windowPointOf(this.page, to);
    if (!(await isBare(this.page, b))) throw new Error(`The drag to ${to.x}, ${to.y} ends off the drawing.`);
    await this.page.mouse.move(a.x, a.y);
    await this.page.mouse.down();
    await this.page.mouse.move((a.x + b.x) / 2, (a.y + b.y) / 2, { steps: 3 });
    await this.page.mouse.move(b.x, b.y, { steps: 3 });
    await this.page.mouse.up();
  }

  async lookAt(place: Point, zoom: number): Promise<void> {
    await lookAt(this.page, place, zoom);
  }

  async fit(): Promise<void> {
    await this.page.getByRole('button', { name: 'Fit', exact: true }).click();
  }

  /** Draws cable along places of the sheet and ends it. */
  async drawCable(places: readonly Point[]): Promise<void> {
    await this.tool('Cable');
    for (const place of places) await this.click(place);
    await this.page.keyboard.press('Enter');
  }

  async chooseCable(name: string): Promise<void> {
    await this.page.getByLabel('Cable', { exact: true }).selectOption({ label: name });
  }

  /** A line of the ledger by the words it begins with. */
  line(title: string | RegExp): Locator {
    return this.ledger.getByRole('treeitem', { name: title });
  }

  /** Typing into a field of the inspector takes effect with Enter. */
  async fill(label: string, value: string): Promise<void> {
    const field = this.inspector.getByLabel(label, { exact: true });
    await field.fill(value);
    await field.press('Enter');
  }

  async saved(): Promise<void> {
    await expect(this.page.getByRole('banner').getByText(/^Saved/)).toBeVisible();
  }

  async undo(): Promise<void> {
    await this.page.getByRole('button', { name: 'Undo' }).click();
  }

  async redo(): Promise<void> {
    await this.page.getByRole('button', { name: 'Redo' }).click();
  }

  records(): Promise<PlanRecord[]> {
    return recordsOf(this.page);
  }

  async ofKind(kind: string): Promise<PlanRecord[]> {
    return (await this.records()).filter((record) => record.kind === kind);
  }

  /** Where the records of a kind stand, in the order of their numbers. */
  async places(kind: string): Promise<Point[]> {
    const records = await this.ofKind(kind);
    return records.sort((a, b) => (a.number ?? 0) - (b.number ?? 0)).map((record) => record.at!);
  }

  selection(): Promise<string[]> {
    return selectionOf(this.page);
  }

  volts(): Promise<Record<string, number>> {
    return settledVolts(this.page);
  }

  /** The window point of a place; where panels cover it, or it is outside, the view is moved first. */
  private async clear(place: Point): Promise<Point> {
    const at = await windowPointOf(this.page, place);
    if (await isBare(this.page, at)) return at;
    await lookAt(this.page, place, await zoomOf(this.page));
    return windowPointOf(this.page, place);
  }
}

import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { expect, type Page } from '@playwright/test';
import type { AxeResults } from 'axe-core';
import { desktop, phone } from '../playwright.config.js';

const pictures = fileURLToPath(new URL('../../test-results/screens/', import.meta.url));
const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Collects what the browser's console complains about, as long as the page lives. */
export class Complaints {
  private list: string[] = [];

  constructor(page: Page) {
    page.on('console', (message) => {
      if (message.type() !== 'error' && message.type() !== 'warning') return;
      // Said by drivers that draw without a graphics card, of how fast they are.
      if (/GL Driver Message .*Performance/.test(message.text())) return;
      // Who is not signed in asks who they are, and is told so.
      if (/status of 401/.test(message.text()) && message.location().url.endsWith('/api/auth/me')) return;
      this.list.push(`console ${message.type()}: ${message.text()} ${message.location().url}`);
    });
    page.on('pageerror', (error) => this.list.push(`error: ${error.message}`));
  }

  take(): string[] {
    const taken = this.list;
    this.list = [];
    return taken;
  }
}

export interface LookOptions {
  /** What the console says because the screen is meant to provoke it, such as the 404 of a job that is not there. */
  readonly expected?: RegExp;
  readonly sizes?: readonly { width: number; height: number }[];
  /** A menu is open: what it covers is hidden from screen readers, and cannot be reached while it holds the focus. */
  readonly menuOpen?: boolean;
}

/** Looks at a screen on a desk and on a phone: keeps a picture of each and says what is wrong with it. */
export async function look(
  page: Page,
  complaints: Complaints,
  name: string,
  { expected, sizes = [desktop, phone], menuOpen = false }: LookOptions = {},
): Promise<void> {
  const problems: string[] = [];
  for (const size of sizes) {
    await page.setViewportSize(size);
    await calm(page);
    await page.screenshot({ path: `${pictures}${name}-${size.width}.png` });
    const found = [...(await layoutProblems(page)), ...(await barriers(page, menuOpen))];
    problems.push(...found.map((problem) => `${size.width} px: ${problem}`));
  }
  if ((await page.title()) === '') problems.push('The tab has no title.');
  problems.push(...complaints.take().filter((complaint) => !expected?.test(complaint)));
  expect.soft(problems, `what is wrong with ${name}`).toEqual([]);
  await page.setViewportSize(desktop);
}

/** Nothing is loading, pictures have arrived, fonts are there and two frames have been drawn. */
async function calm(page: Page): Promise<void> {
  await expect(page.getByRole('status', { name: /^(Loading|Opening|Reading)/ })).toHaveCount(0);
  await expect(page.getByText('Loading the sheet…')).toHaveCount(0);
  await page.waitForFunction(() =>
    [...document.images].every((image) => image.complete || image.loading === 'lazy'),
  );
  await page.evaluate(async () => {
    await document.fonts.ready;
    await window.__plan?.settled();
    await new Promise((drawn) => requestAnimationFrame(() => requestAnimationFrame(drawn)));
  });
}

/** Wider than the window; text cut off without an ellipsis; words that stick out of their button. */
function layoutProblems(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const problems: string[] = [];
    const { scrollWidth } = document.documentElement;
    if (scrollWidth > window.innerWidth) problems.push(`is ${scrollWidth} px wide in ${window.innerWidth}`);
    const wordsOf = (element: Element): string =>
      [...element.childNodes]
        .filter((node) => node.nodeType === Node.TEXT_NODE)
        .map((node) => node.textContent?.trim() ?? '')
        .join(' ')
        .trim();
    const shown = (element: Element): boolean => {
      const box = element.getBoundingClientRect();
      return box.width > 2 && box.height > 2 && element.checkVisibility({ visibilityProperty: true });
    };
    for (const element of document.body.querySelectorAll<HTMLElement>('*')) {
      const words = wordsOf(element);
      if (words === '' || !shown(element)) continue;
      const style = getComputedStyle(element);
      if (style.clip !== 'auto' || style.clipPath !== 'none') continue;
      const cut = /hidden|clip/.test(style.overflowX) && style.textOverflow !== 'ellipsis';
      if (cut && element.scrollWidth > element.clientWidth + 1) problems.push(`cuts off “${words}”`);
      if (/hidden|clip/.test(style.overflowY) && element.scrollHeight > element.clientHeight + 3)
        problems.push(`cuts off the foot of “${words}”`);
      const frame = element.closest('button, [role="button"], [role="tab"], label, td, th');
      if (frame === null || style.textOverflow === 'ellipsis') continue;
      const box = frame.getBoundingClientRect();
      const sticksOut = [...element.childNodes].some((node) => {
        if (node.nodeType !== Node.TEXT_NODE) return false;
        const range = document.createRange();
        range.selectNodeContents(node);
        const text = range.getBoundingClientRect();
        return text.width > 0 && (text.left < box.left - 1 || text.right > box.right + 1);
      });
      if (sticksOut) problems.push(`“${words}” sticks out of its ${frame.tagName.toLowerCase()}`);
    }
    return problems;
  });
}

/** Serious and critical violations of WCAG 2.2 A and AA that axe-core finds. */
async function barriers(page: Page, menuOpen: boolean): Promise<string[]> {
  await page.evaluate(axe);
  const results = await page.evaluate(
    (inMenu) =>
      (window as unknown as { axe: typeof import('axe-core') }).axe.run(document, {
        runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'],
        resultTypes: ['violations'],
        rules: { 'aria-hidden-focus': { enabled: !inMenu } },
      }),
    menuOpen,
  );
  return told(results);
}

function told({ violations }: AxeResults): string[] {
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .flatMap(({ id, help, nodes }) =>
      nodes
        .filter((node) => !(id === 'target-size' && isPlaced(node.target.join(' '))))
        .map(
          (node) => `${id} (${help}): ${node.target.join(' ')} ${node.failureSummary?.replace(/\s+/g, ' ')}`,
        ),
    );
}

/**
 * A light's mark in the homeowner's picture stands where the light will: its place is what it tells, which
 * WCAG 2.5.8 excepts. A press between near ones takes the nearest, and zooming parts them.
 */
const isPlaced = (target: string): boolean => target.includes('button[data-record=');

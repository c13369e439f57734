/** What the address stands for, as the server wrote it into the page. */
export type Link =
  /** `back`: they came back from the card service, and only the browser that they left from is let in. */
  | { readonly kind: 'live'; readonly id: string; readonly back: boolean }
  | { readonly kind: 'unknown' }
  | { readonly kind: 'gone' };

const meta = (page: Document, name: string): string | null =>
  page.querySelector(`meta[name="lampwright-${name}"]`)?.getAttribute('content') || null;

export function linkOf(page: Document): Link {
  const id = meta(page, 'link');
  const state = meta(page, 'state');
  if (id !== null) return { kind: 'live', id, back: state === 'back' };
  return { kind: state === 'gone' ? 'gone' : 'unknown' };
}

/** What the address stands for, as the server wrote it into the page. */
export type Link =
  | { readonly kind: 'live'; readonly id: string }
  | { readonly kind: 'unknown' }
  | { readonly kind: 'gone' };

const meta = (page: Document, name: string): string | null =>
  page.querySelector(`meta[name="lampwright-${name}"]`)?.getAttribute('content') || null;

export function linkOf(page: Document): Link {
  const id = meta(page, 'link');
  if (id !== null) return { kind: 'live', id };
  return { kind: meta(page, 'state') === 'gone' ? 'gone' : 'unknown' };
}

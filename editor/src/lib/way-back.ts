/**
 * Where to go after signing in. Only addresses of this product: anything that a browser could take for
 * another site ("//host", "/\host", a scheme) leads home instead.
 */
export function wayBack(search: URLSearchParams): string {
  const target = search.get('to');
  if (target === null || !/^\/(?![/\\])/.test(target)) return '/';
  const base = 'http://base.invalid';
  const url = new URL(target, base);
  return url.origin === base ? `${url.pathname}${url.search}${url.hash}` : '/';
}

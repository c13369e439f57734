/**
 * Ids of the records that an address asks to have chosen: `?lit=id,id`, or `#lit=id,id` where they are too
 * many for an address that is sent to a server.
 */
export function litOf(search: string, hash: string): string[] {
  const named = (text: string) => new URLSearchParams(text).get('lit') ?? '';
  const ids = `${named(search)},${named(hash.replace(/^#/, ''))}`.split(',').filter((id) => id !== '');
  return [...new Set(ids)];
}

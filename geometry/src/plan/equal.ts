/**
 * Whether two plain JSON values hold the same data. Key order does not matter (a database that stores JSON
 * in binary form reorders keys), and a key holding undefined counts as missing, as it does in JSON.
 */
export function sameData(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a === 'number' && typeof b === 'number') return a === b;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) || Array.isArray(b)) {
    if (!Array.isArray(a) || !Array.isArray(b) || a.length !== b.length) return false;
    return a.every((value, i) => sameData(value, b[i]));
  }
  return sameFields(a as Record<string, unknown>, b as Record<string, unknown>);
}

function sameFields(a: Record<string, unknown>, b: Record<string, unknown>): boolean {
  const defined = (o: Record<string, unknown>) => Object.keys(o).filter((key) => o[key] !== undefined);
  const keys = defined(a);
  if (keys.length !== defined(b).length) return false;
  return keys.every((key) => Object.hasOwn(b, key) && sameData(a[key], b[key]));
}

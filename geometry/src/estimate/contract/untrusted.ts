/** Reading values of unknown shape: nothing here throws, and nothing is read through a prototype. */

const NOTHING: readonly unknown[] = [];

/** The own property of an object or list, or undefined. */
export function childOf(value: unknown, key: PropertyKey): unknown {
  if (typeof value !== 'object' || value === null || !Object.hasOwn(value, key)) return undefined;
  return (value as Record<PropertyKey, unknown>)[key];
}

/** The value if it is a list, else an empty one. */
export function itemsOf(value: unknown): readonly unknown[] {
  return Array.isArray(value) ? value : NOTHING;
}

export function textOf(value: unknown): string | undefined {
  return typeof value === 'string' ? value : undefined;
}

export function numberOf(value: unknown): number | undefined {
  return typeof value === 'number' ? value : undefined;
}

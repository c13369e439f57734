import type { Materials } from './api';

type MaterialLine = Materials['lines'][number];

/** All that is brought of one thing, and what it is for. */
export interface Gathered extends Pick<MaterialLine, 'section' | 'name' | 'unit' | 'quantity'> {
  readonly uses: readonly Pick<MaterialLine, 'key' | 'groupId' | 'quantity' | 'source' | 'recordIds'>[];
}

/** Lines of a bill are counted for each group; whoever loads the van wants each thing once, with its whole quantity. */
export function gather(lines: Materials['lines']): Gathered[] {
  const gathered = new Map<string, Gathered>();
  for (const { section, name, unit, ...use } of lines) {
    const id = JSON.stringify([section, name, unit]);
    const before = gathered.get(id);
    gathered.set(id, {
      section,
      name,
      unit,
      quantity: (before?.quantity ?? 0) + use.quantity,
      uses: [...(before?.uses ?? []), use],
    });
  }
  return [...gathered.values()];
}

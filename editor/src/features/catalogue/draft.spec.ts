import { describe, expect, it } from 'vitest';
import { everyForm } from './catalogue.testkit';
import { categories } from './categories';
import { type Draft, draftOf, emptyDraft } from './draft';
import { check } from './resolver';

/** Whether the form has a field of this dotted name. */
function hasField(draft: Draft, name: string): boolean {
  let at: unknown = draft;
  for (const key of name.split('.')) {
    if (typeof at !== 'object' || at === null || !(key in at)) return false;
    at = Reflect.get(at, key);
  }
  return true;
}

describe('the form of a catalogue item', () => {
  it.each(everyForm)('gives back what it was opened with: $name', (item) => {
    expect(check(draftOf(item), item.category)).toEqual({ ok: true, item });
  });

  it.each(categories)('asks a new %s for its name, in a field that it has', (category) => {
    const checked = check(emptyDraft, category);
    expect(checked.ok).toBe(false);
    if (checked.ok) return;
    expect(checked.faults.get('name')).toBe('Please fill this in.');
  });

  it.each(everyForm)('shows every fault at a field that it has: $name', (item) => {
    // Every number missing: whatever the schema then says must find its place.
    const stripped = (draft: object): object =>
      Object.fromEntries(
        Object.entries(draft).map(([key, value]) => {
          if (typeof value === 'number') return [key, null];
          if (Array.isArray(value)) return [key, value.map((entry: object) => stripped(entry))];
          return [key, value];
        }),
      );
    const draft: Draft = { ...draftOf(item), ...stripped(draftOf(item)), name: '' };
    const checked = check(draft, item.category);
    expect(checked.ok).toBe(false);
    if (checked.ok) return;
    for (const field of checked.faults.keys()) expect(hasField(draft, field), field).toBe(true);
  });

  it('asks for a number where there is none, and refuses what is no number', () => {
    const draft = draftOf(everyForm[0]!);
    const faultAt = (change: Partial<Draft>, field: string) => {
      const checked = check({ ...draft, ...change }, 'fixture');
      return checked.ok ? undefined : checked.faults.get(field);
    };
    expect(faultAt({ watts: null }, 'watts')).toBe('Please fill in a number.');
    expect(faultAt({ watts: Number.NaN }, 'watts')).toBe('Please write a number, such as 12 or 12.5.');
    expect(faultAt({ windowMin: 20 }, 'windowMax')).toMatch(/lowest volts/);
  });

  it('says in per cent what a shield can hold back', () => {
    const checked = check({ ...draftOf(everyForm[0]!), shieldFactor: 1.2 }, 'fixture');
    expect(checked.ok ? null : checked.faults.get('shieldFactor')).toMatch(/100 %/);
  });

  it('gives a single winding the whole rating', () => {
    const one = draftOf(everyForm.find(({ name }) => name === 'One winding')!);
    const checked = check({ ...one, ratedVA: 150 }, 'transformer');
    expect(checked.ok && checked.item.category === 'transformer' && checked.item.windings).toEqual([
      { id: 'W1', ratedVA: 150 },
    ]);
  });

  it('says at the terminal when two are called the same', () => {
    const draft = draftOf(everyForm.find(({ name }) => name === 'Two windings')!);
    const terminals = draft.terminals.map((terminal, i) => (i === 3 ? { ...terminal, id: 'A12' } : terminal));
    const checked = check({ ...draft, terminals }, 'transformer');
    expect(checked.ok ? null : checked.faults.get('terminals.3.id')).toBe('Terminal A12 is listed twice.');
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { stages } from '../../lib/stages';
import { changeAsk, type ListAsk, readAsk, sortBy, sorts, writeAsk } from './list-ask';

const usual: ListAsk = {
  search: '',
  stage: null,
  archived: false,
  sort: 'updated',
  direction: 'desc',
  page: 1,
};

const asks = fc.record<ListAsk>({
  search: fc.string({ maxLength: 120 }),
  stage: fc.constantFrom(null, ...stages),
  archived: fc.boolean(),
  sort: fc.constantFrom(...sorts),
  direction: fc.constantFrom('asc', 'desc'),
  page: fc.integer({ min: 1, max: 5000 }),
});

describe('the address of the job list', () => {
  it('is empty for what is usual', () => {
    expect(writeAsk(usual).toString()).toBe('');
    expect(readAsk(new URLSearchParams())).toEqual(usual);
  });

  it('says everything that is asked', () => {
    fc.assert(
      fc.property(asks, (ask) => {
        expect(readAsk(new URLSearchParams(writeAsk(ask).toString()))).toEqual(ask);
      }),
      { seed: 20261201 },
    );
  });

  it('falls back to the usual where it was mistyped', () => {
    expect(readAsk(new URLSearchParams('stage=dig&sort=height&direction=up&page=-3'))).toEqual(usual);
    expect(readAsk(new URLSearchParams('page=1.5')).page).toBe(1);
  });
});

it('goes back to the first page when anything else changes', () => {
  const third = { ...usual, page: 3 };
  expect(changeAsk(third, { stage: 'prove' }).page).toBe(1);
  expect(sortBy(third, 'name').page).toBe(1);
});

it('turns the order round when the same column is pressed again', () => {
  const byName = sortBy(usual, 'name');
  expect([byName.sort, byName.direction]).toEqual(['name', 'asc']);
  expect(sortBy(byName, 'name').direction).toBe('desc');
  expect(sortBy(byName, 'created').direction).toBe('desc');
});

import { expect, it } from 'vitest';
import type { Mapping } from './api';
import { fieldOfColumn, samplesOf, withField } from './mapping';

const none = { name: null, cost: null } as unknown as Mapping;

it('lets a column hold one field, and a field be held by one column', () => {
  const first = withField(none, 2, 'name');
  expect(fieldOfColumn(first, 2)).toBe('name');
  const other = withField(first, 2, 'cost');
  expect([other.name, other.cost]).toEqual([null, 2]);
  const moved = withField(other, 3, 'cost');
  expect([fieldOfColumn(moved, 2), fieldOfColumn(moved, 3)]).toEqual([null, 'cost']);
  expect(fieldOfColumn(withField(moved, 3, null), 3)).toBeNull();
});

it('shows three different texts of a column', () => {
  const rows = ['', 'a', 'a', 'b', '', 'c', 'd'].map((text) => [text]);
  expect(samplesOf({ rows }, 0)).toEqual(['a', 'b', 'c']);
  expect(samplesOf({ rows }, 5)).toEqual([]);
});

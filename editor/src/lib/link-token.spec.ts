import { expect, it } from 'vitest';
import { tokenOf } from './link-token';

it('finds the token of a mail link', () => {
  expect(tokenOf('#token=a-b_C1')).toBe('a-b_C1');
  expect(tokenOf('#other=1&token=x')).toBe('x');
});

it('gives the empty text where there is none', () => {
  expect(tokenOf('')).toBe('');
  expect(tokenOf('#')).toBe('');
  expect(tokenOf('#top')).toBe('');
});

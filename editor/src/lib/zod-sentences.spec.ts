import { expect, it } from 'vitest';
import { z } from 'zod';
import { sentenceFor } from './zod-sentences';

const first = (schema: z.ZodType, value: unknown) =>
  schema.safeParse(value, { error: sentenceFor }).error?.issues[0]?.message;

it.each([
  [z.string().min(1), '', 'Please fill this in.'],
  [z.string().min(10), 'short', 'At least 10 characters.'],
  [z.string().max(3), 'longer', 'At most 3 characters.'],
  [z.number(), null, 'Please fill in a number.'],
  [z.number(), undefined, 'Please fill in a number.'],
  [z.number(), Number.NaN, 'Please write a number, such as 12 or 12.5.'],
  [z.number().positive(), 0, 'Must be more than 0.'],
  [z.number().min(1), 0, 'Must be at least 1.'],
  [z.number().max(60), 61, 'Must be at most 60.'],
  [z.email(), 'nobody', 'Please write an e-mail address, such as name@example.com.'],
  [z.enum(['a', 'b']), '', 'Please choose one.'],
])('says what to do: %#', (schema, value, sentence) => {
  expect(first(schema, value)).toBe(sentence);
});

it('leaves a sentence that the schema gives itself', () => {
  expect(first(z.string().min(1, { error: 'Please write the name.' }), '')).toBe('Please write the name.');
});

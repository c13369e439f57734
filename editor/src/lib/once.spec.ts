import { expect, it } from 'vitest';
import { ApiProblem } from './api/client';
import { OnceKey } from './once';

const begin = () => {
  let n = 0;
  return new OnceKey(() => `key ${++n}`);
};
const keyOf = (once: OnceKey, intent: unknown) => once.headersFor(intent)['Idempotency-Key'];

it('keeps the key while the same thing is tried again', () => {
  const once = begin();
  expect(keyOf(once, { amount: 1 })).toBe('key 1');
  once.failed(new ApiProblem(0, 'unreachable', ''));
  once.failed(new ApiProblem(502, 'unexpected', ''));
  once.failed(new ApiProblem(409, 'in-flight', ''));
  once.failed(new ApiProblem(429, 'too-many', ''));
  expect(keyOf(once, { amount: 1 })).toBe('key 1');
});

it('takes another one for something else, after success and after a refusal', () => {
  const once = begin();
  expect(keyOf(once, { amount: 1 })).toBe('key 1');
  expect(keyOf(once, { amount: 2 })).toBe('key 2');
  once.done();
  expect(keyOf(once, { amount: 2 })).toBe('key 3');
  once.failed(new ApiProblem(409, 'already-sent', ''));
  expect(keyOf(once, { amount: 2 })).toBe('key 4');
});

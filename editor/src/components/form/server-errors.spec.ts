import { expect, it } from 'vitest';
import { ApiProblem } from '../../lib/api/client';
import { pointerToName, sortErrors } from './server-errors';

const problem = (...errors: { pointer: string; detail: string }[]) =>
  new ApiProblem(400, 'bad-input', 'Some values need attention.', errors);
const isField = (name: string) => ['email', 'clientName', 'aim.led.minVolts'].includes(name);

it('reads JSON pointers, escapes included', () => {
  expect(pointerToName('/aim/led/minVolts')).toBe('aim.led.minVolts');
  expect(pointerToName('/a~1b~0c')).toBe('a/b~c');
});

it('gives each fault to its field', () => {
  expect(sortErrors(problem({ pointer: '/email', detail: 'Taken.' }), isField)).toEqual({
    fields: [{ name: 'email', message: 'Taken.' }],
    rest: null,
  });
});

it('says above the button what fits no field', () => {
  const sorted = sortErrors(
    problem({ pointer: '/email', detail: 'Taken.' }, { pointer: '/token', detail: 'Too old.' }),
    isField,
  );
  expect(sorted).toEqual({ fields: [{ name: 'email', message: 'Taken.' }], rest: 'Too old.' });
});

it('knows fields by other names than the server', () => {
  const sorted = sortErrors(problem({ pointer: '/client/name', detail: 'Missing.' }), isField, (name) =>
    name === 'client.name' ? 'clientName' : name,
  );
  expect(sorted.fields).toEqual([{ name: 'clientName', message: 'Missing.' }]);
});

it('has a sentence for everything else', () => {
  expect(sortErrors(new ApiProblem(409, 'taken', 'Somebody was quicker.'), isField).rest).toBe(
    'Somebody was quicker.',
  );
  expect(sortErrors(new Error('boom'), isField).rest).not.toContain('boom');
});

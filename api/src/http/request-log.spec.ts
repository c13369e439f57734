import { expect, it } from 'vitest';
import { loggedPath } from './request-log.js';

it('logs paths without queries, and links without their secrets', () => {
  expect(loggedPath('/api/jobs?search=ida')).toBe('/api/jobs');
  expect(loggedPath('/p/a-secret-token')).toBe('/p/…');
  expect(loggedPath('/p/a-secret-token/more?paid=1')).toBe('/p/…');
  expect(loggedPath('//p/a-secret-token')).toBe('/p/…');
  expect(loggedPath('/P/a-secret-token')).toBe('/p/…');
  expect(loggedPath('/plans/a')).toBe('/plans/a');
});

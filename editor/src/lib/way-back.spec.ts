import { describe, expect, it } from 'vitest';
import { wayBack } from './way-back';

const back = (to: string) => wayBack(new URLSearchParams({ to }));

describe('wayBack', () => {
  it('leads home when nothing is asked', () => {
    expect(wayBack(new URLSearchParams())).toBe('/');
  });

  it('keeps a page with its search', () => {
    expect(back('/jobs?stage=plan&page=2')).toBe('/jobs?stage=plan&page=2');
  });

  it.each([
    'https://elsewhere.example/',
    '//elsewhere.example/jobs',
    '/\\elsewhere.example',
    'javascript:alert(1)',
    'jobs',
    '/\t/elsewhere.example',
  ])('does not lead to another site: %j', (to) => {
    expect(back(to)).not.toMatch(/elsewhere|javascript/);
  });
});

import { describe, expect, it } from 'vitest';
import { combinationOf, offered, switched } from './choice';
import { samplePage } from './home.testkit';

const { price } = samplePage().document;

describe('a choice of groups', () => {
  it('finds the sums of a set whatever the order of its groups', () => {
    expect(combinationOf(price, new Set(['bed', 'path']))?.totalMinor).toBe(341_700);
    expect(combinationOf(price, new Set(['wall', 'bed', 'path']))?.subtotalMinor).toBe(462_000);
    expect(combinationOf(price, new Set(['path', 'nothing']))).toBeUndefined();
  });

  it('begins with what is offered, or with the first that can be had', () => {
    expect(offered(price)?.groups).toEqual(['path', 'bed']);
    const [first, ...rest] = price.combinations;
    const combinations = [{ ...first!, offerable: false }, ...rest];
    expect(offered({ combinations })?.groups).toEqual([]);
  });

  it('switches a group on and off', () => {
    const on = switched(price, new Set(['path', 'bed']), 'wall');
    expect(on).toEqual({ kind: 'taken', choice: new Set(['path', 'bed', 'wall']) });
    const off = switched(price, new Set(['path', 'bed', 'wall']), 'path');
    expect(off).toEqual({ kind: 'taken', choice: new Set(['bed', 'wall']) });
  });

  it('refuses what cannot be had, says why and names the nearest that can', () => {
    const refused = switched(price, new Set(['path', 'bed', 'wall']), 'bed');
    expect(refused).toMatchObject({ kind: 'refused', instead: new Set(['path']) });
    expect(refused.kind === 'refused' && refused.reason).toContain('Without the shrub bed');
    // Meant on, it stays on in what is named instead.
    expect(switched(price, new Set(['path']), 'wall')).toMatchObject({
      kind: 'refused',
      instead: new Set(['path', 'bed', 'wall']),
    });
  });

  it('names nothing where nothing can be had', () => {
    const combinations = price.combinations.map((sums) => ({ ...sums, offerable: false, reason: '' }));
    expect(switched({ ...price, combinations }, new Set(['path']), 'bed')).toEqual({
      kind: 'refused',
      reason: 'These parts cannot be had together as they are planned.',
      instead: null,
    });
  });
});

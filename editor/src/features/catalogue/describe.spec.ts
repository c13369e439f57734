import { expect, it } from 'vitest';
import { everyForm } from './catalogue.testkit';
import { describe, lightFacts } from './describe';

const named = (name: string) => everyForm.find((item) => item.name === name)!;
const of = (name: string) => describe(named(name));

it('tells what an item is, its figures and what it is rated for', () => {
  expect(of('Path light')).toEqual({
    sort: 'Path',
    figures: '3 W · 190 lm · 130° · 2700 K',
    rating: '9 to 15 V',
  });
  expect(of('Up-light for a lamp')).toEqual({
    sort: 'Up',
    figures: 'takes a GU5.3 lamp',
    rating: 'up to 35 W',
  });
  expect(of('Strip').figures).toBe('0.35 A');
  expect(of('2.5 mm²')).toEqual({ sort: 'In conduit or above ground', figures: '2.5 mm²', rating: '' });
});

it('names each tap voltage of a transformer once', () => {
  expect(of('Two windings')).toEqual({
    sort: 'DC · 2 windings',
    figures: '12 V · 2 commons',
    rating: '600 VA',
  });
});

it('tells of its light what the list has no room for', () => {
  expect(of('Smart LED, measured').figures).toBe('5 W · 190 lm · 130° · 2700 K · smart');
  expect(lightFacts(named('Smart LED, measured'))).toEqual([
    '950 cd in the middle of its beam',
    'Switched by itself, apart from its feed',
  ]);
  expect(lightFacts(named('Path light'))).toEqual(['Holds back 29 % of the light outside of its beam']);
  expect(lightFacts(named('Halogen, 20 W'))).toEqual([]);
  expect(lightFacts(named('12 AWG'))).toEqual([]);
});

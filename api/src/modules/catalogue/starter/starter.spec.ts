import { type Conductor, catalogueItemSchema, fixtureKinds } from '@lampwright/geometry/catalogue';
import { partUses } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import { starterCatalogue } from './index.js';

const of = (category: string) => starterCatalogue.filter((item) => item.category === category);

describe('the starter catalogue', () => {
  it('holds only items that its own editor would accept', () => {
    for (const item of starterCatalogue)
      expect(catalogueItemSchema.safeParse(item).error?.issues ?? [], item.name).toEqual([]);
  });

  it('names nothing twice', () => {
    const names = starterCatalogue.map((item) => item.name);
    expect(names.filter((name, i) => names.indexOf(name) !== i)).toEqual([]);
  });

  it('has every kind of fixture, and a lamp for every base', () => {
    const kinds = new Set(
      starterCatalogue.flatMap((item) => (item.category === 'fixture' ? [item.kind] : [])),
    );
    expect(fixtureKinds.filter((kind) => !kinds.has(kind))).toEqual([]);
    const bases = new Set(starterCatalogue.flatMap((item) => (item.category === 'lamp' ? [item.base] : [])));
    for (const item of starterCatalogue)
      if (item.category === 'fixture' && item.light === 'lamp') expect(bases).toContain(item.base);
  });

  it('has the usual gauges and sizes', () => {
    const conductors = starterCatalogue.flatMap((item) =>
      item.category === 'cable' ? [item.conductor] : [],
    );
    for (const awg of [8, 10, 12, 14, 16, 18]) expect(conductors).toContainEqual({ awg });
    for (const mm2 of [1.5, 2.5, 4, 6]) expect(conductors).toContainEqual({ mm2 });
    const sizes = starterCatalogue.flatMap((item) => (item.category === 'transformer' ? [item.ratedVA] : []));
    for (const size of [150, 300, 600, 900]) expect(sizes).toContain(size);
    for (const category of ['hub', 'connector', 'control']) expect(of(category).length).toBeGreaterThan(1);
  });

  it('has a connector for every gauge beside every lead', () => {
    const gauge = (conductor: Conductor) => ('awg' in conductor ? [conductor.awg] : []);
    const leads = starterCatalogue.flatMap((i) => (i.category === 'fixture' ? gauge(i.lead.conductor) : []));
    const cables = starterCatalogue.flatMap((i) => (i.category === 'cable' ? gauge(i.conductor) : []));
    for (const awg of cables)
      for (const conductors of [2, 3, 4, 5])
        for (const lead of leads)
          expect(
            starterCatalogue.some(
              (i) =>
                i.category === 'connector' &&
                i.directBurial &&
                i.minConductors <= conductors &&
                i.maxConductors >= conductors &&
                i.largestAwg <= Math.min(awg, lead) &&
                i.smallestAwg >= Math.max(awg, lead),
            ),
            `${conductors} of ${awg} AWG with a lead of ${lead} AWG`,
          ).toBe(true);
  });

  it('has a part for everything that a bill asks for', () => {
    const uses = new Set<string>(
      starterCatalogue.flatMap((item) => (item.category === 'part' ? [item.use] : [])),
    );
    expect(partUses.filter((use) => !uses.has(use))).toEqual([]);
  });

  it('has an LED lamp of 4 W that draws 5.5 VA', () => {
    const lamp = starterCatalogue.find(
      (item) => item.category === 'lamp' && item.name.includes('LED lamp GU5.3, 4 W'),
    );
    if (lamp?.category !== 'lamp' || lamp.load.kind !== 'driver') throw new Error('missing');
    expect(lamp.load.watts / (lamp.load.powerFactor ?? 1)).toBeCloseTo(5.5, 2);
  });
});

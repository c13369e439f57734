import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { defaultSettings, planOf } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { cable12, choices, pathLight, transformer300, yardWith } from '../tools/driver.testkit';
import { firstChoices, lampsFor, pickItems, transformerPicks } from './items';

const halogen = (base: string, watts: number): CatalogueItem => ({
  category: 'lamp',
  name: `${base} halogen, ${watts} W`,
  base,
  technology: 'halogen',
  load: { kind: 'filament', watts, ratedVolts: 12 },
  window: { minVolts: 10.8, maxVolts: 12.6 },
  target: null,
  lumens: null,
  beamDegrees: null,
  cctKelvin: null,
  lifeHours: null,
});
const wash: CatalogueItem = {
  category: 'fixture',
  name: 'Wall wash',
  kind: 'wall-wash',
  lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
  mountingHeightMeters: null,
  wetListed: false,
  light: 'lamp',
  base: 'G4',
  maxWatts: 20,
};
const metric: CatalogueItem = {
  ...cable12,
  category: 'cable',
  name: '4 mm² cable',
  conductor: { mm2: 4 },
} as CatalogueItem;
const entries = [
  { id: 'wash', item: wash },
  { id: 'path', item: pathLight },
  { id: 'metric', item: metric },
  { id: 'c12', item: cable12 },
  { id: 't300', item: transformer300 },
  { id: 'strong', item: halogen('G4', 35) },
  { id: 'fits', item: halogen('G4', 20) },
  { id: 'other', item: halogen('GU5.3', 20) },
];
const nothing = { ...choices, fixture: null, cable: null, transformer: null };
const empty = planOf([defaultSettings('us')]);

describe('what can be placed', () => {
  it('is the catalogue, and what the plan still has of items that left it', () => {
    const d = yardWith(1);
    expect(pickItems(d.doc, entries, 'fixture').map((p) => p.key)).toEqual(['path', 'wash']);
    const gone = pickItems(d.doc, [], 'fixture');
    expect(gone.map((p) => p.item.name)).toEqual([pathLight.name]);
    expect(gone[0]!.choice).toHaveProperty('itemId');
  });

  it('offers lamps of the base that are not too strong', () => {
    const lamps = pickItems(empty, entries, 'lamp');
    expect(lampsFor(wash as Extract<typeof wash, { category: 'fixture' }>, lamps).map((l) => l.key)).toEqual([
      'fits',
    ]);
  });
});

describe('first choices', () => {
  it('are a path light and the everyday cable of the region', () => {
    const us = firstChoices(empty, entries, nothing);
    expect(us.fixture?.initial).toBe('P');
    expect(us.cable).toMatchObject({ sourceId: 'c12' });
    const iec = firstChoices(planOf([defaultSettings('iec')]), entries, nothing);
    expect(iec.cable).toMatchObject({ sourceId: 'metric' });
  });

  it('are a transformer for the plan’s line volts, though others are smaller', () => {
    const foreign = { ...transformer300, ratedVA: 60, nominalLineVolts: 230 };
    const both = [{ id: 't60', item: foreign }, ...entries];
    expect(firstChoices(empty, both, nothing).transformer).toMatchObject({ item: { sourceId: 't300' } });
    const iec = planOf([defaultSettings('iec')]);
    expect(firstChoices(iec, both, nothing).transformer).toMatchObject({ item: { sourceId: 't60' } });
    expect(transformerPicks(iec, both).map((pick) => pick.key)).toEqual(['t60', 't300']);
  });

  it('take the cable that the plan uses most', () => {
    const d = yardWith(1);
    d.choices = { ...d.choices, cable: { sourceId: 'metric', item: metric } };
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    expect(firstChoices(d.doc, entries, nothing).cable).toMatchObject({ sourceId: 'metric' });
  });

  it('leave alone what the person has chosen', () => {
    expect(firstChoices(empty, entries, choices)).toEqual(choices);
  });
});

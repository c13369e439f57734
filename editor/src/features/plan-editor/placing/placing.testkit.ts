import type { CatalogueItem, FixtureItem, LampItem } from '@lampwright/geometry/catalogue';
import type { CatalogueEntry } from '../page/items';
import { pathLight } from '../tools/driver.testkit';

type Integrated = Extract<FixtureItem, { light: 'integrated' }>;

const integrated = (
  name: string,
  kind: FixtureItem['kind'],
  lumens: number,
  beamDegrees: number,
): Integrated => ({
  ...(pathLight as Integrated),
  name,
  kind,
  lumens,
  beamDegrees,
  load: { kind: 'driver', watts: lumens / 80, powerFactor: 0.9, minVolts: 9 },
});

const lamp: LampItem = {
  category: 'lamp',
  name: 'LED reflector lamp, 4 W',
  base: 'MR16',
  technology: 'led',
  load: { kind: 'driver', watts: 4, powerFactor: 0.9, minVolts: 9 },
  window: { minVolts: 9, maxVolts: 15 },
  target: { minVolts: 10.5, maxVolts: 13 },
  lumens: 320,
  beamDegrees: 36,
  cctKelvin: 2700,
  lifeHours: null,
};

const bullet: FixtureItem = {
  category: 'fixture',
  name: 'Bullet up-light',
  kind: 'up',
  lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
  mountingHeightMeters: null,
  wetListed: true,
  light: 'lamp',
  base: 'MR16',
  maxWatts: 35,
};

const entry = (id: string, item: CatalogueItem): CatalogueEntry => ({ id, item });

/** A small catalogue with lights for a path, a tree and a wall. */
export const entries: readonly CatalogueEntry[] = [
  entry('path', integrated('Path light, 3 W', 'path', 190, 130)),
  entry('path-faint', integrated('Path light, 1 W', 'path', 60, 130)),
  entry('bullet', bullet),
  entry('lamp', lamp),
  entry('wash', integrated('Wall wash, 110°', 'wall-wash', 430, 110)),
];

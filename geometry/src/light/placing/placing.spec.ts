import { describe, expect, it } from 'vitest';
import type { CatalogueItem, FixtureItem, LampItem } from '../../catalogue/index.js';
import { halogenLamp, pathLight, upLight } from '../../plan/plan.testkit.js';
import { luxAlong } from '../grid.js';
import { groundLux, luxAt } from '../illuminance.js';
import { building, crown, spaceWith, wall } from '../light.testkit.js';
import { shortOf } from '../target.js';
import {
  candidatesOf,
  type NoProposal,
  type Offer,
  onSheet,
  type Proposal,
  proposePath,
  proposeTree,
  proposeWall,
  spaceOfLights,
} from './index.js';

type Integrated = Extract<FixtureItem, { light: 'integrated' }>;
const fixture = (
  name: string,
  kind: FixtureItem['kind'],
  lumens: number,
  beamDegrees: number,
  heightMeters: number,
): Integrated => ({
  ...(pathLight as Integrated),
  name,
  kind,
  lumens,
  beamDegrees,
  mountingHeightMeters: heightMeters,
  load: { kind: 'driver', watts: lumens / 80, powerFactor: 0.9, minVolts: 9 },
});

const offers = (...items: CatalogueItem[]): Offer[] => items.map((item) => ({ sourceId: item.name, item }));

const path3 = fixture('Path light, 3 W', 'path', 190, 130, 0.5);
const path1 = fixture('Path light, 1 W', 'path', 60, 130, 0.4);
const bollard = fixture('Bollard, 8 W', 'bollard', 420, 360, 0.9);
const narrow = fixture('Up-light, 15°', 'up', 500, 15, 0.1);
const medium = fixture('Up-light, 36°', 'up', 300, 36, 0.1);
const strong = fixture('Up-light, 36°, strong', 'up', 900, 36, 0.1);
const wash = fixture('Wall wash, 110°', 'wall-wash', 430, 110, 0.15);
const flood = fixture('Flood, 60°', 'flood', 1000, 60, 0.3);
const catalogue = offers(path3, path1, bollard, narrow, medium, strong, wash, flood);

const metric = { system: 'metric', light: 'lux' } as const;
const open = spaceWith({});

function taken(result: Proposal | NoProposal): Proposal {
  if (result.kind === 'refused') throw new Error(result.message);
  return result;
}

/** The proposed lights in their surroundings, worked out from nothing but the proposal. */
function litBy(proposal: Proposal, space = open) {
  const [candidate] = candidatesOf(
    [proposal.fixture, ...(proposal.lamp ? [proposal.lamp] : [])],
    [proposal.fixture.item.kind],
  );
  return spaceOfLights(candidate!, proposal.lights, space);
}

describe('candidates', () => {
  it('are fixtures of the kind with every lamp that fits base and watts, and no fixture without a lamp', () => {
    const lamp: LampItem = { ...halogenLamp, base: 'MR16' };
    const strongLamp: LampItem = {
      ...lamp,
      name: 'Too much',
      load: { kind: 'filament', watts: 50, ratedVolts: 12 },
    };
    const other: LampItem = { ...lamp, name: 'Other base', base: 'G4' };
    const found = candidatesOf(offers(upLight, medium, lamp, strongLamp, other, path3), ['up']);
    expect(found.map(({ name }) => name)).toEqual([
      'Bronze up light with Halogen reflector lamp, 35 W',
      'Up-light, 36°',
    ]);
    expect(found[0]?.lamp?.item).toEqual(lamp);
    expect(candidatesOf(offers(upLight), ['up'])).toEqual([]);
  });
});

describe('path lights', () => {
  const line = [
    { x: 0, y: 0 },
    { x: 20, y: 0 },
  ];
  const asked = { line, widthMeters: 1.2, arrangement: 'alternating' } as const;
  const park = { leastLux: 1, meanLux: null, uniformity: null };

  it('are as far apart as the target allows, and meet it on the path', () => {
    const proposal = taken(proposePath({ ...asked, target: park }, catalogue, open, metric));
    expect(proposal.short).toEqual([]);
    const figures = luxAlong(litBy(proposal), line, 1.2)!;
    expect(shortOf(figures, park)).toEqual([]);
    expect(proposal.why[0]).toMatch(/lights?, \d\.\d\d m apart, on both sides in turn\.$/);
    // Two fewer would not do: the proposal is no waste.
    const count = proposal.lights.length - 2;
    const thinner = Array.from({ length: count }, (_, i) => ({
      at: { x: ((i + 0.5) * 20) / count, y: i % 2 === 0 ? 0.8 : -0.8 },
      aim: null,
    }));
    const capped = 20 / proposal.lights.length > 3.9;
    const dim = luxAlong(litBy({ ...proposal, lights: thinner }), line, 1.2)!;
    expect(capped || shortOf(dim, park).length > 0).toBe(true);
  });

  it('come closer together the more light is asked for', () => {
    const counts = [0.5, 1, 2, 4].map(
      (leastLux) =>
        taken(proposePath({ ...asked, target: { ...park, leastLux } }, offers(path3), open, metric)).lights
          .length,
    );
    expect(counts).toEqual([...counts].sort((a, b) => a - b));
    expect(counts[3]).toBeGreaterThan(counts[0]!);
  });

  it('stand beside the path, in turn or on the side asked for', () => {
    const { lights } = taken(proposePath({ ...asked, target: park }, catalogue, open, metric));
    expect(lights.every(({ at }, i) => Math.abs(at.y - (i % 2 === 0 ? 0.8 : -0.8)) < 1e-9)).toBe(true);
    const right = taken(
      proposePath({ ...asked, arrangement: 'right', target: park }, catalogue, open, metric),
    );
    expect(right.lights.every(({ at }) => Math.abs(at.y + 0.8) < 1e-9)).toBe(true);
    expect(right.why[0]).toMatch(/on the right\.$/);
  });

  it('say what stays short where something shades the path', () => {
    const shaded = spaceWith({ walls: [wall([5, -0.7], [15, -0.7], 2), wall([5, 0.7], [15, 0.7], 2)] });
    const proposal = taken(proposePath({ ...asked, target: park }, catalogue, shaded, metric));
    expect(proposal.short[0]).toMatch(/^The darkest place.* at least 1 lx is wanted/);
  });

  it('are refused in words where nothing could do it', () => {
    expect(
      proposePath({ ...asked, target: { ...park, leastLux: 200 } }, offers(path1), open, metric),
    ).toEqual({
      kind: 'refused',
      message: expect.stringMatching(/^Path light, 1 W doesn’t give the light .* even 0\.60 m apart\./),
    });
    expect(proposePath({ ...asked, target: park }, offers(medium), open, metric)).toMatchObject({
      message: expect.stringMatching(/has no path light or bollard/),
    });
    const nowhere = { ...asked, line: [line[0]!, line[0]!], target: park };
    expect(proposePath(nowhere, catalogue, open, metric)).toMatchObject({
      message: expect.stringMatching(/no length/),
    });
  });
});

describe('lights for a tree', () => {
  const oak = crown([3, 4, 5], 2, 2.5, 'oak');

  it('stand under it on the side that it is seen from, and light that side', () => {
    const space = spaceWith({ crowns: [oak] });
    const seenFrom = { x: 3, y: -6 };
    const proposal = taken(proposeTree({ crown: oak, seenFrom }, catalogue, space, 'lux'));
    expect(['up', 'flood']).toContain(proposal.fixture.item.kind);
    for (const { at, aim } of proposal.lights) {
      expect(at.y).toBeLessThan(4);
      expect(Math.hypot(at.x - 3, at.y - 4)).toBeCloseTo(1, 9);
      expect(aim).toEqual({ at: { x: 3, y: 4 }, heightMeters: 5 });
    }
    const lit = litBy(proposal, space);
    const low = { x: 3, y: 4 - 2 * Math.SQRT1_2, z: 5 - 2.5 * Math.SQRT1_2 };
    const lux = luxAt(lit, low, { x: 0, y: -Math.SQRT1_2, z: -Math.SQRT1_2 });
    expect(lux).toBeGreaterThan(5);
    expect(lux).toBeLessThan(600);
    expect(proposal.why).toHaveLength(3);
  });

  it('take the beam that fills the crown', () => {
    const tall = crown([0, 0, 8], 1.2, 3, 'poplar');
    const space = spaceWith({ crowns: [tall] });
    const seenFrom = { x: 0, y: -10 };
    const wide = fixture('Up-light, 100°', 'up', 900, 100, 0.1);
    const same = fixture('Up-light, 24°', 'up', 560, 24, 0.1);
    const proposal = taken(proposeTree({ crown: tall, seenFrom }, offers(wide, same), space, 'lux'));
    expect(proposal.fixture.item.name).toBe('Up-light, 24°');
  });

  it('are more for a wider crown, and all around where no side is the front', () => {
    const count = (radius: number) => {
      const tree = crown([0, 0, 4], radius, 2);
      return taken(
        proposeTree({ crown: tree, seenFrom: null }, catalogue, spaceWith({ crowns: [tree] }), 'lux'),
      ).lights.length;
    };
    expect(count(3)).toBeGreaterThan(count(1));
    const tree = crown([0, 0, 4], 3, 2);
    const { lights } = taken(
      proposeTree({ crown: tree, seenFrom: null }, catalogue, spaceWith({ crowns: [tree] }), 'lux'),
    );
    const middle = lights.reduce((sum, { at }) => ({ x: sum.x + at.x, y: sum.y + at.y }), { x: 0, y: 0 });
    expect(Math.hypot(middle.x, middle.y)).toBeLessThan(1e-9);
  });

  it('stand before a shrub, not within it', () => {
    const shrub = crown([0, 0, 0.8], 0.9, 0.8);
    const weak = fixture('Small up-light, 60°', 'up', 90, 60, 0.1);
    const { lights } = taken(
      proposeTree(
        { crown: shrub, seenFrom: { x: 0, y: -5 } },
        offers(weak),
        spaceWith({ crowns: [shrub] }),
        'lux',
      ),
    );
    for (const { at } of lights) expect(Math.hypot(at.x, at.y)).toBeGreaterThan(0.9);
  });

  it('are refused in words where nothing fits', () => {
    const space = spaceWith({ crowns: [oak] });
    const faint = fixture('Marker, 160°', 'up', 5, 160, 0.1);
    expect(proposeTree({ crown: oak, seenFrom: null }, offers(faint), space, 'lux')).toEqual({
      kind: 'refused',
      message: expect.stringMatching(
        /^Marker, 160° doesn’t fit this tree: it asks for a beam of about \d+° .* Marker, 160°, has 160° and gives 0\.\d+ lx\.$/,
      ),
    });
    expect(proposeTree({ crown: oak, seenFrom: null }, offers(path3), space, 'lux').kind).toBe('refused');
  });
});

describe('lights for a wall', () => {
  const foot = [
    { x: 0, y: 0 },
    { x: 9, y: 0 },
  ];
  const house = building(
    [
      [0, 0],
      [9, 0],
      [9, 6],
      [0, 6],
    ],
    4,
  );
  const asked = { foot, heightMeters: 4, front: { x: 4, y: -5 } };

  it('stand before it, light it evenly, and nothing inside', () => {
    const proposal = taken(proposeWall(asked, catalogue, spaceWith(house), metric));
    const lit = litBy(proposal, spaceWith(house));
    for (const { at, aim } of proposal.lights) {
      expect(at.y).toBeLessThan(0);
      expect(aim?.at.x).toBeCloseTo(at.x, 9);
    }
    const along = Array.from({ length: 40 }, (_, i) =>
      luxAt(lit, { x: (9 * (i + 0.5)) / 40, y: 0, z: 2 }, { x: 0, y: -1, z: 0 }),
    );
    const mean = along.reduce((a, b) => a + b, 0) / along.length;
    expect(mean).toBeGreaterThan(5);
    expect(mean).toBeLessThan(300);
    expect(Math.min(...along) / mean).toBeGreaterThan(0.3);
    for (const x of [1, 4.5, 8]) expect(groundLux(lit, x, 3)).toBe(0);
  });

  it('stand on the other side when that is the front', () => {
    const behind = taken(proposeWall({ ...asked, front: { x: 4, y: 5 } }, catalogue, open, metric));
    expect(behind.lights.every(({ at }) => at.y > 0)).toBe(true);
  });

  it('are not refused for shrubs at its foot, and say that these are not counted', () => {
    const shrubs = [2, 4.5, 7].map((x, i) => crown([x, -0.5, 0.5], 0.5, 0.5, `shrub${i}`));
    const bare = taken(proposeWall(asked, catalogue, spaceWith(house), metric));
    const planted = taken(proposeWall(asked, catalogue, spaceWith({ ...house, crowns: shrubs }), metric));
    expect(planted.figures).toEqual(bare.figures);
    expect(planted.why.at(-1)).toMatch(/^Plants by the wall shade a part of it/);
    expect(bare.why.join(' ')).not.toMatch(/Plants/);
  });

  it('are more the longer the wall is', () => {
    const count = (length: number) =>
      taken(proposeWall({ ...asked, foot: [foot[0]!, { x: length, y: 0 }] }, catalogue, open, metric)).lights
        .length;
    expect(count(24)).toBeGreaterThan(count(6));
  });

  it('are refused in words where nothing fits', () => {
    const faint = fixture('Marker, 20°', 'up', 5, 20, 0.1);
    expect(proposeWall(asked, offers(faint), open, metric)).toEqual({
      kind: 'refused',
      message: expect.stringMatching(/^Marker, 20° doesn’t light this wall evenly/),
    });
    expect(proposeWall(asked, offers(path3), open, metric).kind).toBe('refused');
    expect(proposeWall({ ...asked, foot: [foot[0]!, foot[0]!] }, catalogue, open, metric)).toMatchObject({
      message: expect.stringMatching(/no length/),
    });
  });
});

describe('so many lights as are asked for', () => {
  const line = [
    { x: 0, y: 0 },
    { x: 20, y: 0 },
  ];
  const target = { leastLux: 1, meanLux: null, uniformity: null };

  it('stand along the path, and say what falls short', () => {
    const path = { line, widthMeters: 1.2, arrangement: 'left', target } as const;
    const few = taken(proposePath({ ...path, count: 2 }, offers(path1), open, metric));
    expect(few.lights.map(({ at }) => at.x)).toEqual([5, 15]);
    expect(few.short[0]).toMatch(/^The darkest place.* at least 1 lx is wanted/);
    expect(few.figures!.leastLux).toBeLessThan(1);
    const figures = luxAlong(litBy(few), line, 1.2)!;
    expect(few.figures).toEqual({
      on: 'path',
      meanLux: figures.meanLux,
      leastLux: figures.least.lux,
      evenness: figures.uniformity,
    });
    const many = taken(proposePath({ ...path, count: 30 }, offers(path1, path3), open, metric));
    expect([many.lights.length, many.short]).toEqual([30, []]);
  });

  it('stand by a tree that asks for others, and say what does not fit', () => {
    const tree = crown([0, 0, 4], 1.5, 2);
    const space = spaceWith({ crowns: [tree] });
    const faint = fixture('Marker, 160°', 'up', 5, 160, 0.1);
    const three = taken(proposeTree({ crown: tree, seenFrom: null, count: 3 }, offers(faint), space, 'lux'));
    expect(three.lights).toHaveLength(3);
    expect(three.short).toEqual([
      expect.stringMatching(/ is little for a tree: 10 lx to 250 lx is wanted\.$/),
      'The beam is too wide for this crown: much goes past it.',
    ]);
  });

  it('stand before a wall, whatever light they give', () => {
    const foot = [line[0]!, { x: 9, y: 0 }];
    const wall = { foot, heightMeters: 3, front: { x: 4, y: -5 } };
    const one = taken(proposeWall({ ...wall, count: 1 }, offers(narrow), open, metric));
    expect(one.lights).toHaveLength(1);
    expect(one.short.at(-1)).toMatch(/^It is uneven/);
  });

  it('are brighter where more light is wanted on a wall or a tree', () => {
    const wall = { foot: line, heightMeters: 3, front: { x: 4, y: -5 } };
    const lux = [15, 60].map(
      (wantedLux) => taken(proposeWall({ ...wall, wantedLux }, catalogue, open, metric)).figures!.meanLux,
    );
    expect(lux[1]).toBeGreaterThan(lux[0]!);
    const tree = crown([0, 0, 4], 1.5, 2);
    const onTree = [15, 120].map(
      (wantedLux) =>
        taken(
          proposeTree(
            { crown: tree, seenFrom: null, wantedLux },
            catalogue,
            spaceWith({ crowns: [tree] }),
            'lux',
          ),
        ).figures!.meanLux,
    );
    expect(onTree[1]).toBeGreaterThan(onTree[0]!);
  });
});

describe('a proposed light on a sheet', () => {
  const sheet = (p: { x: number; y: number }) => (p.y > 50 ? null : { x: 100 * p.x, y: -100 * p.y });

  it('has its place and aim in pixels, or none where the sheet doesn’t show it', () => {
    expect(onSheet({ at: { x: 1, y: 2 }, aim: null }, sheet)).toEqual({ at: { x: 100, y: -200 }, aim: null });
    expect(onSheet({ at: { x: 1, y: 2 }, aim: { at: { x: 2, y: 3 }, heightMeters: 4 } }, sheet)).toEqual({
      at: { x: 100, y: -200 },
      aim: { kind: 'point', at: { x: 200, y: -300 }, heightMeters: 4 },
    });
    expect(onSheet({ at: { x: 1, y: 60 }, aim: null }, sheet)).toBeNull();
    expect(onSheet({ at: { x: 1, y: 2 }, aim: { at: { x: 2, y: 60 }, heightMeters: 1 } }, sheet)).toBeNull();
  });
});

import { lengthOf, type Proposal, placeAlong } from '@lampwright/geometry/light';
import {
  apply,
  type EditResult,
  inverse,
  type MeasurementRecord,
  type PlanDocument,
  placeArea,
  placeFace,
  placeMeasurement,
  placeTree,
  planProblems,
  recordOf,
  recordsOf,
} from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { seeded } from '../../../../../geometry/src/plan/plan.testkit.js';
import { previewed } from '../night/previewed';
import { Driver, sheet, yardWith } from '../tools/driver.testkit';
import { lightsOn, placeLights, previewOf } from './place-lights';
import { entries } from './placing.testkit';
import {
  askingFor,
  choicesFor,
  firstWish,
  type Lightable,
  lightableOf,
  offersOf,
  type Wish,
} from './subject';
import { proposalOf } from './work';

const offers = offersOf(entries);
const units = { system: 'metric', light: 'lux' } as const;
const PIXELS_PER_METER = 100;

function put(doc: PlanDocument, result: EditResult): { doc: PlanDocument; record: Lightable } {
  if (result.kind !== 'change') throw new Error('it was refused');
  const next = apply(doc, result.change);
  return { doc: next, record: lightableOf(next, result.selected[0]!)! };
}

function propose(doc: PlanDocument, record: Lightable, fields: Partial<Wish> = {}) {
  const asking = askingFor(doc, record, { ...firstWish(doc, record), ...fields }, offers, units);
  if (asking.is !== 'ask') throw new Error(asking.is);
  return { result: proposalOf(asking.ask), scale: asking.scale, ask: asking.ask };
}

function placed(doc: PlanDocument, record: Lightable, fields: Partial<Wish> = {}) {
  const { result, scale } = propose(doc, record, fields);
  if (result.kind === 'refused') throw new Error(result.message);
  const lights = lightsOn(record.sheetId, scale, result);
  const edit = placeLights(doc, lights);
  if (edit.kind !== 'change') throw new Error('it was refused');
  return { proposal: result satisfies Proposal, scale, lights, edit, after: apply(doc, edit.change) };
}

const bare = () => new Driver().doc;

/** A path of two to five straight pieces that goes on to the right. */
function randomPath(random: () => number) {
  let at = { x: 100 + 200 * random(), y: 300 + 900 * random() };
  const points = [at];
  for (let i = 1 + Math.floor(4 * random()); i >= 0; i--) {
    at = { x: at.x + 100 + 200 * random(), y: at.y + 200 * (random() - 0.5) };
    points.push(at);
  }
  return points;
}

describe('lights proposed along a path', () => {
  it.each([11, 12, 13, 14, 15, 16])(
    'seed %i: lie along it at the spacing, and are placed in one change',
    (seed) => {
      const random = seeded(seed);
      const count = 1 + Math.floor(9 * random());
      const arrangement = (['alternating', 'left', 'right'] as const)[Math.floor(3 * random())]!;
      const widthMeters = 0.6 + random();
      const points = randomPath(random);
      const { doc, record } = put(bare(), placeMeasurement(bare(), { sheetId: 'sheet', points }));
      const { edit, after, lights } = placed(doc, record, { count, arrangement, widthMeters });

      const fixtures = edit.selected.map((id) => recordOf(after, id, 'fixture')!);
      expect(fixtures).toHaveLength(count);
      const length = lengthOf(points);
      const off = (widthMeters / 2 + 0.2) * PIXELS_PER_METER;
      fixtures.forEach((fixture, i) => {
        const on = placeAlong(points, ((i + 0.5) * length) / count);
        // Left of the way is up or down as the ground's axes lie, so only the distance and the change of sides count.
        expect(Math.hypot(fixture.at.x - on.x, fixture.at.y - on.y)).toBeCloseTo(off, 4);
      });
      const sides = fixtures.map((fixture, i) => {
        const { x, y, nx, ny } = placeAlong(points, ((i + 0.5) * length) / count);
        return Math.sign((fixture.at.x - x) * nx + (fixture.at.y - y) * ny);
      });
      for (const [i, side] of sides.entries())
        if (i > 0) expect(side === sides[i - 1]).toBe(arrangement !== 'alternating');

      expect(planProblems(after)).toEqual([]);
      expect(new Set(fixtures.map((f) => f.number)).size).toBe(count);
      // One copy of the item for all of them.
      expect([...recordsOf(after, 'item')].length).toBe([...recordsOf(doc, 'item')].length + 1);
      const undone = apply(after, inverse(doc, edit.change, 'undo'));
      expect([...undone.entries()].sort()).toEqual([...doc.entries()].sort());
      expect(lights.lights.map(({ at }) => at)).toEqual(fixtures.map(({ at }) => at));
    },
  );

  it('take their target from the path, and are more the more is wanted', () => {
    const points = [
      { x: 100, y: 500 },
      { x: 1300, y: 500 },
    ];
    const { doc, record } = put(bare(), placeMeasurement(bare(), { sheetId: 'sheet', points }));
    const wanting = (leastLux: number) => {
      const target = { leastLux, meanLux: null, uniformity: null };
      const path: MeasurementRecord = { ...(record as MeasurementRecord), lightTarget: target };
      const next = new Map(doc).set(path.id, path);
      expect(firstWish(next, path).target).toEqual(target);
      return placed(next, path).edit.selected.length;
    };
    expect(wanting(3)).toBeGreaterThan(wanting(0.5));
  });

  it('are of the item that was chosen', () => {
    const points = [
      { x: 100, y: 500 },
      { x: 900, y: 500 },
    ];
    const { doc, record } = put(bare(), placeMeasurement(bare(), { sheetId: 'sheet', points }));
    expect(choicesFor(record, offers).map(({ name }) => name)).toEqual([
      'Path light, 1 W',
      'Path light, 3 W',
    ]);
    const { proposal } = placed(doc, record, { candidateKey: 'path-faint ' });
    expect(proposal.fixture.item.name).toBe('Path light, 1 W');
  });
});

describe('lights proposed for a tree', () => {
  const outline = [
    { x: 700, y: 700 },
    { x: 1000, y: 700 },
    { x: 1000, y: 1000 },
    { x: 700, y: 1000 },
  ];
  const planted = (doc = bare()) =>
    put(
      doc,
      placeTree(doc, {
        sheetId: 'sheet',
        foot: { x: 850, y: 850 },
        outline,
        heightMeters: 6,
        crownBaseMeters: 2,
      }),
    );

  it('have their lamps, and are aimed at the crown', () => {
    const { doc, record } = planted();
    const { edit, after } = placed(doc, record, { count: 2 });
    for (const id of edit.selected) {
      const fixture = recordOf(after, id, 'fixture')!;
      expect(recordOf(after, fixture.lampId, 'item')?.item.name).toBe('LED reflector lamp, 4 W');
      expect(fixture.aim).toEqual({
        kind: 'point',
        at: { x: expect.closeTo(850, 4), y: expect.closeTo(850, 4) },
        heightMeters: 4,
      });
    }
  });

  it('stand on the side of the house where it is seen from there', () => {
    const corners = [
      { x: 100, y: 100 },
      { x: 400, y: 100 },
      { x: 400, y: 400 },
    ];
    const house = placeArea(bare(), {
      sheetId: 'sheet',
      use: 'building',
      points: corners,
      heightMeters: 3,
    });
    if (house.kind !== 'change') throw new Error('it was refused');
    const { doc, record } = planted(apply(bare(), house.change));
    const { lights } = placed(doc, record, { count: 1, seenFrom: 'house' });
    expect(lights.lights[0]!.at.x).toBeLessThan(850);
    expect(lights.lights[0]!.at.y).toBeLessThan(850);
  });
});

describe('lights proposed for a wall', () => {
  const wall = (doc: PlanDocument) =>
    put(
      doc,
      placeFace(doc, {
        sheetId: 'sheet',
        foot: [
          { x: 200, y: 600 },
          { x: 800, y: 600 },
        ],
        top: null,
        heightMeters: 3,
      }),
    );
  const house = (): PlanDocument => {
    const result = placeArea(bare(), {
      sheetId: 'sheet',
      use: 'building',
      points: [
        { x: 200, y: 600 },
        { x: 800, y: 600 },
        { x: 800, y: 1000 },
        { x: 200, y: 1000 },
      ],
      heightMeters: 3,
    });
    if (result.kind !== 'change') throw new Error('it was refused');
    return apply(bare(), result.change);
  };

  it('stand outside of its house, or on the other side when that is asked for', () => {
    const { doc, record } = wall(house());
    const { lights } = placed(doc, record);
    expect(lights.lights.length).toBeGreaterThan(0);
    for (const { at, aim } of lights.lights) {
      expect(at.y).toBeLessThan(600);
      expect(aim).toMatchObject({ kind: 'point', at: { y: expect.closeTo(600, 4) } });
    }
    const free = wall(bare());
    const sides = (['front', 'back'] as const).map((side) =>
      Math.sign(placed(free.doc, free.record, { side, count: 2 }).lights.lights[0]!.at.y - 600),
    );
    expect(sides[0]).toBe(-sides[1]!);
  });
});

describe('a proposal that can’t be', () => {
  const points = [
    { x: 100, y: 500 },
    { x: 900, y: 500 },
  ];

  it('waits for the scale', () => {
    const doc = new Driver([{ ...sheet, references: [] }]).doc;
    const { doc: next, record } = put(doc, placeMeasurement(doc, { sheetId: 'sheet', points }));
    expect(askingFor(next, record, firstWish(next, record), offers, units)).toEqual({ is: 'no-scale' });
  });

  it('is refused in words when the catalogue has nothing for it', () => {
    const { doc, record } = put(bare(), placeMeasurement(bare(), { sheetId: 'sheet', points }));
    const asking = askingFor(doc, record, firstWish(doc, record), [], units);
    expect(asking.is === 'ask' && proposalOf(asking.ask)).toEqual({
      kind: 'refused',
      message: 'The catalogue has no path light or bollard with a lamp that fits; add one first.',
    });
  });
});

describe('lights that are proposed', () => {
  it('are in the plan that the night picture is made from, and not in the plan itself', () => {
    const yard = yardWith(1);
    const points = [
      { x: 100, y: 500 },
      { x: 900, y: 500 },
    ];
    const { doc, record } = put(yard.doc, placeMeasurement(yard.doc, { sheetId: 'sheet', points }));
    const { proposal, scale, lights } = placed(doc, record, { count: 3 });
    const preview = previewOf(doc, scale, proposal, lights);
    const before = [...doc.keys()];
    const shown = previewed(doc, preview);
    expect([...recordsOf(shown, 'fixture')]).toHaveLength(4);
    expect([...doc.keys()]).toEqual(before);
    // The same lamps for the same proposal: their light is worked out once.
    expect([...previewed(doc, preview).keys()]).toEqual([...shown.keys()]);
    expect(preview.aims).toEqual([]);
  });
});

import type { PlanBuilder, Point } from '../plan-builder.js';
import { oval } from './oval.js';

/** The page at 200 dots per inch, as it is stored. */
export const SANDPIPER_ROW_SHEET = { widthPx: 2200, heightPx: 3400, view: 'plan' } as const;

/** 1 in = 10 ft. */
const DRAWING_SCALE = 120;
const PIXELS_PER_FOOT = 20;
/** The north-west corner of the lot on the sheet. */
const CORNER: Point = [266.67, 360];

/** A place in feet east and south of the lot's north-west corner. */
const at = (east: number, south: number): Point => [
  CORNER[0] + east * PIXELS_PER_FOOT,
  CORNER[1] + south * PIXELS_PER_FOOT,
];
const box = (west: number, north: number, east: number, south: number): Point[] => [
  at(west, north),
  at(east, north),
  at(east, south),
  at(west, south),
];

const HALOGEN = 'Halogen lamp G4, 20 W';
const LED = 'LED lamp GU5.3, 7 W, 24°';
const HEAVY = '10 AWG landscape cable, 2-core';
const USUAL = '12 AWG landscape cable, 2-core';

interface PlottedTree {
  readonly name: string;
  readonly at: Point;
  /** Of the crown on the drawing. */
  readonly radiusFeet: number;
  readonly heightMeters: number;
  readonly crownBaseMeters: number;
  /** The middle of the crown, where lights point. */
  readonly aimMeters: number;
}

const tree = (
  name: string,
  place: Point,
  radiusFeet: number,
  heightMeters: number,
  crownBaseMeters: number,
): PlottedTree => ({
  name,
  at: place,
  radiusFeet,
  heightMeters,
  crownBaseMeters,
  aimMeters: (heightMeters + crownBaseMeters) / 2,
});

/** In the order in which their lights stand on the cable. */
const westTrees = [
  tree('Crab apple', at(5, 80), 4.2, 3.6, 1.2),
  tree('Dogwood', at(6, 66), 4.2, 3.6, 1.2),
  tree('Serviceberry', at(5, 40), 4.2, 3.6, 1.2),
  tree('Redbud', at(6, 28), 4.2, 3.6, 1.2),
];
const northTrees = [
  tree('Hornbeam', at(8, 8), 6.3, 6.5, 1.8),
  tree('Birch', at(24, 7), 5.2, 7, 2),
  tree('Oak', at(66, 7), 7.3, 8, 2.4),
  tree('Hawthorn', at(75, 8), 5.2, 5, 1.6),
];
const maple = tree('Maple', at(75, 48), 7.3, 8, 2.4);
const unlitTrees = [tree('Lime', at(12, 114), 9.6, 10, 2.8), tree('Street tree', at(72, 122), 5.2, 6, 2.2)];

/**
 * A plot plan with an older system: the front walk is fed from behind the house and still has halogen lamps,
 * so that the far end of a long feed is dim even on heavy cable. The west bed has smart lamps that go off earlier.
 */
export function drawSandpiperRow(plan: PlanBuilder): void {
  plan.calibrate([], DRAWING_SCALE);
  drawGround(plan);
  drawTrees(plan);
  const transformer = plan.transformer('Multi-tap transformer, 300 VA', at(22, 63.4), 'Rear wall');
  plan.set([transformer], 'transformer', { lineVolts: 118 });
  drawFrontWalk(plan, transformer);
  drawWestBed(plan, transformer);
  drawNorthBed(plan, transformer);
  drawPatio(plan, transformer);
  plan.note(at(13, 61), 'Outdoor outlet: GFCI with an in-use cover, 20 A circuit.');
}

function drawFrontWalk(plan: PlanBuilder, transformer: string): void {
  const bed = plan.fixtures('Copper up-light, 4 W, 36°', [at(17.5, 96), at(27, 96)]);
  for (const [i, east] of [17.5, 27].entries()) plan.aim([bed[i]!], at(east, 92), 2);
  const walk = plan.fixtures(
    'Copper path light, G4 lamp',
    [at(30.8, 100), at(30.8, 106), at(30.8, 112), at(39, 118.5), at(48, 118.5)],
    HALOGEN,
  );
  const [feed] = plan.cable(HEAVY, [transformer, at(12.4, 63), at(12.4, 95), ...bed]);
  plan.land(feed!, 'Front walk', '13V', 'C1');
  // Around the corner of the walk, not beneath it.
  plan.cable(HEAVY, [bed[1]!, ...walk.slice(0, 3), at(30.8, 118.5), ...walk.slice(3)]);
}

function drawWestBed(plan: PlanBuilder, transformer: string): void {
  const [south, middle, north, far] = plan.fixtures(
    'Bullet up-light, GU5.3 lamp',
    [at(7.6, 79), at(8.2, 65), at(7.4, 41.5), at(8.2, 29.5)],
    'Smart LED lamp GU5.3, 4 W, 36°',
  );
  const beds = [south!, middle!, north!, far!];
  for (const [i, tree] of westTrees.entries()) plan.aim([beds[i]!], tree.at, tree.aimMeters);
  plan.zone(
    'West side',
    { on: { kind: 'sunset', minutesAfter: 30 }, off: { kind: 'clock', at: '22:00' } },
    beds,
  );
  const [feed] = plan.cable(USUAL, [transformer, at(14, 61.5), middle!]);
  plan.land(feed!, 'West bed', '12V', 'C2');
  plan.cable(USUAL, [middle!, south!]);
  plan.cable(USUAL, [middle!, north!, far!]);
}

function drawNorthBed(plan: PlanBuilder, transformer: string): void {
  const hub = plan.hub('Buried junction hub, 4-way', at(27, 11.5));
  const [feed] = plan.cable(HEAVY, [transformer, at(23, 60), at(24, 46), at(24.5, 16), hub]);
  plan.land(feed!, 'North bed', '13V', 'C2');
  const trees = plan.fixtures(
    'Bullet up-light, GU5.3 lamp',
    [at(10, 9.5), at(25, 8.8), at(64, 9), at(73, 9.8)],
    LED,
  );
  for (const [i, { at: tree, aimMeters }] of northTrees.entries()) plan.aim([trees[i]!], tree, aimMeters);
  plan.cable(USUAL, [hub, trees[0]!]);
  plan.cable(USUAL, [hub, trees[1]!]);
  plan.cable(HEAVY, [hub, at(45, 10.6), trees[2]!, trees[3]!]);
}

function drawPatio(plan: PlanBuilder, transformer: string): void {
  const west = plan.fixtures('Low spread light, 2 W', [at(28.8, 56), at(28.8, 50)]);
  const east = plan.fixtures('Low spread light, 2 W', [at(61.2, 56), at(61.2, 50)]);
  const tree = plan.fixtures('Brass up-light, 7 W, 24°', [at(72.4, 49.6), at(76.6, 50.4)]);
  plan.aim(tree, maple.at, maple.aimMeters);
  const [feed] = plan.cable(USUAL, [transformer, west[0]!]);
  plan.land(feed!, 'Patio and maple', '12V', 'C2');
  plan.cable(USUAL, [west[0]!, west[1]!]);
  plan.cable(USUAL, [west[0]!, at(29.4, 57.4), at(60.6, 57.4), east[0]!, east[1]!, ...tree]);
}

function drawTrees(plan: PlanBuilder): void {
  for (const { name, at: foot, radiusFeet, ...heights } of [
    ...westTrees,
    ...northTrees,
    maple,
    ...unlitTrees,
  ])
    plan.tree(name, {
      foot,
      outline: oval(foot, radiusFeet * PIXELS_PER_FOOT),
      heightMeters: heights.heightMeters,
      crownBaseMeters: heights.crownBaseMeters,
    });
}

function drawGround(plan: PlanBuilder): void {
  plan.area('lot-line', 'Lot 14', box(0, 0, 82, 132));
  plan.area(
    'building',
    'Residence',
    [
      at(30, 58),
      at(60, 58),
      at(60, 70),
      at(70, 70),
      at(70, 96),
      at(52, 96),
      at(52, 92),
      at(14, 92),
      at(14, 64),
      at(30, 64),
    ],
    3,
  );
  plan.area('paved', 'Patio', box(30, 44, 60, 58));
  plan.area('paved', 'Pool deck', [...box(33, 19, 61, 39)]);
  plan.area('water', 'Pool', box(36, 22, 58, 36));
  plan.area('bed', 'North bed', box(1, 1, 81, 14));
  plan.area('bed', 'West bed', box(1, 20, 10, 88));
  plan.area('bed', 'Front bed', box(14, 92.4, 31, 98));
  const walk = plan.area('paved', 'Walk', [
    at(32, 92),
    at(37, 92),
    at(37, 112),
    at(53, 112),
    at(53, 117),
    at(32, 117),
  ]);
  // Park paths of at least 1 lx: German public-lighting guidance.
  plan.lightTarget(walk, { leastLux: 1, meanLux: null, uniformity: null });
  plan.area('paved', 'Drive', box(53, 96, 69, 144));
  plan.area('lawn', 'Front lawn', [
    at(0, 98.5),
    at(31.5, 98.5),
    at(31.5, 117.5),
    at(52.5, 117.5),
    at(52.5, 132),
    at(0, 132),
  ]);
  plan.area('lawn', 'Pool lawn', [
    at(10.5, 14.5),
    at(81, 14.5),
    at(81, 69.5),
    at(60.5, 69.5),
    at(60.5, 43.5),
    at(29.5, 43.5),
    at(29.5, 63.5),
    at(10.5, 63.5),
  ]);
}

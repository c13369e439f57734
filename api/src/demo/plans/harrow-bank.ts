import type { PlanBuilder, Point } from '../plan-builder.js';
import { oval } from './oval.js';

/** The stored photo that the places below belong to. */
export const HARROW_BANK_SHEET = { widthPx: 2400, heightPx: 1600, view: 'photo' } as const;

const HALOGEN = 'Halogen lamp G4, 20 W';
const LED = 'LED lamp GU5.3, 4 W, 36°';
/** From the ground to the eaves. */
const WALL_METERS = 2.95;
const FENCE_METERS = 1.8;

const CABLE = '12 AWG landscape cable, 2-core';

/** Corners as clicked on the photo, nearest left first, round by the right. */
const patio: Quad = [
  [786.09, 789.32],
  [1392.94, 797.98],
  [1379.13, 719.09],
  [869.12, 712.98],
];
const firstSlab: Quad = [
  [1173.08, 1141.26],
  [1313.07, 1144.69],
  [1312.8, 1104.65],
  [1179.5, 1101.54],
];
const pond: Quad = [
  [1619.11, 1038.71],
  [2249.57, 1052.06],
  [2001.05, 856.28],
  [1538.01, 849.01],
];
type Quad = readonly [Point, Point, Point, Point];

/**
 * A rear garden on a photo. The path keeps its halogen lamps: eight amperes through one length of 12 AWG leave
 * its last lights dim. The run to the tree was put on the 15 V tap for its length, which overdrives the
 * halogen wall wash that it passes first. The run to the shrub bed has a switch of its own and goes off earlier.
 */
export function drawHarrowBank(plan: PlanBuilder): void {
  plan.calibrate([
    rectangle('patio', patio, 6, 3.6),
    rectangle('first-slab', firstSlab, 0.8, 0.55),
    rectangle('pond', pond, 4, 4.4),
  ]);
  drawGround(plan);
  drawUpright(plan);

  const transformer = plan.transformer('Multi-tap transformer, 300 VA', [1409.7, 722], 'Patio wall');

  plan.set([transformer], 'transformer', { lineVolts: 122 });

  const path = plan.fixtures(
    'Copper path light, G4 lamp',
    [
      [1185, 814],
      [1170, 872],
      [1154, 938],
      [1134, 1019],
      [1110, 1120],
    ],
    HALOGEN,
  );
  const [toPath] = plan.cable(CABLE, [transformer, [1424, 806], [1212, 803], ...path]);
  plan.land(toPath!, 'Path', '12V', 'C1');

  const bed = plan.fixtures('Copper up-light, 4 W, 36°', [
    [640, 806],
    [470, 860],
    [320, 846],
    [152, 824],
  ]);
  const [toBed] = plan.cable(CABLE, [transformer, [1411, 801], [774, 793], ...bed]);
  plan.land(toBed!, 'Shrub bed', '12V', 'C2');
  plan.switchRun(toBed!, { on: { kind: 'sunset', minutesAfter: 0 }, off: { kind: 'clock', at: '22:00' } });
  const [olive, laurel, viburnum, holly] = bed.map((id) => [id]);
  plan.aim(olive!, [617, 778], 0.9);
  plan.aim(laurel!, [466, 832], 1);
  plan.aim(viburnum!, [311, 815], 1.2);
  plan.aim(holly!, [203, 785], 1.6);

  const wall = plan.fixture('Wall wash, G4 lamp', [1512, 731], HALOGEN);
  const shrubs = plan.fixtures(
    'Bullet up-light, GU5.3 lamp',
    [
      [1614, 755],
      [1793, 758],
    ],
    LED,
  );
  const tree = plan.fixtures('Brass up-light, 7 W, 24°', [
    [2106, 784],
    [2238, 799],
  ]);
  const [toTree] = plan.cable(CABLE, [transformer, wall, ...shrubs, ...tree]);
  plan.land(toTree!, 'Wall and tree', '15V', 'C2');
  // Past the shrub that it stands beside.
  plan.aim([wall], [1462, 720], 1.4);
  const [betweenShrubs, atLastShrub] = shrubs.map((id) => [id]);
  plan.aim(betweenShrubs!, [1614, 722], 1.5);
  plan.aim(atLastShrub!, [1794, 738], 0.9);
  plan.aim(tree, [2192, 820], 5);

  plan.measure([pond[0], pond[1]]);
  plan.note([1330, 690], 'Outlet beside the patio door: GFCI, 15 A circuit, shared with the patio fan.');
}

function drawGround(plan: PlanBuilder): void {
  plan.area('lawn', 'Rear lawn', [
    [0, 876],
    [600, 886],
    [803, 717],
    [860, 717],
    [778, 797],
    [1400, 806],
    [1386, 726],
    [1957, 733],
    [2118, 652],
    [2399, 766],
    [2399, 1599],
    [0, 1599],
  ]);
  plan.area('bed', 'Shrub bed', [
    [0, 866],
    [597, 876],
    [797, 714],
    [446, 709],
    [106, 748],
    [0, 806],
  ]);
  plan.area('paved', 'Patio', patio);
  const stones = plan.area('paved', 'Stepping stones', [
    [1173, 1141],
    [1313, 1145],
    [1312, 808],
    [1226, 806],
  ]);
  // Park paths of at least 1 lx: German public-lighting guidance.
  plan.lightTarget(stones, { leastLux: 1, meanLux: null, uniformity: null });
  plan.area(
    'building',
    'House',
    [
      [423, 708],
      [1958.3, 726],
      [1816, 629],
      [552, 615],
    ],
    WALL_METERS,
  );
  plan.area('water', 'Pond', pond);
}

/** What light climbs and what stops it, as seen on the photo. */
function drawUpright(plan: PlanBuilder): void {
  plan.face(
    'House, garden side',
    [
      [423, 708],
      [1958.3, 726],
    ],
    [
      [397, 457.5],
      [1985.4, 464.9],
    ],
    WALL_METERS,
  );
  plan.face(
    'Left fence',
    [
      [-60, 754],
      [334, 634],
    ],
    [
      [-89, 586],
      [320, 511],
    ],
    FENCE_METERS,
  );
  plan.face(
    'Right fence',
    [
      [2116, 647],
      [2460, 790],
    ],
    [
      [2132, 520],
      [2491, 614],
    ],
    FENCE_METERS,
  );
  plan.tree('Maple', {
    foot: [2192, 820],
    // Its top and right side are beyond the edge of the photo.
    outline: [
      [1918, 306],
      [1925, 272],
      [1942, 240],
      [1957, 212],
      [1981, 182],
      [1980, 163],
      [2000, 115],
      [2025, 82],
      [2034, 57],
      [2077, 32],
      [2086, 12],
      [2112, -4],
      [2180, -25],
      [2280, -32],
      [2400, -15],
      [2510, 40],
      [2595, 120],
      [2638, 225],
      [2620, 330],
      [2540, 410],
      [2400, 471],
      [2355, 470],
      [2330, 462],
      [2210, 461],
      [2180, 451],
      [2130, 446],
      [2115, 433],
      [2050, 432],
      [2005, 416],
      [1982, 394],
      [1948, 370],
      [1934, 345],
    ],
    heightMeters: 7.4,
    crownBaseMeters: 3.2,
  });
  const shrub = (name: string, foot: Point, [x, y]: Point, [rx, ry]: Point, heightMeters: number) =>
    plan.tree(name, { foot, outline: oval([x, y], rx, ry), heightMeters });
  shrub('Holly', [203, 785], [202, 703], [113, 88], 1.7);
  shrub('Viburnum', [311, 815], [302, 750], [92, 73], 1.3);
  shrub('Box', [394, 722], [393, 664], [82, 56], 1.3);
  shrub('Laurel', [466, 832], [463, 775], [83, 65], 1.1);
  shrub('Smoke bush', [520, 742], [518, 702], [52, 44], 0.9);
  shrub('Olive', [617, 778], [615, 730], [65, 54], 1);
  shrub('Wall shrub, left', [1555, 733], [1554, 696], [48, 42], 0.9);
  shrub('Wall shrub, middle', [1673, 734], [1674, 697], [48, 42], 0.9);
  shrub('Wall shrub, right', [1794, 738], [1794, 697], [55, 47], 1);
}

function rectangle(id: string, corners: Quad, widthMeters: number, depthMeters: number) {
  const [a, b, c, d] = corners.map(([x, y]) => ({ x, y })) as [Xy, Xy, Xy, Xy];
  return {
    id,
    kind: 'rectangle' as const,
    corners: [a, b, c, d] as [Xy, Xy, Xy, Xy],
    widthMeters,
    depthMeters,
  };
}
interface Xy {
  x: number;
  y: number;
}

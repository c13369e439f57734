import type { PlanBuilder, Point } from '../plan-builder.js';

/** The stored photo that the places below belong to. */
export const HARROW_BANK_SHEET = { widthPx: 2400, heightPx: 1600, view: 'photo' } as const;

const HALOGEN = 'Halogen lamp G4, 20 W';
const LED = 'LED lamp GU5.3, 4 W, 36°';
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
 * halogen wall wash that it passes first.
 */
export function drawHarrowBank(plan: PlanBuilder): void {
  plan.calibrate([
    rectangle('patio', patio, 6, 3.6),
    rectangle('first-slab', firstSlab, 0.8, 0.55),
    rectangle('pond', pond, 4, 4.4),
  ]);
  drawGround(plan);

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
  plan.area('paved', 'Stepping stones', [
    [1173, 1141],
    [1313, 1145],
    [1312, 808],
    [1226, 806],
  ]);
  plan.area(
    'building',
    'House',
    [
      [423, 708],
      [1958.3, 726],
      [1816, 629],
      [552, 615],
    ],
    2.7,
  );
  plan.area('water', 'Pond', pond);
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

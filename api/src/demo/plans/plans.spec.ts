import { type PlanFault, scaleOfSheet, sheetPoint } from '@lampwright/geometry/estimate';
import { distanceToPolygon } from '@lampwright/geometry/measure';
import {
  cablePoints,
  changeProblems,
  itemOf,
  labelOf,
  type PlanDocument,
  type PlanPoint,
  planOf,
  planRecordSchema,
  type RecordKind,
  recordOf,
  recordsOf,
} from '@lampwright/geometry/plan';
import { beforeAll, describe, expect, it } from 'vitest';
import { drawHarrowBank, HARROW_BANK_SHEET } from './harrow-bank.js';
import { type Drawn, drawn } from './plans.testkit.js';
import { drawSandpiperRow, SANDPIPER_ROW_SHEET } from './sandpiper-row.js';

const FEET = 0.3048;

/** Labels of the fixtures with that fault, as they stand on the plan. */
const labelsWith = ({ plan, faults }: Drawn, code: PlanFault['code']) =>
  faults
    .filter((fault) => fault.code === code)
    .map((fault) => labelOf(recordOf(plan, fault.recordId, 'fixture')!, plan))
    .sort();

const ids = (plan: PlanDocument, kind: RecordKind) => [...recordsOf(plan, kind)].map(({ id }) => id);

/** Metres on the ground between a place and the water of the sheet. */
function toWater({ plan }: Drawn, at: PlanPoint): number {
  const scale = scaleOfSheet(recordOf(plan, 'sheet', 'sheet')!);
  if (!scale.ok) throw new Error(scale.message);
  const ground = (point: PlanPoint) => scale.scale.groundFromSheet(sheetPoint(point))!;
  const water = [...recordsOf(plan, 'area')].filter(({ use }) => use === 'water');
  return Math.min(...water.map(({ points }) => distanceToPolygon(ground(at), points.map(ground))));
}

describe.each([
  ['Harrow Bank', drawHarrowBank, HARROW_BANK_SHEET],
  ['Sandpiper Row', drawSandpiperRow, SANDPIPER_ROW_SHEET],
] as const)('the plan of %s', (_name, draw, sheet) => {
  let demo: Drawn;
  beforeAll(() => {
    demo = drawn(draw, sheet);
  });

  it('is sound, and made of changes that each leave it sound', () => {
    for (const record of demo.plan.values())
      expect(planRecordSchema.safeParse(record).error?.issues ?? [], record.id).toEqual([]);
    expect(changeProblems(planOf([]), { put: Object.fromEntries(demo.plan), remove: [] })).toEqual([]);
  });

  it('lies on its sheet', () => {
    const points = [
      ...[...recordsOf(demo.plan, 'fixture'), ...recordsOf(demo.plan, 'transformer')].map(({ at }) => at),
      ...[...recordsOf(demo.plan, 'area')].flatMap((area) => area.points),
      ...[...recordsOf(demo.plan, 'cable')].flatMap((cable) => cablePoints(demo.plan, cable) ?? []),
    ];
    for (const { x, y } of points) {
      expect(x >= 0 && x < sheet.widthPx, `${x}`).toBe(true);
      expect(y >= 0 && y < sheet.heightPx, `${y}`).toBe(true);
    }
  });

  it('has all fixtures wired, on a transformer with room for more', () => {
    expect(demo.answer.fixtures).toHaveLength(ids(demo.plan, 'fixture').length);
    for (const { loadPercent } of demo.answer.transformers) {
      expect(loadPercent).toBeGreaterThan(40);
      expect(loadPercent).toBeLessThan(80);
    }
    const [one = 0, two = 0] = demo.answer.commons.map(({ amps }) => amps);
    expect(Math.max(one, two) / Math.min(one, two)).toBeLessThan(1.6);
  });

  it('keeps away from the water', () => {
    for (const { at } of recordsOf(demo.plan, 'transformer'))
      expect(toWater(demo, at)).toBeGreaterThan(10 * FEET);
    for (const { at, number } of recordsOf(demo.plan, 'fixture'))
      expect(toWater(demo, at), `fixture ${number}`).toBeGreaterThan(10 * FEET);
  });

  it('gives no caution beyond what it is there to show', () => {
    const codes = new Set(demo.faults.map(({ code }) => code));
    for (const shown of ['dim', 'overdriven', 'above-aim'] as const) codes.delete(shown);
    expect([...codes]).toEqual([]);
  });
});

describe('what the demo plans are there to show', () => {
  it('Harrow Bank: the far halogen lamps are dim, the wall wash near the transformer is overdriven', () => {
    const demo = drawn(drawHarrowBank, HARROW_BANK_SHEET);
    expect(labelsWith(demo, 'dim')).toEqual(['P4', 'P5']);
    expect(labelsWith(demo, 'overdriven')).toEqual(['F1']);
    expect(demo.faults.filter(({ severity }) => severity === 'fault')).toHaveLength(3);
    // The reasons are the ones told: halogen lamps, and the highest tap.
    for (const label of ['P4', 'P5', 'F1']) {
      const fixture = [...recordsOf(demo.plan, 'fixture')].find((f) => labelOf(f, demo.plan) === label);
      expect(itemOf(demo.plan, fixture!.lampId, 'lamp')?.technology).toBe('halogen');
    }
    const tree = [...recordsOf(demo.plan, 'run')].find((run) => run.name === 'Wall and tree');
    expect(tree?.tapId).toBe('15V');
  });

  it('Harrow Bank: a tap lower, nothing is overdriven; LED lamps on the path, nothing is dim', () => {
    const mended = drawn((plan) => {
      drawHarrowBank(plan);
      const [tree] = [...recordsOf(plan.plan, 'run')].filter((run) => run.name === 'Wall and tree');
      plan.set([tree!.id], 'run', { tapId: '12V' });
      const led = plan.fixture('Copper path light, G4 lamp', [1100, 1300], 'LED lamp G4, 3 W');
      const { lampId } = recordOf(plan.plan, led, 'fixture')!;
      const path = [...recordsOf(plan.plan, 'fixture')].filter((f) => /^P[1-5]$/.test(labelOf(f, plan.plan)));
      plan.set(
        path.map(({ id }) => id),
        'fixture',
        { lampId },
      );
    }, HARROW_BANK_SHEET);
    expect(mended.faults.filter(({ severity }) => severity === 'fault')).toEqual([]);
  });

  it('Sandpiper Row: the end of the long feed to the front walk is dim', () => {
    const demo = drawn(drawSandpiperRow, SANDPIPER_ROW_SHEET);
    expect(labelsWith(demo, 'dim')).toEqual(['P4', 'P5']);
    expect(demo.faults.filter(({ severity }) => severity === 'fault')).toHaveLength(2);
    const walk = [...recordsOf(demo.plan, 'run')].find((run) => run.name === 'Front walk');
    const { lengthMeters = 0 } = demo.answer.runs.find(({ id }) => id === walk?.id) ?? {};
    expect(lengthMeters).toBeGreaterThan(100 * FEET);
  });

  it('Sandpiper Row: the pool is as long on the plan as the drawing says', () => {
    const demo = drawn(drawSandpiperRow, SANDPIPER_ROW_SHEET);
    const scale = scaleOfSheet(recordOf(demo.plan, 'sheet', 'sheet')!);
    if (!scale.ok) throw new Error(scale.message);
    const pool = [...recordsOf(demo.plan, 'area')].find((area) => area.use === 'water')!;
    const [a, b] = pool.points.map((point) => scale.scale.groundFromSheet(sheetPoint(point))!);
    expect(Math.hypot(b!.x - a!.x, b!.y - a!.y) / FEET).toBeCloseTo(22, 2);
  });
});

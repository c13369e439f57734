import { scaleOfSheet, sheetPoint } from '@lampwright/geometry/estimate';
import {
  controlZonesOf,
  groundLux,
  type LightSpace,
  luxAt,
  type NightScene,
  sceneWithNotes,
  spaceOf,
} from '@lampwright/geometry/light';
import { labelOf, lightOf, recordOf, recordsOf } from '@lampwright/geometry/plan';
import { beforeAll, describe, expect, it } from 'vitest';
import type { PlanBuilder, Point } from '../plan-builder.js';
import { drawHarrowBank, HARROW_BANK_SHEET } from './harrow-bank.js';
import { type Drawn, drawn } from './plans.testkit.js';
import { drawSandpiperRow, SANDPIPER_ROW_SHEET } from './sandpiper-row.js';

interface Night extends Drawn {
  readonly scene: NightScene;
  readonly space: LightSpace;
  readonly unlit: string[];
}

function night(
  draw: (plan: PlanBuilder) => void,
  sheet: typeof HARROW_BANK_SHEET | typeof SANDPIPER_ROW_SHEET,
): Night {
  const demo = drawn(draw, sheet);
  const volts = new Map(demo.answer.fixtures.map((fixture) => [fixture.id, fixture.volts]));
  const made = sceneWithNotes(demo.plan, 'sheet', volts);
  if (!made) throw new Error('The sheet has no scale.');
  const unlit = made.notes.filter(({ kind }) => kind === 'unlit').map(({ text }) => text);
  return { ...demo, scene: made.scene, space: spaceOf(made.scene), unlit };
}

/** Metres on the ground under a place on the sheet. */
function ground({ plan }: Drawn, [x, y]: Point) {
  const scale = scaleOfSheet(recordOf(plan, 'sheet', 'sheet')!);
  if (!scale.ok) throw new Error(scale.message);
  return scale.scale.groundFromSheet(sheetPoint({ x, y }))!;
}

const sourceNamed = ({ plan, scene }: Night, label: string) =>
  scene.sources.find(({ id }) => labelOf(recordOf(plan, id, 'fixture')!, plan) === label)!;

let harrow: Night;
let sandpiper: Night;
beforeAll(() => {
  harrow = night(drawHarrowBank, HARROW_BANK_SHEET);
  sandpiper = night(drawSandpiperRow, SANDPIPER_ROW_SHEET);
});

describe('the demo gardens by night', () => {
  it('have every light in the picture, none rated colder than 3000 K', () => {
    for (const { plan, scene, unlit } of [harrow, sandpiper]) {
      expect(unlit).toEqual([]);
      expect(scene.sources).toHaveLength([...recordsOf(plan, 'fixture')].length);
      for (const { output, id } of scene.sources) {
        expect(output, id).toBeGreaterThan(0);
        const rated = lightOf(plan, recordOf(plan, id, 'fixture')!)?.cctKelvin;
        expect(rated, id).toBeGreaterThanOrEqual(2700);
        expect(rated, id).toBeLessThanOrEqual(3000);
      }
    }
  });

  it('point each up-light and wall wash at something that was marked', () => {
    for (const demo of [harrow, sandpiper])
      for (const { aim, id } of recordsOf(demo.plan, 'fixture')) {
        const source = demo.scene.sources.find((s) => s.id === id)!;
        if (source.kind === 'path') {
          expect(aim, id).toBeNull();
          expect(source.axis).toEqual([0, 0, -1]);
        } else {
          expect(aim?.kind, id).toBe('point');
          expect(source.axis[2], id).toBeGreaterThan(0);
        }
      }
  });

  it('Harrow Bank: the wall has light outside, and none gets inside of the house', () => {
    const at = ground(harrow, [1462, 720.2]);
    const outward = { x: 0, y: -1, z: 0 };
    expect(luxAt(harrow.space, { x: at.x, y: at.y - 0.02, z: 1 }, outward)).toBeGreaterThan(20);
    for (const inside of [
      [700, 680],
      [1200, 690],
      [1600, 700],
      [1850, 700],
    ] as const) {
      const { x, y } = ground(harrow, inside);
      for (const normal of [
        { x: 0, y: -1, z: 0 },
        { x: 0, y: 0, z: 1 },
      ])
        expect(luxAt(harrow.space, { x, y, z: 1.5 }, normal), `${inside}`).toBe(0);
    }
  });

  it('Harrow Bank: the overdriven wall wash is brighter than rated, the dim end of the path dimmer', () => {
    expect(sourceNamed(harrow, 'F1').output).toBeGreaterThan(1.5);
    expect(sourceNamed(harrow, 'P5').output).toBeLessThan(0.75);
    expect(sourceNamed(harrow, 'P5').cctKelvin).toBeLessThan(sourceNamed(harrow, 'F1').cctKelvin);
  });

  it('light the stepping stones beside each lamp of the path', () => {
    for (const [x, y] of [
      [1240, 872],
      [1230, 938],
      [1220, 1019],
    ] as const) {
      const place = ground(harrow, [x, y]);
      expect(groundLux(harrow.space, place.x, place.y), `${x}`).toBeGreaterThan(1);
    }
  });

  it('can be switched in parts: a run by itself, or smart lamps in a zone', () => {
    const zones = ({ plan }: Night) =>
      controlZonesOf(plan).zones.map(({ kind, name }) => [kind, name] as const);
    expect(zones(harrow)).toEqual([
      ['feed', 'Patio wall'],
      ['run', 'Shrub bed'],
    ]);
    expect(zones(sandpiper)).toEqual([
      ['feed', 'Rear wall'],
      ['smart', 'West side'],
    ]);
  });
});

import { describe, expect, it } from 'vitest';
import type { FixtureItem, FixtureKind, LampItem } from '../catalogue/index.js';
import { halogenLamp, pathLight, sheet, upLight } from '../plan/plan.testkit.js';
import { groundLux, luxAt } from './illuminance.js';
import { nightSceneSchema } from './night-scene.js';
import { drawing, Garden, pixelAt, square, tilt, yardPhoto } from './scene.testkit.js';
import { nightSceneOf } from './scene-of-plan.js';
import { groundUnder, spaceOf } from './space.js';
import { USUAL_WHITE_LUX } from './usual.js';

const light = (kind: FixtureKind, more: object = {}): FixtureItem => ({
  ...(pathLight as Extract<FixtureItem, { light: 'integrated' }>),
  name: `Light of kind ${kind}`,
  kind,
  mountingHeightMeters: null,
  beamDegrees: 40,
  ...more,
});

describe('a night scene', () => {
  it('is null without a sheet and without a scale', () => {
    const garden = new Garden({ ...drawing(), references: [] });
    expect(nightSceneOf(garden.doc, 'sheet1', new Map())).toBeNull();
    expect(nightSceneOf(garden.doc, 'elsewhere', new Map())).toBeNull();
  });

  it('is plain data of its own form, before and after JSON', () => {
    const garden = new Garden();
    garden.light(pathLight, 100, 200);
    garden.light(upLight, 300, 200, { lamp: halogenLamp });
    garden.face(
      [
        { x: 0, y: 0 },
        { x: 900, y: 0 },
      ],
      3,
    );
    garden.tree({ x: 500, y: 500 }, square(500, 500, 100), 6, 2);
    garden.area('building', square(1500, 500, 300), 4);
    const scene = garden.scene();
    expect(nightSceneSchema.parse(JSON.parse(JSON.stringify(scene)))).toEqual(scene);
    expect(scene).toMatchObject({
      sheetId: 'sheet1',
      view: 'plan',
      widthPx: 4000,
      whiteLux: USUAL_WHITE_LUX,
    });
    expect(scene.sources).toHaveLength(2);
  });

  it('stands lights in metres on the ground, at their height', () => {
    const garden = new Garden();
    const id = garden.light(pathLight, 250, 400, { mountingHeightMeters: 0.6 });
    expect(garden.source(id)).toMatchObject({ z: 0.6, axis: [0, 0, -1], output: 1, quantity: 1 });
    expect(garden.source(id).x).toBeCloseTo(2.5, 9);
    expect(garden.source(id).y).toBeCloseTo(-4, 9);
    const usual = garden.light(light('bollard'), 0, 0);
    expect(garden.source(usual).z).toBe(0.9);
    expect(garden.source(garden.light(pathLight, 0, 0)).z).toBe(0.5);
  });

  it('leaves lights of other sheets out', () => {
    const garden = new Garden();
    garden.light(pathLight, 0, 0);
    garden.doc = new Map([...garden.doc, ['other', { ...sheet('other'), id: 'other' }]]);
    expect(nightSceneOf(garden.doc, 'other', new Map())?.sources).toEqual([]);
  });

  it('takes output and warmth from the volts, and rated light where none are known', () => {
    const garden = new Garden();
    const id = garden.light(upLight, 0, 0, { lamp: halogenLamp });
    expect(garden.source(id)).toMatchObject({ output: 1, cctKelvin: 2900 });
    const low = garden.source(id, { [id]: 10.8 });
    expect(low.output).toBeCloseTo(0.699, 3);
    expect(low.cctKelvin).toBeLessThan(2900);
    expect(garden.source(id, { [id]: 3 }).output).toBe(0);
    expect(garden.notes({ [id]: 13.45 })).toEqual([
      { recordId: id, kind: 'volts', text: 'U1: Overdriven: 47 % brighter, lamp life about a quarter.' },
    ]);
  });

  it('puts lights in the groups that they are offered in', () => {
    const garden = new Garden();
    const a = garden.light(pathLight, 0, 0);
    garden.light(pathLight, 100, 0);
    expect(garden.scene({}, { [a]: 'g1' }).sources.map((s) => s.groupId)).toEqual(['g1', null]);
  });

  it('says of lights without a lamp that they give none', () => {
    const garden = new Garden();
    const id = garden.light(upLight, 0, 0);
    expect(garden.scene().sources).toEqual([]);
    expect(garden.notes()).toEqual([
      { recordId: id, kind: 'unlit', text: 'U1 has no lamp yet, so it gives no light.' },
    ]);
  });

  it('prefers the measured peak, else the lumens, else the watts, and says what it assumed', () => {
    const garden = new Garden();
    const measured = garden.light(light('up', { peakCandela: 1234, shieldFactor: 0.4 }), 0, 0);
    expect(garden.source(measured)).toMatchObject({ peakCandela: 1234, shield: 0.4 });
    expect(garden.source(measured).halfAngle).toBeCloseTo((20 * Math.PI) / 180, 12);
    expect(garden.notes()).toEqual([]);
    const vague = garden.light(light('up', { lumens: null, beamDegrees: null, cctKelvin: null }), 0, 0);
    expect(garden.source(vague)).toMatchObject({ cctKelvin: 2700 });
    expect(garden.source(vague).halfAngle).toBeCloseTo((18 * Math.PI) / 180, 12);
    expect(garden.notes()).toEqual([
      {
        recordId: vague,
        kind: 'assumed',
        text: 'The catalogue doesn’t say all of U2: taken its beam as 36°, its colour as 2700 K, its light as 225 lm, by its watts.',
      },
    ]);
  });

  it('lets a hat turn the light of a bare lamp down', () => {
    const garden = new Garden();
    const bare: LampItem = { ...halogenLamp, name: 'Bare', base: 'G4', lumens: 300, beamDegrees: 360 };
    const hat: FixtureItem = {
      ...(upLight as Extract<FixtureItem, { light: 'lamp' }>),
      kind: 'path',
      base: 'G4',
    };
    const source = garden.source(garden.light(hat, 0, 0, { lamp: bare }));
    expect(source.halfAngle).toBeCloseTo(Math.PI / 3, 12);
    expect(garden.notes()[0]?.text).toMatch(/60 % of its bare lamp’s light/);
    const around = garden.source(garden.light(light('bollard', { beamDegrees: 360 }), 0, 0));
    expect(around.halfAngle).toBeNull();
  });
});

describe('where lights point', () => {
  it('is down or up by their kind where nobody said', () => {
    const garden = new Garden();
    const axis = (kind: FixtureKind) => garden.source(garden.light(light(kind), 900, 900)).axis;
    for (const kind of ['path', 'bollard', 'down', 'linear', 'step'] as const)
      expect(axis(kind)).toEqual([0, 0, -1]);
    for (const kind of ['up', 'in-grade', 'underwater', 'flood', 'wall-wash'] as const)
      expect(axis(kind)).toEqual([0, 0, 1]);
  });

  it('is half way up the nearest wall within six metres for floods and washes', () => {
    const garden = new Garden();
    garden.face(
      [
        { x: 0, y: 0 },
        { x: 2000, y: 0 },
      ],
      4,
    );
    garden.face(
      [
        { x: 0, y: 900 },
        { x: 2000, y: 900 },
      ],
      4,
    );
    const near = garden.source(garden.light(light('wall-wash', { mountingHeightMeters: 0 }), 500, 200));
    expect(near.axis[0]).toBeCloseTo(0, 12);
    expect(near.axis[1]).toBeCloseTo(Math.SQRT1_2, 12);
    expect(near.axis[2]).toBeCloseTo(Math.SQRT1_2, 12);
    const far = garden.source(garden.light(light('flood'), 500, 1600));
    expect(far.axis).toEqual([0, 0, 1]);
  });

  it('is down and away from the wall that a step light is set into', () => {
    const garden = new Garden();
    garden.face(
      [
        { x: 0, y: 0 },
        { x: 2000, y: 0 },
      ],
      0.5,
    );
    const { axis } = garden.source(garden.light(light('step'), 500, 10));
    expect(axis[0]).toBeCloseTo(0, 12);
    expect(axis[1]).toBeCloseTo(-Math.SQRT1_2, 12);
    expect(axis[2]).toBeCloseTo(-Math.SQRT1_2, 12);
  });

  it('follows a tilt in its direction on the ground, from straight down', () => {
    const garden = new Garden();
    const aimed = (degrees: number) =>
      garden.source(garden.light(light('up'), 300, 300, { aim: tilt({ x: 300, y: 100 }, degrees) })).axis;
    expect(aimed(0)).toEqual([0, 0, -1]);
    expect(aimed(180)).toEqual([0, 0, 1]);
    const level = aimed(90);
    expect(level[1]).toBeCloseTo(1, 9);
    expect(level[2]).toBeCloseTo(0, 9);
    const steep = aimed(120);
    expect(steep[2]).toBeCloseTo(0.5, 9);
    expect(Math.hypot(...steep)).toBeCloseTo(1, 12);
  });

  it('follows a tilt on a photo towards a place above the horizon', () => {
    const garden = new Garden(yardPhoto());
    const at = pixelAt(garden.sheet, 0, 4);
    const on = (toward: { x: number; y: number }) =>
      garden.source(garden.light(light('up'), at.x, at.y, { aim: tilt(toward, 120) })).axis;
    const patio = pixelAt(garden.sheet, 0, 8);
    const straight = on(patio);
    // The house's picture goes on above the horizon in the same line of sight.
    const sky = { x: at.x + (patio.x - at.x) * 8, y: at.y + (patio.y - at.y) * 8 };
    expect(groundUnder(garden.scene(), sky)).toBeNull();
    const up = on(sky);
    expect(straight[1]).toBeCloseTo(Math.sin((120 * Math.PI) / 180), 3);
    for (const i of [0, 1, 2] as const) expect(up[i]).toBeCloseTo(straight[i], 9);
  });

  it('is at a point on the ground, or so high above it', () => {
    const garden = new Garden();
    const id = garden.light(light('flood', { mountingHeightMeters: 0 }), 0, 0, {
      aim: { kind: 'point', at: { x: 300, y: 0 }, heightMeters: 4 },
    });
    const { axis } = garden.source(id);
    expect(axis[0]).toBeCloseTo(0.6, 12);
    expect(axis[2]).toBeCloseTo(0.8, 12);
  });

  it('falls back on the usual where an aim says nothing', () => {
    const garden = new Garden();
    const self = garden.light(light('up'), 100, 100, { aim: tilt({ x: 100, y: 100 }, 45) });
    expect(garden.source(self).axis).toEqual([0, 0, 1]);
  });
});

describe('what stands on a sheet', () => {
  it('hangs a down-light in the tree over it, whose crown doesn’t stop its light', () => {
    const garden = new Garden();
    const tree = garden.tree({ x: 500, y: 500 }, square(500, 500, 200), 8, 3);
    const hung = garden.light(light('down', { mountingHeightMeters: 8.5 }), 600, 500);
    const free = garden.light(light('down', { mountingHeightMeters: 8.5 }), 900, 500);
    const under = garden.light(light('path'), 500, 500);
    expect([hung, free, under].map((id) => garden.source(id).treeId)).toEqual([tree, null, null]);
    const space = spaceOf(garden.scene());
    expect(
      groundLux({ ...space, sources: space.sources.filter((s) => s.id === hung) }, 6, -5),
    ).toBeGreaterThan(0);
  });

  it('takes buildings without a height as 3 m, and canopies as trees on drawings only, and says so', () => {
    const garden = new Garden();
    const house = garden.area('building', square(1000, 1000, 300));
    const canopy = garden.area('canopy', square(2000, 1000, 200));
    garden.area('lawn', square(2000, 2000, 200));
    expect(garden.scene().buildings).toMatchObject([{ id: house, heightMeters: 3 }]);
    expect(garden.scene().trees).toMatchObject([
      { id: canopy, foot: { x: 2000, y: 1000 }, heightMeters: 5, crownBaseMeters: 1.5 },
    ]);
    expect(garden.notes().map((n) => n.text)).toEqual([
      'No height is set for building: taken as 3 m.',
      'No height is set for canopy: taken as 5 m.',
    ]);
    const photo = new Garden(yardPhoto());
    photo.area('canopy', [
      { x: 100, y: 900 },
      { x: 300, y: 900 },
      { x: 200, y: 1000 },
    ]);
    expect(photo.scene().trees).toEqual([]);
  });

  it('is dark inside of a building, and lit before it by a light that was clicked a little inside', () => {
    const garden = new Garden();
    garden.area('building', square(1000, 1000, 300), 4);
    // The building's upper edge is at 7 m on the sheet; 20 cm too deep, and exactly on the line.
    for (const y of [720, 700]) {
      const id = garden.light(light('up', { lumens: 500, beamDegrees: 120 }), 1000, y);
      const space = spaceOf(garden.scene());
      const own = { ...space, sources: space.sources.filter((s) => s.id === id) };
      expect(own.sources[0]?.y).toBeCloseTo(-6.95, 6);
      expect(luxAt(own, { x: 10, y: -7, z: 2 }, { x: 0, y: 1, z: 0 })).toBeGreaterThan(1);
      expect(luxAt(own, { x: 10, y: -8, z: 2 }, { x: 0, y: 1, z: 0 })).toBe(0);
    }
  });

  it('keeps a light that is marked on a face on the viewer’s side of it on a photo', () => {
    const garden = new Garden(yardPhoto());
    const [left, right] = [pixelAt(garden.sheet, -6, 11.6), pixelAt(garden.sheet, 9, 11.6)];
    garden.face([left, right], 5);
    const at = pixelAt(garden.sheet, 1, 11.6);
    expect(garden.source(garden.light(light('up'), at.x, at.y)).y).toBeLessThan(11.6);
  });

  it('reads the rendered yard’s own places back in metres', () => {
    const garden = new Garden(yardPhoto());
    const at = pixelAt(garden.sheet, 9.8, 7.6);
    const { x, y } = garden.source(garden.light(pathLight, at.x, at.y));
    expect(x).toBeCloseTo(9.8, 2);
    expect(y).toBeCloseTo(7.6, 2);
  });

  it('says of lights above the horizon that they have no ground', () => {
    const garden = new Garden(yardPhoto());
    garden.light(pathLight, 1200, 5);
    expect(garden.scene().sources).toEqual([]);
    expect(garden.notes()[0]?.text).toMatch(/above the horizon/);
  });
});

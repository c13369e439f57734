import { describe, expect, it } from 'vitest';
import { apply, inverse } from '../change.js';
import { changeProblems, planProblems } from '../integrity.js';
import { choice, must, pathLight, sheet } from '../plan.testkit.js';
import {
  type Aim,
  type FaceRecord,
  faceRecordSchema,
  planRecordSchema,
  type TreeRecord,
  treeRecordSchema,
} from '../records.js';
import { usualSchedule } from '../schedule.js';
import {
  addZone,
  deleteRecords,
  duplicate,
  moveRecords,
  placeFace,
  placeFixture,
  placeTree,
  putRecords,
  setFields,
} from './index.js';
import { Yard } from './yard.testkit.js';

const foot = [
  { x: 100, y: 500 },
  { x: 400, y: 520 },
];
const top = [
  { x: 100, y: 200 },
  { x: 400, y: 240 },
];
const outline = [
  { x: 600, y: 100 },
  { x: 700, y: 100 },
  { x: 650, y: 300 },
];

/** A yard with a face and a tree. */
function marked() {
  const yard = new Yard();
  const [face = ''] = yard.do(
    placeFace(yard.doc, { sheetId: 'sheet1', foot, top, heightMeters: 4.5 }, yard.ids),
  );
  const [tree = ''] = yard.do(
    placeTree(
      yard.doc,
      { sheetId: 'sheet1', foot: { x: 650, y: 500 }, outline, heightMeters: 6, crownBaseMeters: 2 },
      yard.ids,
    ),
  );
  return { yard, face, tree };
}

describe('upright surfaces and trees', () => {
  it('are placed whole, and undone whole', () => {
    const { yard, face, tree } = marked();
    expect(yard.get(face)).toMatchObject({ kind: 'face', foot, top, heightMeters: 4.5, name: '' });
    expect(yard.get(tree)).toMatchObject({ kind: 'tree', outline, heightMeters: 6, crownBaseMeters: 2 });
    for (const id of [face, tree]) expect(planRecordSchema.safeParse(yard.get(id)).success).toBe(true);
    const change = must(
      placeFace(yard.doc, { sheetId: 'sheet1', foot, top: null, heightMeters: 1 }, yard.ids),
    );
    const undo = inverse(yard.doc, change, 'undo');
    expect(apply(apply(yard.doc, change), undo)).toEqual(yard.doc);
  });

  it('need enough points, and a sheet', () => {
    const { yard } = marked();
    const face = { sheetId: 'sheet1', foot: foot.slice(0, 1), top: null, heightMeters: 3 };
    expect(placeFace(yard.doc, face)).toMatchObject({ kind: 'refused', code: 'too-few-points' });
    const tree = {
      sheetId: 'sheet1',
      foot: { x: 0, y: 0 },
      outline: outline.slice(0, 2),
      heightMeters: 3,
      crownBaseMeters: 0,
    };
    expect(placeTree(yard.doc, tree)).toMatchObject({ kind: 'refused', code: 'too-few-points' });
    expect(placeFace(yard.doc, { ...face, foot, sheetId: 'gone' })).toMatchObject({ code: 'missing-record' });
    expect(placeTree(yard.doc, { ...tree, outline, sheetId: 'gone' })).toMatchObject({
      code: 'missing-record',
    });
  });

  it('are refused where their shape makes no sense', () => {
    const { yard, face, tree } = marked();
    const whole = yard.get(face) as FaceRecord;
    expect(faceRecordSchema.safeParse({ ...whole, top: top.slice(0, 1) }).success).toBe(false);
    expect(faceRecordSchema.safeParse({ ...whole, top: [...top, ...top] }).error?.issues[0]?.message).toMatch(
      /as many points/,
    );
    const oak = yard.get(tree) as TreeRecord;
    expect(treeRecordSchema.safeParse({ ...oak, crownBaseMeters: 6 }).error?.issues[0]?.message).toMatch(
      /begin below the top/,
    );
    expect(treeRecordSchema.safeParse({ ...oak, crownBaseMeters: 0 }).success).toBe(true);
  });

  it('move with all of their points, and not off the sheet', () => {
    const { yard, face, tree } = marked();
    yard.do(moveRecords(yard.doc, [face, tree], 10, -20, yard.ids));
    expect(yard.get(face)).toMatchObject({
      foot: [
        { x: 110, y: 480 },
        { x: 410, y: 500 },
      ],
      top: [
        { x: 110, y: 180 },
        { x: 410, y: 220 },
      ],
    });
    expect(yard.get(tree)).toMatchObject({ foot: { x: 660, y: 480 } });
    expect((yard.get(tree) as TreeRecord).outline[2]).toEqual({ x: 660, y: 280 });
    for (const id of [face, tree])
      expect(moveRecords(yard.doc, [id], 99_900, 0)).toMatchObject({ kind: 'refused', code: 'out-of-range' });
  });

  it('are duplicated with ids of their own', () => {
    const { yard, face, tree } = marked();
    const copies = yard.do(duplicate(yard.doc, [face, tree], { dx: 5, dy: 5 }, yard.ids));
    expect(new Set([face, tree, ...copies]).size).toBe(4);
    expect(yard.get(copies[0])).toMatchObject({ kind: 'face', heightMeters: 4.5 });
    expect((yard.get(copies[0]) as FaceRecord).foot[0]).toEqual({ x: 105, y: 505 });
    expect(yard.get(copies[1])).toMatchObject({ kind: 'tree', foot: { x: 655, y: 505 } });
    expect((yard.get(face) as FaceRecord).foot).toEqual(foot);
  });

  it('take heights by the usual edit', () => {
    const { yard, face, tree } = marked();
    yard.do(setFields(yard.doc, [face, tree], 'face', { heightMeters: 7 }, yard.ids));
    expect(yard.get(face)).toMatchObject({ heightMeters: 7 });
    expect(yard.get(tree)).toMatchObject({ heightMeters: 6 });
  });

  it('go with their sheet, and can’t stay without it', () => {
    const { yard, face, tree } = marked();
    const bare = apply(yard.doc, { put: {}, remove: ['sheet1'] });
    expect(planProblems(bare).map(({ recordId }) => recordId)).toEqual([face, tree]);
    yard.delete('sheet1');
    expect([yard.get(face), yard.get(tree)]).toEqual([undefined, undefined]);
  });

  it('are deleted without touching lights aimed at them', () => {
    const { yard, tree } = marked();
    const aim: Aim = { kind: 'point', at: { x: 650, y: 500 }, heightMeters: 4 };
    const placing = {
      sheetId: 'sheet1',
      at: { x: 600, y: 520 },
      fixture: choice(pathLight),
      lamp: null,
      aim,
    };
    const [light = ''] = yard.do(placeFixture(yard.doc, placing, yard.ids));
    yard.delete(tree);
    expect(yard.get(light)).toMatchObject({ aim });
  });
});

describe('aims', () => {
  const placed = (aim: Aim) => {
    const yard = new Yard();
    const placing = {
      sheetId: 'sheet1',
      at: { x: 100, y: 100 },
      fixture: choice(pathLight),
      lamp: null,
      aim,
    };
    const [light = ''] = yard.do(placeFixture(yard.doc, placing, yard.ids));
    return { yard, light };
  };

  it('at a point stay on it when the light moves; a direction goes along', () => {
    const point = placed({ kind: 'point', at: { x: 300, y: 300 }, heightMeters: 2 });
    point.yard.do(moveRecords(point.yard.doc, [point.light], 50, 0, point.yard.ids));
    expect(point.yard.get(point.light)).toMatchObject({
      at: { x: 150, y: 100 },
      aim: { at: { x: 300, y: 300 } },
    });
    const tilt = placed({ kind: 'tilt', toward: { x: 100, y: 50 }, degreesFromDown: 120 });
    tilt.yard.do(moveRecords(tilt.yard.doc, [tilt.light], 50, 0, tilt.yard.ids));
    expect(tilt.yard.get(tilt.light)).toMatchObject({
      aim: { toward: { x: 150, y: 50 }, degreesFromDown: 120 },
    });
  });
});

describe('zones', () => {
  function zoned() {
    const yard = new Yard();
    const [a, b] = [yard.fixture(100, 0), yard.fixture(200, 0)];
    const [zone = ''] = yard.do(
      addZone(yard.doc, { name: ' Entry ', schedule: usualSchedule }, [a], yard.ids),
    );
    return { yard, a, b, zone };
  }

  it('are made with their lights in them, and need a name', () => {
    const { yard, a, b, zone } = zoned();
    expect(yard.get(zone)).toMatchObject({ kind: 'zone', name: 'Entry', schedule: usualSchedule });
    expect(yard.get(a)).toMatchObject({ zoneId: zone });
    expect(yard.get(b)).toMatchObject({ zoneId: null });
    expect(addZone(yard.doc, { name: '  ', schedule: usualSchedule }, [])).toMatchObject({
      kind: 'refused',
      code: 'no-name',
    });
  });

  it('give their lights back to the feed when they are deleted', () => {
    const { yard, a, zone } = zoned();
    const before = yard.doc;
    const change = must(deleteRecords(yard.doc, [zone], yard.ids));
    yard.doc = apply(yard.doc, change);
    expect(planProblems(yard.doc)).toEqual([]);
    expect(yard.get(zone)).toBeUndefined();
    expect(yard.get(a)).toMatchObject({ zoneId: null });
    expect(apply(yard.doc, inverse(before, change, 'undo'))).toEqual(before);
  });

  it('stay when a sheet goes, since they are on none', () => {
    const { yard, zone } = zoned();
    yard.do(putRecords(yard.doc, [sheet('sheet2', 1)], yard.ids));
    const there = yard.fixture(10, 10, 'sheet2');
    yard.do(setFields(yard.doc, [there], 'fixture', { zoneId: zone }, yard.ids));
    yard.delete('sheet1');
    expect(yard.get(zone)).toBeDefined();
    expect(yard.get(there)).toMatchObject({ zoneId: zone });
  });

  it('can’t be named by a light when they are not there, nor taken from under one', () => {
    const { yard, a, b, zone } = zoned();
    expect(setFields(yard.doc, [b], 'fixture', { zoneId: 'nowhere' })).toMatchObject({ kind: 'refused' });
    const problems = changeProblems(yard.doc, { put: {}, remove: [zone] });
    expect(problems).toMatchObject([{ code: 'dangling-reference', recordId: a, refersTo: zone }]);
    // Another record of that id is no zone.
    expect(setFields(yard.doc, [b], 'fixture', { zoneId: a })).toMatchObject({ kind: 'refused' });
  });

  it('take copies of their lights in, and are not copied or moved themselves', () => {
    const { yard, a, zone } = zoned();
    const copies = yard.do(duplicate(yard.doc, [a, zone], { dx: 5, dy: 5 }, yard.ids));
    expect(copies).toHaveLength(1);
    expect(yard.get(copies[0])).toMatchObject({ kind: 'fixture', zoneId: zone });
    const moved = must(moveRecords(yard.doc, [zone], 5, 5, yard.ids));
    expect(moved.put).toEqual({});
  });
});

import { apply, defaultSettings, type EditResult, placeFace, placeTree } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { aimFigures, aimWith } from './aim-fields';
import { handlePlace } from './aiming';
import { Driver, sheet } from './driver.testkit';
import { drawnAim } from './light-pose';

/** Two path lights, at 300, 300 and 500, 300 of a drawing of 100 pixels a metre. */
function lights(): Driver {
  const d = new Driver().use('fixture');
  d.click(300, 300).click(500, 300);
  d.labels.length = 0;
  d.selection = new Set();
  return d;
}

function put(d: Driver, result: EditResult): string {
  if (result.kind !== 'change') throw new Error('it was refused');
  d.doc = apply(d.doc, result.change);
  return result.selected[0]!;
}

const wallAt600 = (d: Driver) =>
  put(
    d,
    placeFace(d.doc, {
      sheetId: 'sheet',
      foot: [
        { x: 200, y: 600 },
        { x: 900, y: 600 },
      ],
      top: null,
      heightMeters: 3,
    }),
  );

const world = (d: Driver) => ({
  doc: () => d.doc,
  sheetId: () => 'sheet',
  scale: () => d.scale,
});

describe('aim tool', () => {
  it('aims all chosen lights at a click on the ground, as one change', () => {
    const d = lights().use('aim');
    d.click(300, 300).click(500, 300, { shift: true, alt: false });
    expect(d.selection.size).toBe(2);
    d.click(400, 500);
    expect(d.labels).toEqual(['Aim 2']);
    for (const f of d.all('fixture'))
      expect(f.aim).toEqual({ kind: 'point', at: { x: 400, y: 500 }, heightMeters: 0 });
    expect(d.selection.size).toBe(2);
  });

  it('says what is missing when no light is chosen', () => {
    const d = lights().use('aim').click(800, 800);
    expect(d.labels).toEqual([]);
    expect(d.said).toEqual([expect.stringMatching(/Choose the lights/)]);
  });

  it('aims half-way up a wall or a crown that is met from above', () => {
    const d = lights();
    wallAt600(d);
    put(
      d,
      placeTree(d.doc, {
        sheetId: 'sheet',
        foot: { x: 700, y: 300 },
        outline: [
          { x: 650, y: 250 },
          { x: 750, y: 250 },
          { x: 700, y: 380 },
        ],
        heightMeters: 6,
        crownBaseMeters: 2,
      }),
    );
    d.use('aim').click(300, 300).click(500, 603);
    expect(d.all('fixture')[0]!.aim).toEqual({ kind: 'point', at: { x: 500, y: 600 }, heightMeters: 1.5 });
    d.click(700, 300);
    expect(d.all('fixture')[0]!.aim).toEqual({ kind: 'point', at: { x: 700, y: 300 }, heightMeters: 4 });
  });

  it('shows the aims before the click, and leaves none behind', () => {
    const d = lights().use('aim').click(300, 300);
    d.move(400, 500);
    expect(d.preview).toMatchObject({ kind: 'aim', at: { x: 400, y: 500 } });
    expect(d.preview?.kind === 'aim' && d.preview.aims.size).toBe(1);
    d.cancel();
    expect(d.preview).toBeNull();
    expect(d.all('fixture')[0]!.aim).toBeNull();
  });

  it('on a photo aims at the height that was clicked on a face', () => {
    const d = new Driver([{ ...sheet, view: 'photo', references: [] }, defaultSettings('us')]);
    d.use('fixture').click(300, 800).use('aim');
    put(
      d,
      placeFace(d.doc, {
        sheetId: 'sheet',
        foot: [
          { x: 200, y: 600 },
          { x: 800, y: 600 },
        ],
        top: [
          { x: 200, y: 300 },
          { x: 800, y: 300 },
        ],
        heightMeters: 3,
      }),
    );
    d.click(300, 800).click(500, 400);
    const { aim } = d.all('fixture')[0]!;
    if (aim?.kind !== 'point') throw new Error('it was not aimed at a place');
    expect(aim.at.x).toBeCloseTo(500, 6);
    expect(aim.at.y).toBeCloseTo(600, 6);
    expect(aim.heightMeters).toBeCloseTo(2, 6);
  });
});

describe('the cross of a chosen light', () => {
  const crossOf = (d: Driver, id: string) =>
    handlePlace({ zoom: () => d.zoom, markRadius: () => 13 }, drawnAim(world(d), id)!);

  it('is drawn clear of the mark of a light that shines straight down, and aims it when dragged', () => {
    const d = lights().use('select').click(300, 300);
    const id = d.all('fixture')[0]!.id;
    const cross = crossOf(d, id);
    expect(Math.hypot(cross.x - 300, cross.y - 300)).toBeGreaterThan(20);
    d.drag(cross, { x: 450, y: 700 });
    expect(d.labels).toEqual(['Aim']);
    expect(d.all('fixture')[0]!).toMatchObject({
      at: { x: 300, y: 300 },
      aim: { kind: 'point', at: { x: 450, y: 700 }, heightMeters: 0 },
    });
    expect(crossOf(d, id)).toEqual({ x: expect.closeTo(450, 6), y: expect.closeTo(700, 6) });
  });

  it('changes nothing when it is only pressed, or the gesture is given up', () => {
    const d = lights().use('select').click(300, 300);
    const cross = crossOf(d, d.all('fixture')[0]!.id);
    d.click(cross.x, cross.y);
    d.down(cross.x, cross.y).move(600, 600).cancel().up(600, 600);
    expect(d.labels).toEqual([]);
    expect(d.selection.size).toBe(1);
  });

  it('turns a tilted light and keeps it tilted', () => {
    const d = lights().use('select').click(300, 300);
    const [fixture] = d.all('fixture');
    const tilted = {
      ...fixture!,
      aim: { kind: 'tilt' as const, toward: { x: 400, y: 300 }, degreesFromDown: 60 },
    };
    d.doc = new Map([...d.doc, [tilted.id, tilted]]);
    d.drag(crossOf(d, tilted.id), { x: 300, y: 500 });
    const { aim } = d.all('fixture')[0]!;
    // The light stands 0.5 m high and shines 2 m away.
    const degrees = (Math.atan2(2, 0.5) * 180) / Math.PI;
    expect(aim).toEqual({
      kind: 'tilt',
      toward: { x: 300, y: 500 },
      degreesFromDown: expect.closeTo(degrees, 1),
    });
  });

  it('lets a finger draw', () => {
    const d = lights().use('select').click(300, 300);
    expect(d.host.touchDrag(crossOf(d, d.all('fixture')[0]!.id))).toBe('draw');
  });

  it('shows a beam on the ground 2·d·tan(β/2) wide', () => {
    const d = lights();
    const { edge } = drawnAim(world(d), d.all('fixture')[0]!.id)!;
    const xs = edge.flat().map((p) => p.x);
    // 120° from 0.5 m: the usual beam and height of a path light; 100 pixels a metre.
    expect(Math.max(...xs) - Math.min(...xs)).toBeCloseTo(100 * 2 * 0.5 * Math.tan(Math.PI / 3), 0);
  });
});

describe('aims in figures', () => {
  it('tell what the usual aim comes to, and take over direction, distance and height', () => {
    const d = lights();
    const [fixture] = d.all('fixture');
    expect(aimFigures(world(d), fixture!)).toMatchObject({
      kind: 'usual',
      direction: null,
      degreesFromDown: 0,
    });
    const at = aimWith(world(d), fixture!, {
      kind: 'point',
      direction: 90,
      distanceMeters: 2,
      heightMeters: 1.5,
    });
    expect(at).toEqual({
      kind: 'point',
      at: { x: expect.closeTo(500, 6), y: expect.closeTo(300, 6) },
      heightMeters: 1.5,
    });
    const aimed = { ...fixture!, aim: at! };
    d.doc = new Map([...d.doc, [aimed.id, aimed]]);
    expect(aimFigures(world(d), aimed)).toMatchObject({
      kind: 'point',
      direction: 90,
      distanceMeters: expect.closeTo(2, 6),
      heightMeters: 1.5,
    });
    // Up the sheet is 0°: the same distance, another way.
    expect(aimWith(world(d), aimed, { direction: 0 })).toMatchObject({
      at: { x: expect.closeTo(300, 6), y: expect.closeTo(100, 6) },
    });
    expect(aimWith(world(d), aimed, { kind: 'tilt' })).toMatchObject({
      kind: 'tilt',
      toward: { x: expect.closeTo(400, 6), y: expect.closeTo(300, 6) },
    });
    expect(aimWith(world(d), aimed, { kind: 'usual' })).toBeNull();
  });

  it('can’t be told without a scale', () => {
    const d = new Driver([{ ...sheet, references: [] }, defaultSettings('us')]);
    d.use('fixture').click(300, 300);
    const [fixture] = d.all('fixture');
    expect(aimFigures(world(d), fixture!)).toBeNull();
    expect(aimWith(world(d), fixture!, { kind: 'tilt' })).toBeUndefined();
    expect(aimWith(world(d), fixture!, { kind: 'usual' })).toBeNull();
  });
});

import { defaultSettings, type SheetRecord } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { Driver, sheet } from './driver.testkit';

/**
 * A rendered yard, 2400 × 1600, whose camera stood 4.6 m high: its patio as the only reference, and pixels of
 * things on it.
 */
const photo: SheetRecord = {
  ...sheet,
  widthPx: 2400,
  heightPx: 1600,
  view: 'photo',
  references: [
    {
      id: 'patio',
      kind: 'rectangle',
      corners: [
        { x: 786.09, y: 789.32 },
        { x: 1392.94, y: 797.98 },
        { x: 1379.13, y: 719.09 },
        { x: 869.12, y: 712.98 },
      ],
      widthMeters: 6,
      depthMeters: 3.6,
    },
  ],
};
const wallLeft = { x: 1409.68, y: 720.75 };
const wallRight = { x: 1958.3, y: 726.03 };
const overRight = { x: 1985.7, y: 463.3 };

const onPhoto = () => new Driver([photo, defaultSettings('us')]);
const scaleless = () => new Driver([{ ...photo, references: [] }, defaultSettings('us')]);

describe('wall face tool', () => {
  it('on a photo, takes the foot, then the upper edge, and asks with the height that the camera tells', () => {
    const d = onPhoto().use('face');
    d.click(wallRight.x, wallRight.y).click(wallLeft.x, wallLeft.y);
    // A lifted finger leaves no pointer behind: the foot is not whole for that.
    d.host.handle({ type: 'leave' });
    expect(d.preview).toMatchObject({ kind: 'face', pending: null, waitsForTop: false });
    d.key('Enter');
    expect(d.preview).toMatchObject({ kind: 'face', waitsForTop: true });
    expect(d.requests).toEqual([]);
    d.move(overRight.x, overRight.y);
    expect(d.preview).toMatchObject({ kind: 'face', foot: [wallRight, wallLeft] });
    d.click(overRight.x, overRight.y);
    const [request] = d.requests;
    if (request?.kind !== 'face' || request.top === null) throw new Error('no height was asked');
    // Read off the picture by other references: 2.97 m from the ground to under the eaves.
    expect(request.seenMeters).toBeCloseTo(2.97, 1);
    expect(Math.hypot(request.top[0]!.x - overRight.x, request.top[0]!.y - overRight.y)).toBeLessThan(2);
    // The eaves run level through the picture (within 8 px over half of the house).
    expect(Math.abs(request.top[1]!.y - overRight.y)).toBeLessThan(8);
    expect(d.preview).toBeNull();
    expect(d.labels).toEqual([]);
  });

  it('ends the foot with a double click without taking it for the upper edge', () => {
    const d = onPhoto().use('face');
    d.click(wallRight.x, wallRight.y).doubleClick(wallLeft.x, wallLeft.y);
    expect(d.requests).toEqual([]);
    d.click(overRight.x, overRight.y);
    expect(d.requests).toHaveLength(1);
  });

  it('without a scale keeps the upper edge as far over the foot everywhere, and tells no height', () => {
    const d = scaleless().use('face');
    d.click(100, 900).click(700, 950).key('Enter');
    d.click(110, 600);
    expect(d.requests).toEqual([
      {
        kind: 'face',
        foot: [
          { x: 100, y: 900 },
          { x: 700, y: 950 },
        ],
        top: [
          { x: 110, y: 600 },
          { x: 710, y: 650 },
        ],
        seenMeters: null,
      },
    ]);
  });

  it('on a drawing from above takes the foot alone', () => {
    const d = new Driver().use('face');
    d.click(100, 100).click(400, 100).click(400, 300).key('Enter');
    expect(d.requests).toMatchObject([{ kind: 'face', top: null, seenMeters: null }]);
  });

  it('goes back step by step, and gives all up with the tool', () => {
    const d = onPhoto().use('face');
    d.click(wallRight.x, wallRight.y).click(wallLeft.x, wallLeft.y).key('Enter');
    expect(d.key('Escape')).toBe(true);
    expect(d.key('Escape')).toBe(false);
    d.click(wallRight.x, wallRight.y).click(wallLeft.x, wallLeft.y).key('Enter');
    d.use('select').use('face');
    expect(d.preview).toBeNull();
    expect(d.requests).toEqual([]);
  });

  it('wants two points on the ground and a click above them', () => {
    const d = onPhoto().use('face');
    d.click(wallRight.x, wallRight.y).key('Enter');
    expect(d.said.at(-1)).toMatch(/two points/);
    d.click(1200, 20).key('Enter');
    expect(d.said.at(-1)).toMatch(/above the horizon/);
    d.click(wallRight.x, wallRight.y).click(wallLeft.x, wallLeft.y).key('Enter');
    d.click(wallRight.x, wallRight.y + 30);
    expect(d.said.at(-1)).toMatch(/upper edge/);
    expect(d.requests).toEqual([]);
  });

  it('lets one finger pan', () => {
    const d = onPhoto().use('face');
    expect(d.host.touchDrag({ x: 5, y: 5 })).toBe('pan');
  });
});

describe('tree tool', () => {
  const crown = [
    [2110, 300],
    [2260, 220],
    [2380, 330],
    [2240, 450],
  ] as const;

  it('takes where it stands and the crown by corners, and asks with the heights that the camera tells', () => {
    const d = onPhoto().use('tree');
    d.click(2191.66, 820.29);
    for (const [x, y] of crown) d.click(x, y);
    d.key('Enter');
    const [request] = d.requests;
    if (request?.kind !== 'tree') throw new Error('nothing was asked');
    expect(request.foot).toEqual({ x: 2191.66, y: 820.29 });
    expect(request.outline).toHaveLength(4);
    expect(request.seen!.heightMeters).toBeGreaterThan(request.seen!.crownBaseMeters + 1);
    expect(request.seen!.crownBaseMeters).toBeGreaterThan(2);
    expect(d.preview).toBeNull();
  });

  it('takes the crown in one stroke, with a finger too', () => {
    const d = onPhoto().use('tree');
    expect(d.host.touchDrag({ x: 300, y: 900 })).toBe('pan');
    d.click(300, 900);
    expect(d.host.touchDrag({ x: 300, y: 900 })).toBe('draw');
    d.down(200, 700);
    for (let i = 0; i <= 60; i++) {
      const a = (i / 60) * 2 * Math.PI;
      d.move(300 - 100 * Math.cos(a), 700 - 100 * Math.sin(a));
    }
    d.up(200, 700);
    const [request] = d.requests;
    if (request?.kind !== 'tree') throw new Error('nothing was asked');
    expect(request.outline.length).toBeLessThan(40);
    expect(request.outline.length).toBeGreaterThan(5);
  });

  it('tells a crown that comes down to the ground for a shrub', () => {
    const d = onPhoto().use('tree');
    d.click(1530, 735).click(1500, 735).click(1530, 650).click(1570, 735).key('Enter');
    expect(d.requests).toMatchObject([{ kind: 'tree', seen: { crownBaseMeters: 0 } }]);
  });

  it('tells no heights from above or without a scale', () => {
    for (const d of [new Driver(), scaleless()]) {
      d.use('tree').click(300, 900).click(200, 700).click(400, 700).click(300, 600).key('Enter');
      expect(d.requests).toMatchObject([{ kind: 'tree', seen: null }]);
    }
  });

  it('goes back corner by corner, then to where it stands', () => {
    const d = onPhoto().use('tree');
    d.click(300, 900).click(200, 700);
    expect(d.key('Escape')).toBe(true);
    expect(d.preview).toMatchObject({ kind: 'tree', outline: [] });
    expect(d.key('Escape')).toBe(true);
    expect(d.key('Escape')).toBe(false);
    d.click(1200, 20);
    expect(d.said.at(-1)).toMatch(/above the horizon/);
  });

  it('forgets a stroke that a second finger ended', () => {
    const d = onPhoto().use('tree');
    d.click(300, 900).down(200, 700).move(260, 760).move(300, 800).cancel().up(300, 800);
    expect(d.requests).toEqual([]);
    expect(d.preview).toMatchObject({ kind: 'tree', outline: [] });
  });
});

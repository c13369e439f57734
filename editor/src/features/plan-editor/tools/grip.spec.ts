import { apply, type EditResult, placeFace, placeTree } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { Driver } from './driver.testkit';

const foot = [
  { x: 200, y: 600 },
  { x: 800, y: 620 },
];
const top = [
  { x: 210, y: 300 },
  { x: 790, y: 330 },
];
const outline = [
  { x: 1000, y: 200 },
  { x: 1200, y: 200 },
  { x: 1200, y: 400 },
  { x: 1000, y: 400 },
];

function garden(): Driver {
  const d = new Driver();
  const put = (result: EditResult) => {
    if (result.kind !== 'change') throw new Error('it was refused');
    d.doc = apply(d.doc, result.change);
  };
  put(placeFace(d.doc, { sheetId: 'sheet', foot, top, heightMeters: 3 }));
  put(
    placeTree(d.doc, {
      sheetId: 'sheet',
      foot: { x: 1100, y: 700 },
      outline,
      heightMeters: 6,
      crownBaseMeters: 2,
    }),
  );
  return d.use('select');
}

describe('wall faces and trees under the pointer', () => {
  it('are hit by their edges and the tree by its foot, not by what they cover', () => {
    const d = garden();
    const [face] = d.all('face');
    const [tree] = d.all('tree');
    for (const [x, y, id] of [
      [500, 610, face!.id],
      [500, 316, face!.id],
      [205, 450, face!.id],
      [1100, 203, tree!.id],
      [1000, 300, tree!.id],
      [1102, 698, tree!.id],
    ] as const) {
      d.click(x, y);
      expect([...d.selection]).toEqual([id]);
    }
    for (const [x, y] of [
      [500, 450],
      [1100, 300],
      [1100, 550],
    ] as const) {
      d.click(x, y);
      expect(d.selection.size).toBe(0);
    }
  });

  it('lie in a box only with all that is of them', () => {
    const d = garden();
    d.drag({ x: 150, y: 250 }, { x: 850, y: 650 });
    expect([...d.selection]).toEqual([d.all('face')[0]!.id]);
    d.drag({ x: 950, y: 150 }, { x: 1250, y: 450 });
    expect(d.selection.size).toBe(0);
  });
});

describe('reshaping', () => {
  it('moves one upper point alone', () => {
    const d = garden();
    d.click(500, 610).drag(top[1]!, { x: 780, y: 360 });
    expect(d.labels).toEqual(['Reshape wall face']);
    expect(d.all('face')[0]).toMatchObject({ foot, top: [top[0], { x: 780, y: 360 }] });
  });

  it('takes what stands on a foot point along with it, and shows it on the way', () => {
    const d = garden();
    d.click(500, 610);
    d.down(800, 620).move(850, 630);
    expect(d.preview).toMatchObject({ kind: 'face', foot: [foot[0], { x: 850, y: 630 }] });
    d.up(850, 630);
    expect(d.all('face')[0]).toMatchObject({
      foot: [foot[0], { x: 850, y: 630 }],
      top: [top[0], { x: 840, y: 340 }],
    });
  });

  it('moves a corner of a crown, and where the tree stands, each as one change', () => {
    const d = garden();
    d.click(1100, 200).drag(outline[2]!, { x: 1250, y: 420 });
    d.drag({ x: 1100, y: 700 }, { x: 1110, y: 720 });
    expect(d.labels).toEqual(['Reshape tree', 'Reshape tree']);
    const [tree] = d.all('tree');
    expect(tree!.outline[2]).toEqual({ x: 1250, y: 420 });
    expect(tree!.outline[0]).toEqual(outline[0]);
    expect(tree!.foot).toEqual({ x: 1110, y: 720 });
  });

  it('moves the whole by an edge between its corners', () => {
    const d = garden();
    d.click(1100, 200).drag({ x: 1100, y: 200 }, { x: 1110, y: 230 });
    expect(d.labels).toEqual(['Move']);
    expect(d.all('tree')[0]).toMatchObject({ foot: { x: 1110, y: 730 } });
  });
});

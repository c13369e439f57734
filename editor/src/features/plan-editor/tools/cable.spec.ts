import { describe, expect, it } from 'vitest';
import { Driver, yardWith } from './driver.testkit';

describe('cable tool', () => {
  it('draws a daisy chain from mark to mark as one change', () => {
    const d = yardWith(3);
    d.use('cable').click(100, 100).click(300, 100).click(500, 100).click(700, 100);
    expect(d.labels).toEqual([]);
    d.key('Enter');
    expect(d.labels).toEqual(['Draw cable']);
    expect(d.all('cable')).toHaveLength(3);
    expect(d.all('run')).toHaveLength(1);
    expect(d.all('cable').every((c) => c.runId === d.all('run')[0]!.id)).toBe(true);
  });

  it('ends on a double click and counts its place once', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(200, 150).doubleClick(300, 100);
    expect(d.all('cable')).toHaveLength(1);
    expect(d.all('cable')[0]!.via).toEqual([{ x: 200, y: 150 }]);
  });

  it('takes back points with Escape, one at a time, and then leaves the key to others', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(200, 150).click(250, 200);
    expect(d.key('Escape')).toBe(true);
    expect(d.preview).toMatchObject({
      kind: 'cable',
      points: [
        { x: 100, y: 100 },
        { x: 200, y: 150 },
      ],
    });
    d.key('Escape');
    d.key('Escape');
    expect(d.key('Escape')).toBe(false);
    expect(d.labels).toEqual([]);
  });

  it('snaps onto marks and onto cable, where it makes a splice: a tee', () => {
    const d = yardWith(2);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    d.use('cable').move(200, 105);
    expect(d.preview).toMatchObject({ pending: { x: 200, y: 100 }, snap: { x: 200, y: 100 } });
    d.click(200, 105).click(500, 100).key('Enter');
    expect(d.all('junction').map((j) => j.style)).toEqual(['splice']);
    expect(d.all('cable')).toHaveLength(3);
    expect(d.all('run')).toHaveLength(1);
  });

  it('goes a typed length at a typed angle, or the way of the pointer', () => {
    const d = yardWith(0);
    d.use('cable').click(100, 100).typed(2, 0);
    expect(d.preview).toMatchObject({ points: [{ x: 100 }, { x: expect.closeTo(300, 6) }] });
    d.move(300, 400).typed(1.5, null);
    const preview = d.preview;
    if (preview?.kind !== 'cable') throw new Error('no cable is being drawn');
    expect(preview.points[2]!.x).toBeCloseTo(300, 6);
    expect(preview.points[2]!.y).toBeCloseTo(250, 6);
  });

  it('counts angles counter-clockwise: 90 degrees is up the plan', () => {
    const d = yardWith(0);
    d.use('cable').click(100, 500).typed(1, 90);
    const preview = d.preview;
    if (preview?.kind !== 'cable') throw new Error('no cable is being drawn');
    expect(preview.points[1]!.x).toBeCloseTo(100, 6);
    expect(preview.points[1]!.y).toBeCloseTo(400, 6);
  });

  it('says that typed lengths need a scale', () => {
    const unscaled = yardWith(0);
    const bare = new Driver(
      [...unscaled.doc.values()].map((r) => (r.kind === 'sheet' ? { ...r, references: [] } : r)),
    );
    bare.use('cable').click(100, 100).typed(1, 0);
    expect(bare.said).toEqual(['Set the scale of this sheet first; lengths need it.']);
  });

  it('asks for marked to marked before it closes a loop, and draws it when confirmed', () => {
    const d = yardWith(2);
    d.use('cable').click(100, 100).click(300, 100).click(500, 100).key('Enter');
    d.click(500, 100).click(300, 300).click(300, 100).key('Enter');
    expect(d.all('cable')).toHaveLength(2);
    const [request] = d.requests;
    if (request?.kind !== 'confirm') throw new Error('nothing was asked');
    request.proceed();
    expect(d.all('cable')).toHaveLength(3);
    expect(d.all('cable').filter((c) => c.markedToMarked)).toHaveLength(1);
    expect(d.preview?.kind === 'cable' ? d.preview.points : []).toEqual([]);
  });

  it('keeps the drawing and says why when a join is refused', () => {
    const d = yardWith(2);
    d.use('transformer').click(100, 600);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    d.click(100, 600).click(500, 100).key('Enter');
    const cables = d.all('cable').length;
    d.click(300, 100).click(500, 100).key('Enter');
    expect(d.all('cable')).toHaveLength(cables);
    expect(d.said.at(-1)).toMatch(/transformer/i);
    expect(d.preview).toMatchObject({ kind: 'cable', points: [{ x: 300 }, { x: 500 }] });
  });

  it('needs two ends', () => {
    const d = yardWith(0);
    d.use('cable').click(100, 100).key('Enter');
    expect(d.said).toEqual(['A cable needs two ends: click where it starts and where it goes.']);
  });

  it('gives up only the click, not the points before it, when a second finger comes', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).down(300, 100).cancel().up(300, 100);
    d.move(400, 400);
    expect(d.preview).toMatchObject({ points: [{ x: 100, y: 100 }] });
  });

  it('gives up everything unfinished when another tool is taken up', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(300, 100).use('select').use('cable');
    expect(d.preview).toBeNull();
    expect(d.all('cable')).toHaveLength(0);
  });
});

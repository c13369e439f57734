import { describe, expect, it } from 'vitest';
import { Driver } from './driver.testkit';

describe('area tool', () => {
  it('asks what a clicked polygon is when it is closed on its first corner', () => {
    const d = new Driver().use('area');
    d.click(100, 100).click(300, 100).click(300, 300).click(103, 102);
    expect(d.requests).toEqual([
      {
        kind: 'area',
        points: [
          { x: 100, y: 100 },
          { x: 300, y: 100 },
          { x: 300, y: 300 },
        ],
      },
    ]);
    expect(d.preview).toBeNull();
  });

  it('takes a double click on the first corner for one closing', () => {
    const d = new Driver().use('area');
    d.click(100, 100).click(300, 100).click(300, 300).doubleClick(100, 100);
    expect(d.requests).toHaveLength(1);
    expect(d.said).toEqual([]);
    expect(d.preview).toBeNull();
  });

  it('closes on Enter, takes back corners on Escape, and needs three', () => {
    const d = new Driver().use('area');
    d.click(100, 100).click(300, 100).click(300, 300);
    d.key('Escape');
    d.key('Enter');
    expect(d.said).toEqual(['An area needs at least three corners.']);
    d.click(300, 300).key('Enter');
    expect(d.requests).toHaveLength(1);
  });

  it('takes one stroke for an outline and thins it', () => {
    const d = new Driver().use('area');
    d.down(100, 100);
    for (let i = 1; i <= 50; i++) d.move(100 + 4 * i, 100);
    for (let i = 1; i <= 50; i++) d.move(300, 100 + 4 * i);
    for (let i = 1; i <= 50; i++) d.move(300 - 4 * i, 300 - 4 * i);
    d.up(100, 100);
    const [request] = d.requests;
    if (request?.kind !== 'area') throw new Error('nothing was asked');
    expect(request.points.length).toBeLessThan(8);
    expect(request.points.length).toBeGreaterThanOrEqual(3);
  });

  it('forgets a stroke that was cancelled', () => {
    const d = new Driver().use('area');
    d.down(100, 100).move(200, 100).move(300, 200).cancel().up(300, 300);
    expect(d.requests).toEqual([]);
    expect(d.preview).toBeNull();
  });
});

describe('measure tool', () => {
  it('keeps a measurement of its points as one change', () => {
    const d = new Driver().use('measure');
    d.click(100, 100).click(400, 100).doubleClick(400, 500);
    expect(d.labels).toEqual(['Measure']);
    expect(d.all('measurement')[0]!.points).toEqual([
      { x: 100, y: 100 },
      { x: 400, y: 100 },
      { x: 400, y: 500 },
    ]);
  });
});

describe('scale tool', () => {
  it('asks for the length between two clicks', () => {
    const d = new Driver().use('scale');
    d.click(100, 100).click(400, 100);
    expect(d.requests).toEqual([{ kind: 'scale-length', a: { x: 100, y: 100 }, b: { x: 400, y: 100 } }]);
  });

  it('asks for the sides after four corners of a rectangle', () => {
    const d = new Driver().use('scale');
    d.choices = { ...d.choices, reference: 'rectangle' };
    d.click(100, 100).click(400, 100).click(400, 300);
    expect(d.requests).toEqual([]);
    expect(d.preview).toMatchObject({ kind: 'scale', shape: 'rectangle' });
    d.click(100, 300);
    expect(d.requests).toMatchObject([{ kind: 'scale-rectangle' }]);
  });

  it('says what is missing when a rectangle is ended early', () => {
    const d = new Driver().use('scale');
    d.choices = { ...d.choices, reference: 'rectangle' };
    d.click(100, 100).click(400, 100).click(400, 300).key('Enter');
    expect(d.said).toEqual(['Click the four corners of the rectangle, in order around it.']);
  });
});

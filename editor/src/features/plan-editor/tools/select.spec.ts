import { describe, expect, it } from 'vitest';
import { yardWith } from './driver.testkit';

describe('select tool', () => {
  it('chooses on click, adds and takes away with shift, and lets go on empty ground', () => {
    const d = yardWith(3);
    const [a, b] = d.all('fixture');
    d.click(300, 100);
    expect([...d.selection]).toEqual([a!.id]);
    d.click(500, 100, { shift: true, alt: false });
    expect([...d.selection]).toEqual([a!.id, b!.id]);
    d.click(300, 100, { shift: true, alt: false });
    expect([...d.selection]).toEqual([b!.id]);
    d.click(900, 900);
    expect(d.selection.size).toBe(0);
    expect(d.labels).toEqual([]);
  });

  it('chooses what lies whole in a box', () => {
    const d = yardWith(3);
    d.drag({ x: 250, y: 50 }, { x: 550, y: 150 });
    expect(d.selection.size).toBe(2);
    d.down(650, 50, { shift: true, alt: false }).move(750, 150).up(750, 150);
    expect(d.selection.size).toBe(3);
  });

  it('moves what is chosen in one change, and cable ends follow', () => {
    const d = yardWith(2);
    d.use('cable').click(300, 100).click(500, 100).key('Enter');
    d.use('select').click(300, 100);
    const before = d.all('cable')[0];
    d.labels.length = 0;
    d.drag({ x: 300, y: 100 }, { x: 340, y: 190 });
    expect(d.labels).toEqual(['Move']);
    expect(d.all('fixture')[0]!.at).toEqual({ x: 340, y: 190 });
    expect(d.all('cable')[0]).toEqual(before);
  });

  it('shows the move while it runs and changes nothing yet', () => {
    const d = yardWith(1);
    d.down(300, 100).move(320, 130);
    expect(d.preview).toMatchObject({ kind: 'move', dx: 20, dy: 30 });
    expect(d.labels).toEqual([]);
  });

  it('discards the gesture when the pointer is cancelled', () => {
    const d = yardWith(1);
    d.down(300, 100).move(400, 300).cancel().up(400, 300);
    expect(d.preview).toBeNull();
    expect(d.labels).toEqual([]);
    expect(d.all('fixture')[0]!.at).toEqual({ x: 300, y: 100 });
  });

  it('takes a press that hardly moves for a click', () => {
    const d = yardWith(1);
    d.down(300, 100).move(302, 101).up(302, 101);
    expect(d.labels).toEqual([]);
  });

  it('bends a chosen cable where it is dragged, and moves the bend afterwards', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    d.use('select').drag({ x: 200, y: 100 }, { x: 200, y: 180 });
    expect(d.all('cable')[0]!.via).toEqual([{ x: 200, y: 180 }]);
    d.drag({ x: 200, y: 180 }, { x: 220, y: 240 });
    expect(d.all('cable')[0]!.via).toEqual([{ x: 220, y: 240 }]);
  });

  it('lets go of a gesture, then of the choice, on Escape; and then leaves the key to others', () => {
    const d = yardWith(1);
    d.down(300, 100).move(350, 100);
    expect(d.key('Escape')).toBe(true);
    expect(d.selection.size).toBe(1);
    expect(d.key('Escape')).toBe(true);
    expect(d.selection.size).toBe(0);
    expect(d.key('Escape')).toBe(false);
  });

  it('drags a mark by one finger only when it is chosen; elsewhere one finger pans', () => {
    const d = yardWith(1);
    expect(d.host.touchDrag({ x: 300, y: 100 })).toBe('pan');
    d.click(300, 100);
    expect(d.host.touchDrag({ x: 300, y: 100 })).toBe('draw');
    expect(d.host.touchDrag({ x: 700, y: 700 })).toBe('pan');
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Box, overlap } from './camera';
import { type LabelWish, placeLabels } from './labels';

const window = { width: 900, height: 600 };
const mark = (x: number, y: number, r: number): Box => ({
  left: x - r,
  top: y - r,
  right: x + r,
  bottom: y + r,
});
const wish = (id: string, x: number, y: number, rank = 1): LabelWish => ({
  id,
  at: { x, y },
  clear: 13,
  size: { width: 70, height: 19 },
  rank,
});

describe('placing labels', () => {
  it('never covers another label or a mark, and never leaves the window', () => {
    const spot = fc.record({
      x: fc.integer({ min: -50, max: 950 }),
      y: fc.integer({ min: -50, max: 650 }),
      rank: fc.integer({ min: 0, max: 5 }),
      wide: fc.integer({ min: 20, max: 160 }),
      wants: fc.boolean(),
    });
    fc.assert(
      fc.property(fc.array(spot, { maxLength: 60 }), (spots) => {
        const marks = spots.map((s) => mark(s.x, s.y, 13));
        const wishes = spots.flatMap((s, i) =>
          s.wants ? [{ ...wish(`f${i}`, s.x, s.y, s.rank), size: { width: s.wide, height: 19 } }] : [],
        );
        const placed = placeLabels(wishes, marks, window);
        placed.forEach(({ box }, i) => {
          for (const m of marks) expect(overlap(box, m)).toBe(false);
          for (const other of placed.slice(i + 1)) expect(overlap(box, other.box)).toBe(false);
          expect(box.left >= 0 && box.top >= 0 && box.right <= 900 && box.bottom <= 600).toBe(true);
        });
      }),
      { seed: 20_261, numRuns: 300 },
    );
  });

  it('gives room to the higher rank first, and leaves out what finds none', () => {
    // A ring of marks leaves one gap, to the right of the two that stand on one spot.
    const at = { x: 300, y: 300 };
    const wall: Box[] = [
      { left: 0, top: 0, right: 900, bottom: 285 },
      { left: 0, top: 315, right: 900, bottom: 600 },
      { left: 0, top: 285, right: 287, bottom: 315 },
      { left: 395, top: 285, right: 900, bottom: 315 },
    ];
    const placed = placeLabels([wish('low', at.x, at.y, 1), wish('high', at.x, at.y, 3)], wall, window);
    expect(placed.map((p) => p.id)).toEqual(['high']);
  });

  it('stands beside its mark when it is alone', () => {
    const [placed] = placeLabels([wish('a', 200, 200)], [mark(200, 200, 13)], window);
    expect(placed?.box).toEqual({ left: 218, top: 190.5, right: 288, bottom: 209.5 });
  });

  it('gives the same answer whatever the order of the wishes', () => {
    const wishes = [wish('a', 200, 200), wish('b', 230, 205), wish('c', 210, 230, 2)];
    const marks = wishes.map((w) => mark(w.at.x, w.at.y, 13));
    const one = placeLabels(wishes, marks, window);
    const other = placeLabels([...wishes].reverse(), marks, window);
    expect(other).toEqual(one);
  });
});

import { describe, expect, it } from 'vitest';
import { type Box, boxAround, crosses, Room, type Wire } from './room.js';

const frame: Box = { left: 0, top: 0, right: 500, bottom: 600 };

/** Mulberry32: the same numbers for the same seed. */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

describe('room for tags', () => {
  it('a line crosses a box that it only clips, and not one that it passes by', () => {
    const box = boxAround({ x: 10, y: 10 }, 10, 10);
    expect(crosses({ a: { x: 0, y: 8 }, b: { x: 8, y: 0 } }, box)).toBe(false);
    expect(crosses({ a: { x: 0, y: 11 }, b: { x: 11, y: 0 } }, box)).toBe(true);
    expect(crosses({ a: { x: -50, y: 10 }, b: { x: 50, y: 10 } }, box)).toBe(true);
    expect(crosses({ a: { x: 10, y: 10 }, b: { x: 10, y: 10 } }, box)).toBe(true);
  });

  it.each([1, 2, 3, 4, 5])('no wire, tag or frame crosses a tag (seed %i)', (seed) => {
    const random = seeded(seed);
    const marks = Array.from({ length: 120 }, (_, i) => ({
      id: `m${i}`,
      at: { x: 20 + random() * 460, y: 20 + random() * 560 },
      width: 13 + random() * 8,
      height: 13,
    }));
    const wires: Wire[] = marks.slice(1).map((mark, i) => ({
      a: marks[i]!.at,
      b: { x: mark.at.x, y: marks[i]!.at.y },
      ends: [marks[i]!.id, mark.id],
    }));
    const placed = new Room(frame, wires).place(marks);
    expect(placed.length).toBeGreaterThan(60);
    expect(placed.some(({ aside }) => aside)).toBe(true);
    expect(placed.some(({ aside }) => !aside)).toBe(true);
    const boxes = placed.map(({ id, at, aside }) => {
      const { width, height } = marks.find((mark) => mark.id === id)!;
      return { id, aside, box: boxAround(at, width, height) };
    });
    for (const [i, { id, aside, box }] of boxes.entries()) {
      expect(box.left >= 0 && box.right <= 500 && box.top >= 0 && box.bottom <= 600).toBe(true);
      for (const wire of wires)
        if (aside || !wire.ends.includes(id)) expect(crosses(wire, box), `${id} in the way`).toBe(false);
      for (const other of boxes.slice(i + 1))
        expect(
          box.left < other.box.right &&
            other.box.left < box.right &&
            box.top < other.box.bottom &&
            other.box.top < box.bottom,
          `${id} and ${other.id}`,
        ).toBe(false);
    }
  });

  it('leaves out what has no room rather than squeezing it in', () => {
    const marks = Array.from({ length: 40 }, (_, i) => ({
      id: `m${i}`,
      at: { x: 20, y: 20 },
      width: 13,
      height: 13,
    }));
    const small = new Room({ left: 0, top: 0, right: 40, bottom: 40 }, []).place(marks);
    expect(small.length).toBeLessThan(10);
  });
});

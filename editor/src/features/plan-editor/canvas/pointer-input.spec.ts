import { describe, expect, it } from 'vitest';
import type { ToolEvent } from '../tools/tool';
import { PointerInput, type PointerSample, readWheel } from './pointer-input';

function setUp({ draws = false, readOnly = false } = {}) {
  const events: string[] = [];
  const pans: [number, number][] = [];
  const zooms: number[] = [];
  const input = new PointerInput({
    camera: () => ({ x: 10, y: 20, zoom: 2 }),
    tool: (event: ToolEvent) =>
      events.push('at' in event ? `${event.type} ${event.at.x},${event.at.y}` : event.type),
    touchDrag: () => (draws ? 'draw' : 'pan'),
    pan: (dx, dy) => pans.push([dx, dy]),
    zoom: (factor) => zooms.push(factor),
    readOnly: () => readOnly,
    panning: () => {},
  });
  let time = 0;
  const sample = (x: number, y: number, more: Partial<PointerSample> = {}): PointerSample => {
    time += 1000;
    const mods = { shift: false, alt: false };
    return { id: 1, type: 'mouse', at: { x, y }, button: 0, mods, time, ...more };
  };
  return { input, events, pans, zooms, sample };
}

describe('pointers', () => {
  it('hand the tool sheet pixels', () => {
    const { input, events, sample } = setUp();
    input.down(sample(110, 220));
    input.move(sample(130, 220));
    input.up(sample(130, 220));
    expect(events).toEqual(['down 50,100', 'move 60,100', 'up 60,100']);
  });

  it('pan by the middle button and with the space bar, and the tool hears nothing', () => {
    const { input, events, pans, sample } = setUp();
    input.down(sample(0, 0, { button: 1 }));
    input.move(sample(5, 7));
    input.up(sample(5, 7, { button: 1 }));
    input.space(true);
    input.down(sample(0, 0));
    input.move(sample(-3, 0));
    input.up(sample(-3, 0));
    expect(pans).toEqual([
      [5, 7],
      [-3, 0],
    ]);
    expect(events).toEqual([]);
  });

  it('end what one finger draws when a second comes down; two fingers pan and zoom', () => {
    const { input, events, zooms, sample } = setUp({ draws: true });
    const touch = (id: number, x: number, y: number) => sample(x, y, { id, type: 'touch' });
    input.down(touch(1, 100, 100));
    input.move(touch(1, 120, 100));
    input.down(touch(2, 200, 100));
    input.move(touch(2, 280, 100));
    input.up(touch(2, 280, 100));
    input.move(touch(1, 10, 10));
    input.up(touch(1, 10, 10));
    expect(events).toEqual(['down 45,40', 'move 55,40', 'cancel']);
    expect(zooms).toEqual([2]);
  });

  it('pan with one finger where there is nothing to draw, and tap where it stays', () => {
    const { input, events, pans, sample } = setUp();
    const touch = (x: number, y: number) => sample(x, y, { type: 'touch' });
    input.down(touch(100, 100));
    input.move(touch(140, 100));
    input.up(touch(140, 100));
    expect(events).toEqual([]);
    expect(pans).toEqual([[40, 0]]);
    input.down(touch(110, 220));
    input.move(touch(112, 221));
    input.up(touch(110, 220));
    expect(events).toEqual(['down 50,100', 'up 50,100', 'leave']);
  });

  it('only pan by touch once a pen is in use', () => {
    const { input, events, sample } = setUp({ draws: true });
    input.down(sample(10, 20, { type: 'pen', id: 5 }));
    input.up(sample(10, 20, { type: 'pen', id: 5 }));
    events.length = 0;
    input.down(sample(100, 100, { type: 'touch' }));
    input.move(sample(200, 100, { type: 'touch' }));
    input.up(sample(200, 100, { type: 'touch' }));
    expect(events).toEqual([]);
  });

  it('discard a cancelled gesture', () => {
    const { input, events, sample } = setUp();
    input.down(sample(10, 20));
    input.cancel(1);
    input.up(sample(50, 50));
    expect(events).toEqual(['down 0,0', 'cancel']);
  });

  it('tell a double click by time and place', () => {
    const { input, events, sample } = setUp();
    const at = (x: number, time: number) => sample(x, 20, { time });
    for (const p of [at(10, 0), at(12, 200)]) {
      input.down(p);
      input.up(p);
    }
    expect(events.at(-1)).toBe('double 1,0');
    for (const p of [at(10, 5000), at(10, 6000), at(200, 6100)]) {
      input.down(p);
      input.up(p);
    }
    expect(events.filter((e) => e.startsWith('double'))).toHaveLength(1);
  });

  it('let viewers pan and choose, never drag', () => {
    const { input, events, pans, sample } = setUp({ readOnly: true, draws: true });
    input.down(sample(10, 20));
    input.move(sample(60, 20));
    input.up(sample(60, 20));
    expect(pans).toEqual([[50, 0]]);
    expect(events).toEqual([]);
    input.down(sample(10, 20));
    input.up(sample(10, 20));
    expect(events).toEqual(['down 0,0', 'up 0,0']);
  });
});

describe('the wheel', () => {
  const wheel = { deltaX: 0, deltaY: 0, deltaMode: 0, ctrl: false, shift: false };
  it('zooms by a mouse and by a pinch, pans by a trackpad', () => {
    expect(readWheel({ ...wheel, deltaY: 100 })).toEqual({ zoom: expect.closeTo(Math.exp(-0.16), 9) });
    expect(readWheel({ ...wheel, deltaY: 3, deltaMode: 1 })).toHaveProperty('zoom');
    expect(readWheel({ ...wheel, deltaY: 2.5, ctrl: true })).toEqual({
      zoom: expect.closeTo(Math.exp(-0.025), 9),
    });
    expect(readWheel({ ...wheel, deltaX: 4, deltaY: 9 })).toEqual({ dx: -4, dy: -9 });
    expect(readWheel({ ...wheel, deltaY: 100, shift: true })).toEqual({ dx: -100, dy: 0 });
  });
});

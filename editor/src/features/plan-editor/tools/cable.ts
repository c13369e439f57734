import { type CableStop, drawCable } from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';
import { stepOnGround } from './ground';
import { placeOf, snapStop } from './snap';
import { distance, type Preview, settle, type Tool, type ToolContext } from './tool';

/** Two clicks closer than this, in window pixels, are the two halves of a double click. */
const SAME_PLACE = 4;

/**
 * Draws cable click to click: onto marks and cable it snaps, on the ground it bends. Typed lengths and angles
 * count from the last point. Esc takes back the last point, Enter or a double click ends.
 */
export function createCableTool(ctx: ToolContext): Tool {
  let stops: readonly CableStop[] = [];
  let pointer: Point | null = null;
  let pressed = false;

  const set = (next: readonly CableStop[]): void => {
    stops = next;
    ctx.changed();
  };

  const same = (a: CableStop, b: CableStop): boolean => {
    if (a.on === 'record' && b.on === 'record') return a.id === b.id;
    const p = placeOf(ctx, a);
    const q = placeOf(ctx, b);
    return p !== null && q !== null && distance(p, q) * ctx.zoom() < SAME_PLACE;
  };

  const add = (stop: CableStop): void => {
    const last = stops.at(-1);
    if (last !== undefined && same(last, stop)) return;
    set([...stops, stop]);
  };

  const finish = (): void => {
    if (stops.length < 2) {
      ctx.say('A cable needs two ends: click where it starts and where it goes.');
      return;
    }
    const cable = ctx.choices().cable;
    if (cable === null) {
      ctx.say('Choose a cable to draw with first.');
      return;
    }
    const drawn = stops;
    settle(
      ctx,
      'Draw cable',
      (markedToMarked) =>
        drawCable(ctx.doc(), { sheetId: ctx.sheetId(), stops: drawn, cable, markedToMarked }),
      (selected) => {
        ctx.select(selected);
        set([]);
      },
    );
  };

  const typed = (length: number, degrees: number | null): boolean => {
    const last = stops.at(-1);
    const from = last === undefined ? null : placeOf(ctx, last);
    if (from === null) {
      ctx.say('Click where the cable starts; then type how far it goes.');
      return true;
    }
    const scale = ctx.scale();
    if (scale === null) {
      ctx.say('Set the scale of this sheet first; lengths need it.');
      return true;
    }
    const end = stepOnGround(scale, from, pointer, length, degrees);
    if (end === null) ctx.say('Type an angle as well, or point where the cable goes.');
    else add({ on: 'sheet', at: end });
    return true;
  };

  return {
    id: 'cable',
    handle(event) {
      switch (event.type) {
        case 'down':
          pressed = true;
          pointer = event.at;
          ctx.changed();
          return true;
        case 'move': {
          pointer = event.at;
          const stop = snapStop(ctx, event.at);
          ctx.hover(stop.on === 'sheet' ? null : stop.id);
          ctx.changed();
          return true;
        }
        case 'up':
          pointer = event.at;
          if (pressed) add(snapStop(ctx, event.at));
          pressed = false;
          return true;
        case 'double':
          finish();
          return true;
        case 'typed':
          return typed(event.meters, event.degrees);
        case 'key':
          if (event.key === 'Enter' && stops.length > 0) {
            finish();
            return true;
          }
          if ((event.key === 'Escape' || event.key === 'Backspace') && stops.length > 0) {
            set(stops.slice(0, -1));
            return true;
          }
          return false;
        case 'cancel':
          // The click is given up; the points before it stand.
          pressed = false;
          pointer = null;
          ctx.changed();
          return true;
        case 'leave':
          pointer = null;
          ctx.hover(null);
          ctx.changed();
          return true;
      }
    },
    preview(): Preview | null {
      const points = stops.map((stop) => placeOf(ctx, stop)).filter((p) => p !== null);
      const next = pointer === null ? null : snapStop(ctx, pointer);
      const pending = next === null ? null : placeOf(ctx, next);
      if (points.length === 0 && pending === null) return null;
      return { kind: 'cable', points, pending, snap: next?.on === 'sheet' ? null : pending };
    },
    exit() {
      pressed = false;
      pointer = null;
      ctx.hover(null);
      set([]);
    },
    touchDrag: () => 'pan',
  };
}

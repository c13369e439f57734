import type { Point } from '../../../plan-view/camera';
import { createPathTool } from './path';
import type { Tool, ToolContext } from './tool';
import { isOnGround, NOT_ON_GROUND, sheetOf, type UpperEdge, upperEdge } from './uprights';

/** A click nearer than this to the foot, in window pixels, is the end of a double click, or says no height. */
const LEAST_RISE = 6;

/**
 * A wall, a house face, a fence: first along its foot, then on a photo one click on its upper edge above the first
 * point. Its height is asked at the end, with what the photo's camera tells of it.
 */
export function createFaceTool(ctx: ToolContext): Tool {
  /** The finished foot while the click on the upper edge is waited for. */
  let foot: readonly Point[] | null = null;
  let pointer: Point | null = null;
  let pressed = false;

  const path = createPathTool(ctx, {
    id: 'face',
    kind: 'polyline',
    freehand: false,
    least: 2,
    tooFew: 'A wall face needs two points along its foot: click both.',
    finish(points) {
      if (!points.every((p) => isOnGround(ctx, p))) {
        ctx.say(NOT_ON_GROUND);
        return;
      }
      if (sheetOf(ctx)?.view === 'photo') {
        foot = points;
        ctx.changed();
        return;
      }
      ctx.request({ kind: 'face', foot: points, top: null, seenMeters: null });
    },
    preview: (points, pending) => ({
      kind: 'face',
      foot: points,
      top: null,
      pending,
      waitsForTop: false,
    }),
  });

  const edge = (of: readonly Point[]): UpperEdge | null => {
    const first = of[0]!;
    if (pointer === null || (first.y - pointer.y) * ctx.zoom() < LEAST_RISE) return null;
    return upperEdge(ctx, of, pointer);
  };

  const reset = (): true => {
    foot = null;
    pressed = false;
    // Where the pointer was when the foot ended is long past.
    path.handle({ type: 'leave' });
    ctx.changed();
    return true;
  };

  const finish = (of: readonly Point[]): void => {
    const found = edge(of);
    if (found === null) {
      ctx.say('Click on the upper edge, above the first point of the foot.');
      return;
    }
    reset();
    ctx.request({ kind: 'face', foot: of, top: found.top, seenMeters: found.heightMeters });
  };

  return {
    id: 'face',
    handle(event) {
      if (foot === null) return path.handle(event);
      switch (event.type) {
        case 'down':
          pressed = true;
          pointer = event.at;
          ctx.changed();
          return true;
        case 'move':
          pointer = event.at;
          ctx.changed();
          return true;
        case 'up':
          pointer = event.at;
          if (pressed) finish(foot);
          pressed = false;
          return true;
        case 'key':
          if (event.key === 'Escape' || event.key === 'Backspace') return reset();
          return false;
        case 'cancel':
        case 'leave':
          pressed = false;
          pointer = null;
          ctx.changed();
          return true;
        case 'double':
        case 'typed':
          return false;
      }
    },
    preview() {
      if (foot === null) return path.preview();
      return { kind: 'face', foot, top: edge(foot)?.top ?? null, pending: null, waitsForTop: true };
    },
    exit() {
      foot = null;
      pointer = null;
      pressed = false;
      path.exit();
    },
    touchDrag: () => 'pan',
  };
}

import type { Point } from '../../../plan-view/camera';
import { createPathTool } from './path';
import type { Preview, Tool, ToolContext } from './tool';
import { crownHeights, isOnGround, NOT_ON_GROUND } from './uprights';

/**
 * A tree or shrub: a click where it stands, then its crown, corner by corner or in one stroke. Its heights are asked
 * at the end, with what the photo's camera tells of them.
 */
export function createTreeTool(ctx: ToolContext): Tool {
  let foot: Point | null = null;
  let pointer: Point | null = null;
  let pressed = false;

  const crown = createPathTool(ctx, {
    id: 'tree',
    kind: 'polygon',
    freehand: true,
    least: 3,
    tooFew: 'A crown needs at least three corners.',
    finish(outline) {
      const at = foot!;
      foot = null;
      ctx.changed();
      ctx.request({ kind: 'tree', foot: at, outline, seen: crownHeights(ctx, at, outline) });
    },
    preview: (outline, pending): Preview => ({ kind: 'tree', foot: foot!, outline, pending }),
  });

  const clear = (): true => {
    foot = null;
    pressed = false;
    ctx.changed();
    return true;
  };

  return {
    id: 'tree',
    handle(event) {
      if (foot !== null) {
        if (crown.handle(event)) return true;
        // Nothing of the crown is left to take back: the foot is next.
        if (event.type === 'key' && (event.key === 'Escape' || event.key === 'Backspace')) return clear();
        return false;
      }
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
          if (pressed && isOnGround(ctx, event.at)) foot = event.at;
          else if (pressed) ctx.say(NOT_ON_GROUND);
          pressed = false;
          pointer = null;
          ctx.changed();
          return true;
        case 'cancel':
        case 'leave':
          pressed = false;
          pointer = null;
          ctx.changed();
          return true;
        case 'double':
          return true;
        case 'key':
        case 'typed':
          return false;
      }
    },
    preview() {
      if (foot !== null) return crown.preview();
      return pointer === null ? null : { kind: 'tree', foot: pointer, outline: [], pending: null };
    },
    exit() {
      foot = null;
      pointer = null;
      pressed = false;
      crown.exit();
    },
    touchDrag: (at) => (foot === null ? 'pan' : crown.touchDrag(at)),
  };
}

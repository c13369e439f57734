import type { Point } from '../../../plan-view/camera';
import { aimsAt, chosenLights, setAims } from './aiming';
import { nodeAt } from './hit';
import type { Tool, ToolContext } from './tool';

export const NOTHING_THERE = 'There is nothing to light up there: mark the wall or the tree first.';

/** A click on a light chooses it, shift-click adds it; a click anywhere else aims all chosen lights at that place. */
export function createAimTool(ctx: ToolContext): Tool {
  let pointer: Point | null = null;
  let pressed = false;

  const move = (at: Point | null): true => {
    pointer = at;
    ctx.changed();
    return true;
  };

  const lightAt = (at: Point): string | null => {
    const node = nodeAt(ctx, at);
    return node?.kind === 'fixture' ? node.id : null;
  };

  const click = (at: Point, shift: boolean): void => {
    const light = lightAt(at);
    const chosen = new Set(chosenLights(ctx).map(({ id }) => id));
    if (light !== null) {
      if (!shift) ctx.select([light]);
      else if (chosen.delete(light)) ctx.select(chosen);
      else ctx.select([...chosen, light]);
      return;
    }
    if (chosen.size === 0) {
      ctx.say('Choose the lights to aim first: click one, shift-click more.');
      return;
    }
    const aims = aimsAt(ctx, at);
    if (aims === null) ctx.say(NOTHING_THERE);
    else setAims(ctx, aims);
  };

  return {
    id: 'aim',
    handle(event) {
      switch (event.type) {
        case 'down':
          pressed = true;
          return move(event.at);
        case 'move':
          ctx.hover(lightAt(event.at));
          return move(event.at);
        case 'up':
          if (pressed) click(event.at, event.mods.shift);
          pressed = false;
          return move(event.at);
        case 'cancel':
        case 'leave':
          pressed = false;
          ctx.hover(null);
          return move(null);
        case 'key':
        case 'double':
        case 'typed':
          return false;
      }
    },
    preview() {
      if (pointer === null || chosenLights(ctx).length === 0 || lightAt(pointer) !== null) return null;
      return { kind: 'aim', aims: aimsAt(ctx, pointer) ?? new Map(), at: pointer };
    },
    exit() {
      pressed = false;
      ctx.hover(null);
      move(null);
    },
    touchDrag: () => 'pan',
  };
}

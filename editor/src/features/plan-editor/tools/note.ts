import type { Point } from '../../../plan-view/camera';
import type { Tool, ToolContext } from './tool';

/** A click says where a note stands; its words are asked for. */
export function createNoteTool(ctx: ToolContext): Tool {
  let pointer: Point | null = null;
  let pressed = false;
  const move = (at: Point | null): void => {
    pointer = at;
    ctx.changed();
  };
  return {
    id: 'note',
    handle(event) {
      switch (event.type) {
        case 'down':
          pressed = true;
          move(event.at);
          return true;
        case 'move':
          move(event.at);
          return true;
        case 'up':
          if (pressed) ctx.request({ kind: 'note', at: event.at });
          pressed = false;
          return true;
        case 'cancel':
        case 'leave':
          pressed = false;
          move(null);
          return true;
        case 'key':
        case 'double':
        case 'typed':
          return false;
      }
    },
    preview: () =>
      pointer === null ? null : { kind: 'place', at: pointer, mark: { kind: 'note' }, snapped: false },
    exit() {
      pressed = false;
      move(null);
    },
    touchDrag: () => 'pan',
  };
}

import type { CableStop } from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';
import { cableAt, nodeAt } from './hit';
import type { ToolContext } from './tool';

/** Where a click of the cable tool lands: on a mark, on a cable (a splice), or on the ground. */
export function snapStop(ctx: ToolContext, at: Point): CableStop {
  const node = nodeAt(ctx, at);
  if (node !== null) return { on: 'record', id: node.id };
  const cable = cableAt(ctx, at);
  if (cable !== null) return { on: 'cable', id: cable.cable.id, at: cable.at };
  return { on: 'sheet', at };
}

/** Where a stop is on the sheet; null when its record is gone. */
export function placeOf(ctx: ToolContext, stop: CableStop): Point | null {
  switch (stop.on) {
    case 'sheet':
    case 'cable':
      return stop.at;
    case 'record': {
      const record = ctx.doc().get(stop.id);
      return record !== undefined && 'at' in record ? record.at : null;
    }
  }
}

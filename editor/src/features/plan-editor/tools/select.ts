import { moveRecords } from '@lampwright/geometry/plan';
import { boxOf, type Point } from '../../../plan-view/camera';
import { NOTHING_THERE } from './aim';
import { aimHandleAt, aimsAt, setAims } from './aiming';
import { type Grip, gripOf, type Shape, setShape, shapeLabel, shapePreview } from './grip';
import { hitAt, idsInBox } from './hit';
import { distance, type Preview, settle, type Tool, type ToolContext, type ToolEvent } from './tool';

/** A press that moves less than this, in window pixels, is a click. */
const SLOP = 4;

type State =
  | { readonly is: 'idle' }
  | { readonly is: 'pressed'; readonly at: Point; readonly hitId: string }
  | { readonly is: 'moving'; readonly from: Point; readonly to: Point }
  | { readonly is: 'shaping'; readonly id: string; readonly grip: Grip; readonly shape: Shape }
  | { readonly is: 'aiming'; readonly from: Point; readonly to: Point | null }
  | { readonly is: 'boxing'; readonly a: Point; readonly b: Point; readonly add: boolean };

/**
 * Choose and move. Click chooses, shift-click adds or takes away, a box from empty ground chooses what lies
 * in it. Dragging what is chosen moves it; cable ends follow. Dragging one chosen cable bends it; a corner of
 * one chosen area, measurement, wall face or tree moves that corner. The cross at the end of a chosen light's beam
 * aims all chosen lights.
 */
export function createSelectTool(ctx: ToolContext): Tool {
  let state: State = { is: 'idle' };

  const go = (next: State): true => {
    state = next;
    ctx.changed();
    return true;
  };

  const far = (a: Point, b: Point): boolean => distance(a, b) * ctx.zoom() > SLOP;

  const press = (at: Point, shift: boolean): true => {
    if (!shift && aimHandleAt(ctx, at)) return go({ is: 'aiming', from: at, to: null });
    const hit = hitAt(ctx, at);
    if (hit === null) return go({ is: 'boxing', a: at, b: at, add: shift });
    const chosen = ctx.selection();
    if (shift) {
      const next = new Set(chosen);
      if (!next.delete(hit.id)) next.add(hit.id);
      ctx.select(next);
    } else if (!chosen.has(hit.id)) ctx.select([hit.id]);
    return go({ is: 'pressed', at, hitId: hit.id });
  };

  const startDrag = (at: Point, hitId: string, to: Point): true => {
    const chosen = ctx.selection();
    // A shift-click took it out of the choice: there is nothing to drag.
    if (!chosen.has(hitId)) return go({ is: 'idle' });
    const record = ctx.doc().get(hitId);
    const grip = chosen.size === 1 && record !== undefined ? gripOf(ctx, record, at) : null;
    if (grip === null) return go({ is: 'moving', from: at, to });
    return go({ is: 'shaping', id: hitId, grip, shape: grip.moved(to) });
  };

  const finish = (): true => {
    const ended = state;
    go({ is: 'idle' });
    switch (ended.is) {
      case 'moving': {
        const dx = ended.to.x - ended.from.x;
        const dy = ended.to.y - ended.from.y;
        const ids = ctx.selection();
        settle(
          ctx,
          ids.size === 1 ? 'Move' : `Move ${ids.size}`,
          () => moveRecords(ctx.doc(), ids, dx, dy),
          () => {},
        );
        return true;
      }
      case 'shaping':
        reshape(ctx, ended.id, ended.shape);
        return true;
      case 'aiming': {
        if (ended.to === null) return true;
        const aims = aimsAt(ctx, ended.to);
        if (aims === null) ctx.say(NOTHING_THERE);
        else setAims(ctx, aims);
        return true;
      }
      case 'boxing': {
        const wide = far(ended.a, ended.b);
        const found = wide ? idsInBox(ctx, boxOf(ended.a, ended.b)) : [];
        ctx.select(ended.add ? new Set([...ctx.selection(), ...found]) : found);
        return true;
      }
      case 'idle':
      case 'pressed':
        return true;
    }
  };

  return {
    id: 'select',
    handle(event: ToolEvent): boolean {
      switch (event.type) {
        case 'down':
          return press(event.at, event.mods.shift);
        case 'move':
          switch (state.is) {
            case 'idle':
              ctx.hover(hitAt(ctx, event.at)?.id ?? null);
              return true;
            case 'pressed':
              return far(state.at, event.at) ? startDrag(state.at, state.hitId, event.at) : true;
            case 'moving':
              return go({ ...state, to: event.at });
            case 'shaping':
              return go({ ...state, shape: state.grip.moved(event.at) });
            case 'aiming':
              return state.to !== null || far(state.from, event.at) ? go({ ...state, to: event.at }) : true;
            case 'boxing':
              return go({ ...state, b: event.at });
          }
          return false;
        case 'up':
          return finish();
        case 'cancel':
          return go({ is: 'idle' });
        case 'leave':
          ctx.hover(null);
          return true;
        case 'key':
          if (event.key !== 'Escape') return false;
          if (state.is !== 'idle') return go({ is: 'idle' });
          if (ctx.selection().size === 0) return false;
          ctx.select([]);
          return true;
        case 'double':
        case 'typed':
          return false;
      }
    },
    preview(): Preview | null {
      switch (state.is) {
        case 'moving':
          return {
            kind: 'move',
            ids: ctx.selection(),
            dx: state.to.x - state.from.x,
            dy: state.to.y - state.from.y,
          };
        case 'shaping':
          return shapePreview(state.id, state.shape);
        case 'aiming':
          if (state.to === null) return null;
          return { kind: 'aim', aims: aimsAt(ctx, state.to) ?? new Map(), at: state.to };
        case 'boxing':
          return { kind: 'box', a: state.a, b: state.b };
        case 'idle':
        case 'pressed':
          return null;
      }
    },
    exit() {
      go({ is: 'idle' });
      ctx.hover(null);
    },
    // On a phone one finger moves what is chosen and, everywhere else, the plan.
    touchDrag(at) {
      if (aimHandleAt(ctx, at)) return 'draw';
      const hit = hitAt(ctx, at);
      return hit !== null && ctx.selection().has(hit.id) ? 'draw' : 'pan';
    },
  };
}

function reshape(ctx: ToolContext, id: string, shape: Shape): void {
  // Somebody else may have removed it while it was being shaped.
  if (ctx.doc().get(id)?.kind !== shape.of) {
    ctx.say('That is not on the plan any more.');
    return;
  }
  settle(
    ctx,
    shapeLabel(shape),
    () => setShape(ctx, id, shape),
    () => {},
  );
}

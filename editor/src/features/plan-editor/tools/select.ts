import { cablePoints, moveRecords, type PlanRecord, setFields } from '@lampwright/geometry/plan';
import { boxOf, type Point } from '../../../plan-view/camera';
import { hitAt, idsInBox, nearestOn } from './hit';
import { distance, type Preview, settle, type Tool, type ToolContext, type ToolEvent } from './tool';

/** A press that moves less than this, in window pixels, is a click. */
const SLOP = 4;
/** A corner or bend is taken hold of within this many window pixels. */
const GRIP = 9;

type State =
  | { readonly is: 'idle' }
  | { readonly is: 'pressed'; readonly at: Point; readonly hitId: string }
  | { readonly is: 'moving'; readonly from: Point; readonly to: Point }
  | { readonly is: 'shaping'; readonly id: string; readonly index: number; readonly points: readonly Point[] }
  | { readonly is: 'boxing'; readonly a: Point; readonly b: Point; readonly add: boolean };

/**
 * Choose and move. Click chooses, shift-click adds or takes away, a box from empty ground chooses what lies
 * in it. Dragging what is chosen moves it; cable ends follow. Dragging one chosen cable bends it; a corner of
 * one chosen area or measurement moves that corner.
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
    return go({ is: 'shaping', id: hitId, index: grip.index, points: replaced(grip.points, grip.index, to) });
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
        reshape(ctx, ended.id, ended.points);
        return true;
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
              return go({ ...state, points: replaced(state.points, state.index, event.at) });
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
          return { kind: 'shape', id: state.id, points: state.points };
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
      const hit = hitAt(ctx, at);
      return hit !== null && ctx.selection().has(hit.id) ? 'draw' : 'pan';
    },
  };
}

interface Grip {
  /** The whole outline with the gripped point in it. */
  readonly points: readonly Point[];
  readonly index: number;
}

/** The corner or bend under a press; on a cable a new bend where there is none. Null: the record moves whole. */
function gripOf(ctx: ToolContext, record: PlanRecord, at: Point): Grip | null {
  const reach = GRIP / ctx.zoom();
  switch (record.kind) {
    case 'area':
    case 'measurement': {
      const index = record.points.findIndex((p) => distance(p, at) <= reach);
      return index < 0 ? null : { points: record.points, index };
    }
    case 'cable': {
      const points = cablePoints(ctx.doc(), record);
      if (points === undefined) return null;
      const bend = points.findIndex((p, i) => i > 0 && i < points.length - 1 && distance(p, at) <= reach);
      if (bend > 0) return { points, index: bend };
      const segment = nearestSegment(points, at);
      return {
        points: [...points.slice(0, segment + 1), at, ...points.slice(segment + 1)],
        index: segment + 1,
      };
    }
    default:
      return null;
  }
}

function nearestSegment(points: readonly Point[], at: Point): number {
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i + 1 < points.length; i++) {
    const d = nearestOn([points[i]!, points[i + 1]!], at)?.distance ?? Number.POSITIVE_INFINITY;
    if (d < least) {
      best = i;
      least = d;
    }
  }
  return best;
}

function replaced(points: readonly Point[], index: number, at: Point): Point[] {
  return points.map((p, i) => (i === index ? { x: at.x, y: at.y } : p));
}

function reshape(ctx: ToolContext, id: string, points: readonly Point[]): void {
  const keep = (): void => {};
  switch (ctx.doc().get(id)?.kind) {
    case 'cable':
      settle(
        ctx,
        'Bend cable',
        () => setFields(ctx.doc(), [id], 'cable', { via: points.slice(1, -1) }),
        keep,
      );
      return;
    case 'area':
      settle(ctx, 'Reshape area', () => setFields(ctx.doc(), [id], 'area', { points: [...points] }), keep);
      return;
    case 'measurement':
      settle(
        ctx,
        'Move measuring point',
        () => setFields(ctx.doc(), [id], 'measurement', { points: [...points] }),
        keep,
      );
      return;
    default:
      // Somebody else removed it while it was being shaped.
      ctx.say('That is not on the plan any more.');
  }
}

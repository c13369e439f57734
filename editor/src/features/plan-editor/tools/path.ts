import { simplifyOutline } from '@lampwright/geometry/measure';
import type { Point } from '../../../plan-view/camera';
import { distance, type Preview, type Tool, type ToolContext, type ToolId } from './tool';

const SAME_PLACE = 4;
/** A press that moves farther than this, in window pixels, draws by hand instead of clicking a corner. */
const FREEHAND_AFTER = 10;
/** A hand's tremble that is smoothed away, in window pixels. */
const TREMBLE = 2.5;
/** How near to its first corner, in window pixels, a click closes a polygon. */
const CLOSING = 10;

interface PathRules {
  readonly id: ToolId;
  readonly kind: 'polygon' | 'polyline';
  readonly freehand: boolean;
  readonly least: number;
  readonly tooFew: string;
  /** Ends by itself when it has so many points. */
  readonly most?: () => number;
  finish(points: readonly Point[]): void;
  preview?(points: readonly Point[], pending: Point | null): Preview;
}

/** The state machine of tools that click corners one after the other: areas, measuring, scale references. */
export function createPathTool(ctx: ToolContext, rules: PathRules): Tool {
  let points: readonly Point[] = [];
  let pointer: Point | null = null;
  let press: { readonly at: Point; stroke: Point[] | null } | null = null;

  const set = (next: readonly Point[]): void => {
    points = next;
    ctx.changed();
  };

  const end = (): void => {
    if (points.length < rules.least) {
      ctx.say(rules.tooFew);
      return;
    }
    const done = points;
    set([]);
    rules.finish(done);
  };

  const near = (a: Point, b: Point, reach: number): boolean => distance(a, b) * ctx.zoom() < reach;

  const click = (at: Point): void => {
    const first = points[0];
    const last = points.at(-1);
    if (last !== undefined && near(last, at, SAME_PLACE)) return;
    if (rules.kind === 'polygon' && first !== undefined && points.length >= 3 && near(first, at, CLOSING)) {
      end();
      return;
    }
    set([...points, at]);
    if (rules.most !== undefined && points.length >= rules.most()) end();
  };

  return {
    id: rules.id,
    handle(event) {
      switch (event.type) {
        case 'down':
          press = { at: event.at, stroke: null };
          pointer = event.at;
          ctx.changed();
          return true;
        case 'move':
          pointer = event.at;
          if (press !== null && rules.freehand && points.length === 0) {
            if (press.stroke === null && !near(press.at, event.at, FREEHAND_AFTER)) press.stroke = [press.at];
            press.stroke?.push(event.at);
          }
          ctx.changed();
          return true;
        case 'up': {
          const ended = press;
          press = null;
          pointer = event.at;
          if (ended === null) return true;
          if (ended.stroke === null) {
            click(event.at);
            return true;
          }
          set(simplifyOutline(ended.stroke, TREMBLE / ctx.zoom()));
          end();
          return true;
        }
        case 'double':
          // The second click of a double click on the first corner has begun another polygon: it meant none.
          if (points.length === 1) set([]);
          else if (points.length > 0) end();
          return true;
        case 'key':
          if (event.key === 'Enter' && points.length > 0) {
            end();
            return true;
          }
          if ((event.key === 'Escape' || event.key === 'Backspace') && points.length > 0) {
            set(points.slice(0, -1));
            return true;
          }
          return false;
        case 'cancel':
          press = null;
          pointer = null;
          ctx.changed();
          return true;
        case 'leave':
          pointer = null;
          ctx.changed();
          return true;
        case 'typed':
          return false;
      }
    },
    preview() {
      const shown = press?.stroke ?? points;
      const pending = press?.stroke ? null : pointer;
      if (shown.length === 0 && (pending === null || rules.preview === undefined)) return null;
      return rules.preview?.(shown, pending) ?? { kind: rules.kind, points: [...shown], pending };
    },
    exit() {
      press = null;
      pointer = null;
      set([]);
    },
    touchDrag: () => (rules.freehand && points.length === 0 ? 'draw' : 'pan'),
  };
}

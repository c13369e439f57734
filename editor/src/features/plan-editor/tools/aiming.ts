import { type Aim, type FixtureRecord, putRecords, recordOf } from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';
import { drawnAim, poseOf } from './light-pose';
import type { DrawnAim } from './proposed';
import { type AimTarget, aimTarget, groundOfTarget } from './target';
import { distance, settle, type ToolContext } from './tool';

/** The cross at the end of a beam is taken hold of within this many window pixels. */
const HANDLE_REACH = 11;
/** It keeps this far from its light's mark, in window pixels, where the light points at its own feet. */
const HANDLE_CLEAR = 16;

type View = Pick<ToolContext, 'zoom' | 'markRadius'>;

/** Where the cross of a light is drawn, in sheet pixels: at the end of its beam, but never under its own mark. */
export function handlePlace(view: View, drawn: DrawnAim): Point {
  const clear = (view.markRadius() + HANDLE_CLEAR) / view.zoom();
  const away = distance(drawn.mark, drawn.to);
  if (away >= clear) return drawn.to;
  if (away < 1e-6) return { x: drawn.mark.x + clear * Math.SQRT1_2, y: drawn.mark.y + clear * Math.SQRT1_2 };
  const k = clear / away;
  return {
    x: drawn.mark.x + (drawn.to.x - drawn.mark.x) * k,
    y: drawn.mark.y + (drawn.to.y - drawn.mark.y) * k,
  };
}

/** The chosen lights of the open sheet, in the order of the choice. */
export function chosenLights(ctx: ToolContext): FixtureRecord[] {
  return [...ctx.selection()].flatMap((id) => {
    const fixture = recordOf(ctx.doc(), id, 'fixture');
    return fixture?.sheetId === ctx.sheetId() ? [fixture] : [];
  });
}

/** Whether the cross of a chosen light is under a place. */
export function aimHandleAt(ctx: ToolContext, at: Point): boolean {
  const reach = HANDLE_REACH / ctx.zoom();
  return chosenLights(ctx).some(({ id }) => {
    const drawn = drawnAim(ctx, id);
    return drawn !== null && distance(handlePlace(ctx, drawn), at) <= reach;
  });
}

/** The aims of all chosen lights at what is at a place of the sheet; null where there is nothing to light. */
export function aimsAt(ctx: ToolContext, at: Point): ReadonlyMap<string, Aim> | null {
  const target = aimTarget(ctx, at);
  if (target === null) return null;
  return new Map(chosenLights(ctx).map((fixture) => [fixture.id, aimedAt(ctx, fixture, target)]));
}

/** A light that is tilted stays tilted: it turns towards the place. Every other is aimed at the place itself. */
function aimedAt(ctx: ToolContext, { id, aim, at }: FixtureRecord, target: AimTarget): Aim {
  if (aim?.kind !== 'tilt') return target.aim;
  const posed = poseOf(ctx, id);
  const place = groundOfTarget(ctx, target);
  if (posed === null || place === null) return target.aim;
  const { x, y, z } = posed.pose;
  const level = Math.hypot(place.x - x, place.y - y);
  const degrees = (Math.atan2(level, z - target.aim.heightMeters) * 180) / Math.PI;
  const here = distance(target.aim.at, at) < 1e-6;
  return {
    kind: 'tilt',
    toward: here ? aim.toward : target.aim.at,
    degreesFromDown: Math.round(degrees * 10) / 10,
  };
}

/** Aims lights as one change. */
export function setAims(ctx: ToolContext, aims: ReadonlyMap<string, Aim>): boolean {
  return settle(
    ctx,
    aims.size === 1 ? 'Aim' : `Aim ${aims.size}`,
    () =>
      putRecords(
        ctx.doc(),
        [...aims].flatMap(([id, aim]) => {
          const fixture = recordOf(ctx.doc(), id, 'fixture');
          return fixture === undefined ? [] : [{ ...fixture, aim }];
        }),
      ),
    () => {},
  );
}

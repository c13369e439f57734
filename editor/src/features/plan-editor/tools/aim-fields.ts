import { sheetPoint } from '@lampwright/geometry/estimate';
import type { Aim, FixtureRecord } from '@lampwright/geometry/plan';
import { meters } from '@lampwright/geometry/units';
import type { Point } from '../../../plan-view/camera';
import { poseOf } from './light-pose';
import type { ToolContext } from './tool';

type World = Pick<ToolContext, 'doc' | 'sheetId' | 'scale'>;

/** How far off a place is marked that only says a direction. */
const DIRECTION_METERS = 1;
/** Nearer than this is right under the light. */
const LEAST_METERS = 0.005;

/** An aim in figures, as a person types it. */
export interface AimFigures {
  readonly kind: 'usual' | 'tilt' | 'point';
  /** Degrees clockwise from straight up the sheet (away from the viewer on a photo). Null: straight up or down. */
  readonly direction: number | null;
  /** 0 is straight down, 90 level, 180 straight up. */
  readonly degreesFromDown: number;
  /** Over the ground, from the light to what it is aimed at. */
  readonly distanceMeters: number;
  readonly heightMeters: number;
}

/** A light's aim in figures; of a usual aim, what it comes to. Null without a scale, or for what gives no light. */
export function aimFigures(world: World, fixture: FixtureRecord): AimFigures | null {
  const posed = poseOf(world, fixture.id);
  const here = groundOf(world, fixture.at);
  if (posed === null || here === null) return null;
  const { aim } = fixture;
  const { axis } = posed.pose;
  const { point } = posed.reach;
  const target = aim?.kind === 'point' ? groundOf(world, aim.at) : null;
  const dx = (target ?? point).x - here.x;
  const dy = (target ?? point).y - here.y;
  const toward = aim?.kind === 'tilt' ? groundOf(world, aim.toward) : null;
  const level = aim?.kind === 'point' ? Math.hypot(dx, dy) : Math.hypot(axis[0], axis[1]);
  return {
    kind: aim?.kind ?? 'usual',
    direction:
      toward !== null
        ? bearing(toward.x - here.x, toward.y - here.y)
        : level < 1e-6
          ? null
          : aim?.kind === 'point'
            ? bearing(dx, dy)
            : bearing(axis[0], axis[1]),
    degreesFromDown:
      aim?.kind === 'tilt'
        ? aim.degreesFromDown
        : (Math.acos(Math.max(-1, Math.min(1, -axis[2]))) * 180) / Math.PI,
    distanceMeters: Math.hypot(dx, dy),
    heightMeters: aim?.kind === 'point' ? aim.heightMeters : point.z,
  };
}

/** Where a light would be aimed by other figures; what is left out stays. Undefined where the sheet can't place it. */
export function aimWith(
  world: World,
  fixture: FixtureRecord,
  change: Partial<AimFigures>,
): Aim | null | undefined {
  if (change.kind === 'usual') return null;
  const before = aimFigures(world, fixture);
  const here = groundOf(world, fixture.at);
  if (before === null || here === null) return undefined;
  const next = { ...before, ...change };
  const at = (distance: number): Point | null =>
    sheetAt(world, here, next.direction ?? 0, Math.max(distance, 0));
  switch (next.kind) {
    case 'usual':
      return null;
    case 'tilt': {
      const toward = at(DIRECTION_METERS);
      return toward === null
        ? undefined
        : { kind: 'tilt', toward, degreesFromDown: rounded(next.degreesFromDown, 1) };
    }
    case 'point': {
      // Straight under the light there is no direction to keep: a new one needs some way to go.
      const turned = change.direction !== undefined && next.distanceMeters < LEAST_METERS;
      const place = at(turned ? DIRECTION_METERS : next.distanceMeters);
      return place === null
        ? undefined
        : { kind: 'point', at: place, heightMeters: rounded(next.heightMeters, 4) };
    }
  }
}

/** Degrees clockwise from the ground's y axis, from 0 up to 360. */
function bearing(dx: number, dy: number): number {
  const degrees = (Math.atan2(dx, dy) * 180) / Math.PI;
  return rounded((degrees + 360) % 360, 1) % 360;
}

function rounded(n: number, digits: number): number {
  const k = 10 ** digits;
  return Math.round(n * k) / k;
}

function groundOf(world: World, p: Point): Point | null {
  return world.scale()?.groundFromSheet(sheetPoint(p)) ?? null;
}

function sheetAt(world: World, from: Point, degrees: number, distance: number): Point | null {
  const a = (degrees * Math.PI) / 180;
  const p =
    world.scale()?.sheetFromGround({
      x: meters(from.x + Math.sin(a) * distance),
      y: meters(from.y + Math.cos(a) * distance),
    }) ?? null;
  return p === null ? null : { x: p.x, y: p.y };
}

import {
  axisOf,
  beamEdge,
  groundUnder,
  type LightPose,
  type LightSource,
  type LightSpace,
  type NightScene,
  nightSceneOf,
  type Point3,
  type Reach,
  reachOf,
  spaceOf,
} from '@lampwright/geometry/light';
import type { Aim, PlanDocument } from '@lampwright/geometry/plan';
import { recordOf } from '@lampwright/geometry/plan';
import type { SheetCamera, SolvedScale } from '@lampwright/geometry/sheet';
import { meters } from '@lampwright/geometry/units';
import type { Point } from '../../../plan-view/camera';
import type { DrawnAim } from './proposed';
import type { ToolContext } from './tool';
import { cameraOf, sheetOf } from './uprights';

type World = Pick<ToolContext, 'doc' | 'sheetId' | 'scale'>;

interface Lit {
  readonly scene: NightScene;
  readonly space: LightSpace;
  readonly sources: ReadonlyMap<string, LightSource>;
}

const noVolts: ReadonlyMap<string, number> = new Map();
const known = new WeakMap<PlanDocument, Map<string, Lit | null>>();

/** Lights and what stops them on a sheet, as at their rated volts: where they point does not hang on volts. */
function litOf(doc: PlanDocument, sheetId: string): Lit | null {
  let sheets = known.get(doc);
  if (sheets === undefined) {
    sheets = new Map();
    known.set(doc, sheets);
  }
  let lit = sheets.get(sheetId);
  if (lit === undefined) {
    const scene = nightSceneOf(doc, sheetId, noVolts);
    lit =
      scene === null
        ? null
        : { scene, space: spaceOf(scene), sources: new Map(scene.sources.map((s) => [s.id, s])) };
    sheets.set(sheetId, lit);
  }
  return lit;
}

/** Where a light is and points, in metres of the sheet's ground; null without a scale or a lamp. */
export interface Posed {
  readonly pose: LightPose;
  readonly halfAngle: number;
  readonly reach: Reach;
  readonly space: LightSpace;
}

/** A fixture's light as it points, or as it would with another aim. */
export function poseOf(world: World, fixtureId: string, aim?: Aim | null): Posed | null {
  const lit = litOf(world.doc(), world.sheetId());
  const source = lit?.sources.get(fixtureId);
  const fixture = recordOf(world.doc(), fixtureId, 'fixture');
  if (!lit || !source || !fixture) return null;
  const { x, y, z, kind, treeId, halfAngle } = source;
  const axis =
    aim === undefined
      ? source.axis
      : axisOf({
          kind,
          aim,
          lamp: { x, y, z },
          at: fixture.at,
          groundUnder: (p) => groundUnder(lit.scene, p),
          space: lit.space,
        });
  const pose = { x, y, z, axis, treeId };
  return {
    pose,
    halfAngle: halfAngle ?? Number.POSITIVE_INFINITY,
    reach: aimedReach(pose, lit, aim === undefined ? fixture.aim : aim),
    space: lit.space,
  };
}

/** A beam aimed at a place in the air or in a crown reaches to that place, unless ground or a wall is in its way. */
function aimedReach(pose: LightPose, { scene, space }: Lit, aim: Aim | null): Reach {
  const reach = reachOf(pose, space);
  if (reach.on === 'ground' || reach.on === 'face' || aim?.kind !== 'point') return reach;
  const ground = groundUnder(scene, aim.at);
  if (ground === null) return reach;
  const point = { ...ground, z: aim.heightMeters };
  const away = Math.hypot(point.x - pose.x, point.y - pose.y, point.z - pose.z);
  return { on: reach.on, point, meters: away };
}

export function drawnAim(world: World, fixtureId: string, aim?: Aim | null): DrawnAim | null {
  const fixture = recordOf(world.doc(), fixtureId, 'fixture');
  const scale = world.scale();
  const posed = poseOf(world, fixtureId, aim);
  if (!fixture || !scale || !posed || fixture.sheetId !== world.sheetId()) return null;
  const see = seeing(cameraOf(sheetOf(world), scale), scale);
  const from = see(posed.pose);
  const to = see(posed.reach.point);
  if (from === null || to === null) return null;
  const edge = beamEdge(posed.pose, posed.halfAngle, posed.reach, posed.space).map((line) =>
    line.flatMap((p) => see(p) ?? []),
  );
  return {
    mark: fixture.at,
    from,
    to,
    on: posed.reach.on,
    edge,
  };
}

/** Where points in space are on the sheet. A photo that doesn't tell its camera lifts them as wide as they are high. */
function seeing(camera: SheetCamera | null, scale: SolvedScale): (p: Point3) => Point | null {
  if (camera !== null) return (p) => camera.project(p);
  return ({ x, y, z }) => {
    const foot = scale.sheetFromGround({ x: meters(x), y: meters(y) });
    const aside = scale.sheetFromGround({ x: meters(x + 1), y: meters(y) });
    if (foot === null || aside === null) return null;
    return { x: foot.x, y: foot.y - z * Math.hypot(aside.x - foot.x, aside.y - foot.y) };
  };
}

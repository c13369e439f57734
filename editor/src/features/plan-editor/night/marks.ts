import { type Camera, markRadius, type Size, toWindow } from '../../../plan-view/camera';
import { trace } from '../../../plan-view/draw/cable';
import { isFault, type LookKind } from '../../../plan-view/fixture-look';
import { ink, paper } from '../../../plan-view/palette';
import type { Scene, SceneCable, SceneFixture, SceneNode } from '../../../plan-view/scene';

/** The hues of what is wrong, light enough for a dark picture (as on the page's dark ground). */
const DIM = '#4ba3d9';
const OVER = '#ee7a24';
/** A casing that keeps a pale line apart from a bright pool of light. */
const CASING = 'rgba(22, 32, 46, 0.7)';
const CABLE = 'rgba(251, 248, 242, 0.26)';

/** What of a scene is labelled at night: what is wrong, and what is chosen or pointed at. */
export function atNight(scene: Scene, chosen: ReadonlySet<string>, hoveredId: string | null): Scene {
  const asked = ({ id }: { readonly id: string }): boolean => chosen.has(id) || id === hoveredId;
  return {
    ...scene,
    fixtures: scene.fixtures.map((fixture) =>
      fixture.standing === 'fault' ? fixture : { ...fixture, standing: null },
    ),
    areas: scene.areas.filter(asked),
    faces: scene.faces.filter(asked),
    trees: scene.trees.filter(asked),
    measurements: scene.measurements.filter(asked),
  };
}

/** Cable as hair-lines: there to be found, out of the picture's way. */
export function drawNightCables(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  cables: readonly SceneCable[],
): void {
  ctx.lineJoin = 'round';
  ctx.lineCap = 'round';
  ctx.lineWidth = 1.25;
  ctx.strokeStyle = CABLE;
  ctx.beginPath();
  for (const { points } of cables) trace(ctx, camera, points);
  ctx.stroke();
}

function hueOf(kind: LookKind): string {
  switch (kind) {
    case 'dim':
      return DIM;
    case 'overdriven':
      return OVER;
    case 'in-window':
    case 'dark':
    case 'off':
    case 'unwired':
    case 'waiting':
      return paper;
  }
}

/** Fixtures as hollow rings, so that what they light is seen through them. */
export function drawNightFixtures(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  window: Size,
  fixtures: readonly SceneFixture[],
): void {
  const r = markRadius(camera);
  for (const { at, look } of fixtures) {
    const p = toWindow(camera, at);
    if (outside(p, r, window)) continue;
    const wrong = isFault(look.kind);
    ring(ctx, p, r * (wrong ? 0.72 : 0.5), wrong ? 2.5 : 1.5, hueOf(look.kind), look.kind === 'unwired');
    if (look.kind === 'dark') bar(ctx, p, r * 0.45);
  }
}

export function drawNightNodes(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  window: Size,
  nodes: readonly SceneNode[],
): void {
  const r = markRadius(camera);
  for (const { at, kind } of nodes) {
    const p = toWindow(camera, at);
    if (outside(p, r, window)) continue;
    switch (kind) {
      case 'transformer':
      case 'feed':
        square(ctx, p, r * 0.6);
        break;
      case 'note':
        square(ctx, p, r * 0.35);
        break;
      case 'hub':
        ring(ctx, p, r * 0.35, 1.25, paper, false);
        break;
      case 'splice':
        break;
    }
  }
}

interface At {
  readonly x: number;
  readonly y: number;
}

const outside = (p: At, reach: number, { width, height }: Size): boolean =>
  p.x < -reach || p.y < -reach || p.x > width + reach || p.y > height + reach;

function ring(
  ctx: CanvasRenderingContext2D,
  p: At,
  radius: number,
  width: number,
  colour: string,
  dashed: boolean,
): void {
  ctx.beginPath();
  ctx.arc(p.x, p.y, radius, 0, Math.PI * 2);
  ctx.lineWidth = width + 2;
  ctx.strokeStyle = CASING;
  ctx.stroke();
  ctx.lineWidth = width;
  ctx.strokeStyle = colour;
  if (dashed) ctx.setLineDash([radius * 0.5, radius * 0.45]);
  ctx.stroke();
  ctx.setLineDash([]);
}

function square(ctx: CanvasRenderingContext2D, p: At, half: number): void {
  ctx.lineWidth = 3.5;
  ctx.strokeStyle = CASING;
  ctx.strokeRect(p.x - half, p.y - half, half * 2, half * 2);
  ctx.lineWidth = 1.5;
  ctx.strokeStyle = paper;
  ctx.strokeRect(p.x - half, p.y - half, half * 2, half * 2);
}

/** Across a ring: nothing comes from it. */
function bar(ctx: CanvasRenderingContext2D, p: At, half: number): void {
  ctx.beginPath();
  ctx.moveTo(p.x - half, p.y + half);
  ctx.lineTo(p.x + half, p.y - half);
  ctx.lineWidth = 4;
  ctx.strokeStyle = ink;
  ctx.stroke();
  ctx.lineWidth = 2;
  ctx.strokeStyle = paper;
  ctx.stroke();
}

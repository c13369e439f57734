import { type Camera, markRadius, type Point, toWindow } from '../../../plan-view/camera';
import { drawArea, middle } from '../../../plan-view/draw/areas';
import { type CableStroke, drawCables, drawChosenCable } from '../../../plan-view/draw/cable';
import { drawChoice } from '../../../plan-view/draw/fixture';
import {
  type Aside,
  drawFixtures,
  drawLabels,
  drawMeasurements,
  drawNodes,
} from '../../../plan-view/draw/scene';
import { MarkSprites } from '../../../plan-view/draw/sprites';
import { drawFace, drawTree } from '../../../plan-view/draw/uprights';
import { emptyScene, type Scene, type SceneCable } from '../../../plan-view/scene';
import { drawGroundFigures } from '../night/ground-figures';
import { atNight, drawNightCables, drawNightFixtures, drawNightNodes } from '../night/marks';
import type { Preview } from '../tools/tool';
import { aimCrosses, drawAims } from './aims';
import type { PaintState } from './paint-state';
import { drawPreview } from './preview';

const nobody: ReadonlySet<string> = new Set();

/** Figures on their way to being replaced are shown this faintly. */
const STALE_ALPHA = 0.5;

/** What of a scene stands still and what a drag moves; split once when the drag begins. */
interface Split {
  readonly scene: Scene;
  readonly ids: ReadonlySet<string>;
  readonly still: Scene;
  readonly moving: Scene;
}

/**
 * Paints a plan's layers onto 2D contexts. A drag takes what it moves out of the still layers once, and after
 * that only the overlay is painted anew.
 */
export class Painter {
  private state: PaintState;
  private split: Split | null = null;
  private readonly sprites: MarkSprites;

  constructor(pixelRatio: number) {
    this.sprites = new MarkSprites(pixelRatio);
    this.state = {
      scene: emptyScene,
      camera: { x: 0, y: 0, zoom: 1 },
      size: { width: 0, height: 0 },
      selection: nobody,
      hoveredId: null,
      preview: null,
      stale: false,
      night: false,
      groundFigures: [],
      lengthText: () => '',
      aimOf: () => null,
    };
  }

  get current(): PaintState {
    return this.state;
  }

  /** The typeface has arrived: pictures of letters drawn before it are wrong. */
  forgetPictures(): void {
    this.sprites.clear();
  }

  /** Takes over a new state and says which layers must be painted again. */
  update(next: Partial<PaintState>): ReadonlySet<LayerName> {
    const before = this.state;
    const state = { ...before, ...next };
    this.state = state;
    const dirty = new Set<LayerName>();
    const movingBefore = movingIds(before.preview);
    const movingNow = movingIds(state.preview);
    if (state.scene !== before.scene || movingBefore !== movingNow) {
      this.split = movingNow === null ? null : splitScene(state.scene, movingNow);
    }
    if (state.camera !== before.camera || state.size !== before.size || state.night !== before.night)
      return allLayers;
    if (state.scene !== before.scene || state.selection !== before.selection || movingBefore !== movingNow)
      for (const name of ['ground', 'cable', 'fixtures', 'overlay'] as const) dirty.add(name);
    if (state.hoveredId !== before.hoveredId || state.stale !== before.stale) {
      dirty.add('cable');
      dirty.add('fixtures');
      dirty.add('overlay');
      if (state.night) dirty.add('ground');
    }
    if (state.groundFigures !== before.groundFigures) dirty.add('ground');
    if (isBusy(state.preview) !== isBusy(before.preview)) dirty.add('fixtures');
    if (
      state.preview !== before.preview ||
      state.lengthText !== before.lengthText ||
      state.aimOf !== before.aimOf
    )
      dirty.add('overlay');
    return dirty;
  }

  paint(name: LayerName, ctx: CanvasRenderingContext2D): void {
    const { scene, night, selection, hoveredId } = this.state;
    const whole = this.split?.still ?? scene;
    const still = night ? atNight(whole, selection, hoveredId) : whole;
    switch (name) {
      case 'ground':
        this.paintGround(ctx, still);
        return;
      case 'cable':
        this.paintCables(ctx, still);
        return;
      case 'fixtures':
        this.paintMarks(ctx, still);
        return;
      case 'overlay':
        this.paintOverlay(ctx);
        return;
    }
  }

  private paintGround(ctx: CanvasRenderingContext2D, scene: Scene): void {
    const { camera, size, selection, groundFigures } = this.state;
    if (groundFigures.length > 0)
      drawGroundFigures(
        ctx,
        camera,
        size,
        groundFigures,
        scene.fixtures.map(({ at }) => at),
      );
    for (const area of scene.areas) drawArea(ctx, camera, area, selection.has(area.id));
    for (const face of scene.faces) drawFace(ctx, camera, face, selection.has(face.id));
    for (const tree of scene.trees) drawTree(ctx, camera, tree, selection.has(tree.id));
  }

  private paintCables(ctx: CanvasRenderingContext2D, scene: Scene): void {
    const { camera, selection, hoveredId, night } = this.state;
    if (night) drawNightCables(ctx, camera, scene.cables);
    else drawCables(ctx, camera, scene.cables);
    for (const cable of scene.cables) if (selection.has(cable.id)) drawChosenCable(ctx, camera, cable);
    const hovered = scene.cables.find((c) => c.id === hoveredId && !selection.has(c.id));
    if (hovered !== undefined) drawCables(ctx, camera, [{ ...hovered, weight: hovered.weight + 1.5 }]);
    drawMeasurements(ctx, camera, scene.measurements, (id) => selection.has(id));
  }

  private paintMarks(ctx: CanvasRenderingContext2D, scene: Scene): void {
    const { camera, size, selection, hoveredId, stale } = this.state;
    this.paintNodesAndFixtures(ctx, camera, scene);
    drawLabels(ctx, camera, size, scene.fixtures, scene.nodes, scene.areas, {
      // The figures of the hand at work are what counts while it works.
      hoveredId: isBusy(this.state.preview) ? null : hoveredId,
      chosen: selection,
      asides: this.asides(scene),
      keepOff: isBusy(this.state.preview) ? [] : aimCrosses(this.state),
      alpha: stale ? STALE_ALPHA : 1,
    });
  }

  private paintNodesAndFixtures(ctx: CanvasRenderingContext2D, camera: Camera, scene: Scene): void {
    const { size, night } = this.state;
    if (night) {
      drawNightNodes(ctx, camera, size, scene.nodes);
      drawNightFixtures(ctx, camera, size, scene.fixtures);
      return;
    }
    drawNodes(ctx, camera, size, scene.nodes);
    drawFixtures(ctx, camera, size, scene.fixtures, this.sprites);
  }

  private paintOverlay(ctx: CanvasRenderingContext2D): void {
    const { preview, camera, scene } = this.state;
    if (preview?.kind === 'move' && this.split !== null) {
      this.paintMoving(ctx, this.split.moving, preview.dx, preview.dy);
      return;
    }
    if (preview === null || preview.kind === 'aim') drawAims(ctx, this.state);
    this.paintChoices(ctx, camera, scene);
    if (preview !== null) drawPreview(ctx, this.state, preview, this.sprites);
  }

  /** Figures beside places: of each measurement, and of the cable, wall or tree under the pointer. */
  private asides(scene: Scene): Aside[] {
    const { hoveredId, preview } = this.state;
    const asides: Aside[] = [];
    for (const { id, points, text } of scene.measurements)
      if (text !== '') asides.push({ id, at: halfway(points), text });
    if (!isBusy(preview)) {
      for (const { id, top, foot, label } of scene.faces)
        if (id === hoveredId) asides.push({ id, at: halfway(top ?? foot), text: label });
      for (const { id, outline, label } of scene.trees)
        if (id === hoveredId) asides.push({ id, at: middle(outline), text: label });
    }
    const cable = isBusy(preview) ? undefined : scene.cables.find((c) => c.id === hoveredId);
    if (cable !== undefined && cable.text !== '')
      asides.push({ id: cable.id, at: halfway(cable.points), text: cable.text });
    return asides;
  }

  private paintMoving(ctx: CanvasRenderingContext2D, moving: Scene, dx: number, dy: number): void {
    const { camera } = this.state;
    const shifted = { ...camera, x: camera.x + dx * camera.zoom, y: camera.y + dy * camera.zoom };
    const ids = this.split?.ids ?? nobody;
    drawCables(
      ctx,
      camera,
      moving.cables.map((cable) => stretched(cable, ids, dx, dy)),
    );
    for (const area of moving.areas) drawArea(ctx, shifted, area, true);
    for (const face of moving.faces) drawFace(ctx, shifted, face, true);
    for (const tree of moving.trees) drawTree(ctx, shifted, tree, true);
    drawMeasurements(ctx, shifted, moving.measurements, () => true);
    this.paintNodesAndFixtures(ctx, shifted, moving);
    this.paintChoices(ctx, shifted, moving);
  }

  private paintChoices(ctx: CanvasRenderingContext2D, camera: Camera, scene: Scene): void {
    const { selection, hoveredId } = this.state;
    const r = markRadius(camera);
    const ring = (id: string, at: Point): void => {
      const chosen = selection.has(id);
      if (!chosen && id !== hoveredId) return;
      const p = toWindow(camera, at);
      ctx.translate(p.x, p.y);
      drawChoice(ctx, r + 1.5, !chosen);
      ctx.translate(-p.x, -p.y);
    };
    for (const fixture of scene.fixtures) ring(fixture.id, fixture.at);
    for (const node of scene.nodes) ring(node.id, node.at);
  }
}

export type LayerName = 'ground' | 'cable' | 'fixtures' | 'overlay';
export const allLayers: ReadonlySet<LayerName> = new Set(['ground', 'cable', 'fixtures', 'overlay']);

/** The middle of a polyline by its length on the sheet. */
function halfway(points: readonly Point[]): Point {
  const lengths = points.slice(1).map((p, i) => Math.hypot(p.x - points[i]!.x, p.y - points[i]!.y));
  let left = lengths.reduce((sum, l) => sum + l, 0) / 2;
  for (const [i, length] of lengths.entries()) {
    if (left <= length && length > 0) {
      const a = points[i]!;
      const b = points[i + 1]!;
      return { x: a.x + ((b.x - a.x) * left) / length, y: a.y + ((b.y - a.y) * left) / length };
    }
    left -= length;
  }
  return points[0]!;
}

function isBusy(preview: Preview | null): boolean {
  return preview !== null && preview.kind !== 'place' && preview.kind !== 'proposed';
}

function movingIds(preview: Preview | null): ReadonlySet<string> | null {
  return preview?.kind === 'move' ? preview.ids : null;
}

function splitScene(scene: Scene, ids: ReadonlySet<string>): Split {
  const touches = (cable: SceneCable): boolean =>
    ids.has(cable.id) || ids.has(cable.fromId) || ids.has(cable.toId);
  const has = (x: { readonly id: string }): boolean => ids.has(x.id);
  const hasNot = (x: { readonly id: string }): boolean => !ids.has(x.id);
  return {
    scene,
    ids,
    still: {
      fixtures: scene.fixtures.filter(hasNot),
      nodes: scene.nodes.filter(hasNot),
      areas: scene.areas.filter(hasNot),
      faces: scene.faces.filter(hasNot),
      trees: scene.trees.filter(hasNot),
      measurements: scene.measurements.filter(hasNot),
      cables: scene.cables.filter((c) => !touches(c)),
    },
    moving: {
      fixtures: scene.fixtures.filter(has),
      nodes: scene.nodes.filter(has),
      areas: scene.areas.filter(has),
      faces: scene.faces.filter(has),
      trees: scene.trees.filter(has),
      measurements: scene.measurements.filter(has),
      cables: scene.cables.filter(touches),
    },
  };
}

/** A cable some of whose ends are being moved. */
function stretched(cable: SceneCable, ids: ReadonlySet<string>, dx: number, dy: number): CableStroke {
  const shift = (p: Point): Point => ({ x: p.x + dx, y: p.y + dy });
  const from = cable.points[0]!;
  const to = cable.points[cable.points.length - 1]!;
  const via = ids.has(cable.id) ? cable.via.map(shift) : cable.via;
  return {
    ...cable,
    points: [ids.has(cable.fromId) ? shift(from) : from, ...via, ids.has(cable.toId) ? shift(to) : to],
  };
}

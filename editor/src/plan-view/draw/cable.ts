import { type Camera, type Point, toWindow } from '../camera';
import { ink, paper } from '../palette';

const CASING = 1.75;

/** Traces a polyline of sheet points in window pixels. */
export function trace(ctx: CanvasRenderingContext2D, camera: Camera, points: readonly Point[]): void {
  points.forEach((p, i) => {
    const q = toWindow(camera, p);
    if (i === 0) ctx.moveTo(q.x, q.y);
    else ctx.lineTo(q.x, q.y);
  });
}

export interface CableStroke {
  readonly points: readonly Point[];
  readonly weight: number;
  readonly colour: string;
  /** Nothing feeds it yet. */
  readonly dashed: boolean;
}

/**
 * Draws cables: all white casings of a batch first and their lines on top, one path a style, so that a
 * junction of two cables shows no seam and 2000 cables cost a handful of strokes.
 */
export function drawCables(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  cables: readonly CableStroke[],
): void {
  ctx.lineJoin = 'round';
  ctx.lineCap = 'round';
  const styles = new Map<string, CableStroke[]>();
  for (const cable of cables) {
    const key = `${cable.weight}${cable.colour}${cable.dashed}`;
    const list = styles.get(key);
    if (list === undefined) styles.set(key, [cable]);
    else list.push(cable);
  }
  for (const list of styles.values()) {
    ctx.beginPath();
    for (const cable of list) trace(ctx, camera, cable.points);
    ctx.strokeStyle = paper;
    ctx.lineWidth = list[0]!.weight + CASING * 2;
    ctx.stroke();
  }
  for (const list of styles.values()) {
    const first = list[0]!;
    ctx.beginPath();
    for (const cable of list) trace(ctx, camera, cable.points);
    ctx.strokeStyle = first.colour;
    ctx.lineWidth = first.weight;
    ctx.setLineDash(first.dashed ? [first.weight * 2.5, first.weight * 2.5] : []);
    ctx.stroke();
  }
  ctx.setLineDash([]);
}

/** The choice of a cable: an ink line at each side of its casing. */
export function drawChosenCable(ctx: CanvasRenderingContext2D, camera: Camera, cable: CableStroke): void {
  ctx.lineJoin = 'round';
  ctx.lineCap = 'round';
  const layers: [string, number][] = [
    [paper, cable.weight + 11],
    [ink, cable.weight + 8],
    [paper, cable.weight + 5],
    [cable.colour, cable.weight],
  ];
  for (const [colour, width] of layers) {
    ctx.beginPath();
    trace(ctx, camera, cable.points);
    ctx.strokeStyle = colour;
    ctx.lineWidth = width;
    ctx.stroke();
  }
}

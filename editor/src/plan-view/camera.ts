/**
 * Where the window looks on a sheet: a point in the window is sheet point × zoom + offset.
 * Zoom 1 shows one sheet pixel as one CSS pixel.
 */
export interface Camera {
  readonly x: number;
  readonly y: number;
  readonly zoom: number;
}

export interface Point {
  readonly x: number;
  readonly y: number;
}

export interface Size {
  readonly width: number;
  readonly height: number;
}

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

export const MIN_ZOOM = 0.02;
export const MAX_ZOOM = 16;

/** The share of the window that a fitted sheet or choice leaves free at each edge. */
const FIT_MARGIN = 0.04;

export function toWindow(camera: Camera, p: Point): Point {
  return { x: p.x * camera.zoom + camera.x, y: p.y * camera.zoom + camera.y };
}

export function toSheet(camera: Camera, p: Point): Point {
  return { x: (p.x - camera.x) / camera.zoom, y: (p.y - camera.y) / camera.zoom };
}

export function panBy(camera: Camera, dx: number, dy: number): Camera {
  return { ...camera, x: camera.x + dx, y: camera.y + dy };
}

/** Zooms by a factor and keeps what lies under `anchor` (window pixels) where it is. */
export function zoomAt(camera: Camera, anchor: Point, factor: number): Camera {
  const zoom = Math.min(MAX_ZOOM, Math.max(MIN_ZOOM, camera.zoom * factor));
  const k = zoom / camera.zoom;
  return { zoom, x: anchor.x - (anchor.x - camera.x) * k, y: anchor.y - (anchor.y - camera.y) * k };
}

/**
 * Shows a box of the sheet as large as the window allows, in its middle. Never closer than `maxZoom`, so
 * that a single fixture doesn't fill the window.
 */
export function fitBox(box: Box, window: Size, maxZoom = MAX_ZOOM): Camera {
  const width = Math.max(box.right - box.left, 1);
  const height = Math.max(box.bottom - box.top, 1);
  const free = 1 - 2 * FIT_MARGIN;
  const zoom = Math.min(
    maxZoom,
    MAX_ZOOM,
    Math.max(MIN_ZOOM, Math.min((window.width * free) / width, (window.height * free) / height)),
  );
  return {
    zoom,
    x: window.width / 2 - ((box.left + box.right) / 2) * zoom,
    y: window.height / 2 - ((box.top + box.bottom) / 2) * zoom,
  };
}

export function boxAround(points: Iterable<Point>): Box | null {
  let left = Number.POSITIVE_INFINITY;
  let top = Number.POSITIVE_INFINITY;
  let right = Number.NEGATIVE_INFINITY;
  let bottom = Number.NEGATIVE_INFINITY;
  for (const p of points) {
    left = Math.min(left, p.x);
    right = Math.max(right, p.x);
    top = Math.min(top, p.y);
    bottom = Math.max(bottom, p.y);
  }
  return left <= right ? { left, top, right, bottom } : null;
}

export function boxOf(a: Point, b: Point): Box {
  return {
    left: Math.min(a.x, b.x),
    right: Math.max(a.x, b.x),
    top: Math.min(a.y, b.y),
    bottom: Math.max(a.y, b.y),
  };
}

export function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

export function contains(box: Box, p: Point): boolean {
  return p.x >= box.left && p.x <= box.right && p.y >= box.top && p.y <= box.bottom;
}

/**
 * Half the width of a fixture's disc in window pixels. Marks keep their size on the screen while one zooms,
 * but shrink on a plan seen from far away, where they would cover each other.
 */
export function markRadius(camera: Camera): number {
  return Math.min(13, Math.max(5, 13 * Math.min(1, camera.zoom / 0.3) ** 0.5));
}

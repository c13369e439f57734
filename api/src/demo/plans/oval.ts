import type { Point } from '../plan-builder.js';

const CORNERS = 16;

/** The outline of a round crown. */
export function oval([x, y]: Point, radiusX: number, radiusY = radiusX): Point[] {
  return Array.from({ length: CORNERS }, (_, i): Point => {
    const angle = (2 * Math.PI * i) / CORNERS;
    return [x + radiusX * Math.cos(angle), y + radiusY * Math.sin(angle)];
  });
}

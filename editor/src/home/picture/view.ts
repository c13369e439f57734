/**
 * The part of a picture that is seen. `x` and `y` are where the picture's upper left corner lies, in shares
 * of the frame's width and height, so that a frame of another size shows the same part.
 */
export interface View {
  readonly zoom: number;
  readonly x: number;
  readonly y: number;
}

/** In shares of the frame: 0.5, 0.5 is its middle. */
export interface Spot {
  readonly x: number;
  readonly y: number;
}

export const MOST_ZOOM = 6;
export const whole: View = { zoom: 1, x: 0, y: 0 };
const middle: Spot = { x: 0.5, y: 0.5 };

const between = (n: number, least: number, most: number): number => Math.min(most, Math.max(least, n));

/** The picture always fills the frame. */
export function clamped({ zoom, x, y }: View): View {
  const z = between(zoom, 1, MOST_ZOOM);
  return { zoom: z, x: between(x, 1 - z, 0), y: between(y, 1 - z, 0) };
}

/** Zooms by a factor; what is at the spot stays there. */
export function zoomed(view: View, factor: number, at: Spot = middle): View {
  const zoom = between(view.zoom * factor, 1, MOST_ZOOM);
  const by = zoom / view.zoom;
  return clamped({ zoom, x: at.x - (at.x - view.x) * by, y: at.y - (at.y - view.y) * by });
}

export const panned = (view: View, dx: number, dy: number): View =>
  clamped({ ...view, x: view.x + dx, y: view.y + dy });

/** Brings a spot of the whole picture into the frame, if it is not well within it. */
export function showing(view: View, spot: Spot): View {
  const seen = { x: view.x + spot.x * view.zoom, y: view.y + spot.y * view.zoom };
  const inside = (n: number): boolean => n > 0.05 && n < 0.95;
  if (inside(seen.x) && inside(seen.y)) return view;
  return panned(view, 0.5 - seen.x, 0.5 - seen.y);
}

/** The spot of the whole picture that is seen at a spot of the frame. */
export const under = (view: View, at: Spot = middle): Spot => ({
  x: (at.x - view.x) / view.zoom,
  y: (at.y - view.y) / view.zoom,
});

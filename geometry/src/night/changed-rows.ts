import type { LightMap } from './layers.js';

/**
 * Rows `from` up to `to` of a picture `height` pixels high that may differ where one light is replaced by another;
 * none where they are the same. A picture reads light between the map's rows, so that a row of it shows in the
 * picture's rows beside its own.
 */
export function rowsThatDiffer(
  before: LightMap,
  after: LightMap,
  height: number,
): { readonly from: number; readonly to: number } {
  const whole = { from: 0, to: height };
  if (before.width !== after.width || before.height !== after.height || before.view !== after.view)
    return whole;
  if (before.leaves !== after.leaves && !isSame(before.leaves, after.leaves)) return whole;
  const { rgba } = after;
  const perRow = after.width * 4;
  let first = 0;
  while (first < rgba.length && rgba[first] === before.rgba[first]) first++;
  if (first === rgba.length) return { from: 0, to: 0 };
  let last = rgba.length - 1;
  while (rgba[last] === before.rgba[last]) last--;
  const scale = height / after.height;
  return {
    from: Math.max(Math.floor((Math.floor(first / perRow) - 1) * scale), 0),
    to: Math.min(Math.ceil((Math.floor(last / perRow) + 2) * scale), height),
  };
}

function isSame(a: Uint8Array, b: Uint8Array): boolean {
  return a.every((value, i) => value === b[i]);
}

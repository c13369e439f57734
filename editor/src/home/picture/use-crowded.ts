import { type RefObject, useLayoutEffect, useMemo, useState } from 'react';
import type { ShownMark } from './mark';
import type { View } from './view';

/** Nearer than a target needs, marks would hide one another's letters and be hard to press one by one. */
const APART_PX = 24;

interface Size {
  readonly widthPx: number;
  readonly heightPx: number;
}

/** The marks that stand too close for their full size: they are drawn smaller until the picture is zoomed. */
export function useCrowded(
  frame: RefObject<HTMLElement | null>,
  { zoom }: View,
  marks: readonly ShownMark[],
): ReadonlySet<ShownMark> {
  const [size, setSize] = useState<Size | null>(null);
  useLayoutEffect(() => {
    const element = frame.current;
    if (!element) return;
    const measure = (): void => {
      const { clientWidth: widthPx, clientHeight: heightPx } = element;
      // Behind another screen it has no size; it keeps the one it had.
      if (widthPx > 0) setSize({ widthPx, heightPx });
    };
    measure();
    window.addEventListener('resize', measure);
    return () => window.removeEventListener('resize', measure);
  }, [frame]);
  return useMemo(
    () =>
      size ? crowdedOf(marks, { widthPx: size.widthPx * zoom, heightPx: size.heightPx * zoom }) : new Set(),
    [marks, size, zoom],
  );
}

/** @param shown how large the whole picture's frame is on the screen, zoomed as it is */
export function crowdedOf<Mark extends Pick<ShownMark, 'spot'>>(
  marks: readonly Mark[],
  { widthPx, heightPx }: Size,
): Set<Mark> {
  const crowded = new Set<Mark>();
  marks.forEach((mark, i) => {
    for (const other of marks.slice(i + 1)) {
      const dx = (mark.spot.x - other.spot.x) * widthPx;
      const dy = (mark.spot.y - other.spot.y) * heightPx;
      if (Math.hypot(dx, dy) >= APART_PX) continue;
      crowded.add(mark).add(other);
    }
  });
  return crowded;
}

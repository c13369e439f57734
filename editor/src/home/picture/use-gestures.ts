import { type RefObject, useEffect, useRef } from 'react';
import { panned, type Spot, type View, zoomed } from './view';

/** A finger that moved less than this has pressed, not dragged. */
const SLOP_PX = 8;

interface Finger {
  readonly x: number;
  readonly y: number;
}

/**
 * Moves and zooms the picture in the frame: drag when zoomed, two fingers, and the wheel. While the whole
 * picture is seen, one finger and the plain wheel scroll the page.
 */
export function useGestures(frame: RefObject<HTMLElement | null>, view: View, setView: (view: View) => void) {
  const latest = useRef({ view, setView });
  latest.current = { view, setView };

  useEffect(() => {
    const element = frame.current;
    if (!element) return;
    const fingers = new Map<number, Finger>();
    let began: Finger | null = null;
    let dragging = false;
    // Of the gesture that the next click ends.
    let moved = false;

    const set = (next: View): void => {
      // Several moves may come before the next rendering.
      latest.current.view = next;
      latest.current.setView(next);
    };
    const spotOf = ({ x, y }: Finger): Spot => {
      const box = element.getBoundingClientRect();
      return { x: (x - box.left) / box.width, y: (y - box.top) / box.height };
    };
    const capture = (id: number): void => {
      // A pointer that is gone can't be captured.
      if (element.isConnected && fingers.has(id)) element.setPointerCapture?.(id);
    };

    const down = (event: PointerEvent): void => {
      if (event.pointerType === 'mouse' && event.button !== 0) return;
      fingers.set(event.pointerId, { x: event.clientX, y: event.clientY });
      if (fingers.size === 1) {
        moved = false;
        dragging = false;
        began = { x: event.clientX, y: event.clientY };
      } else {
        moved = true;
        for (const id of fingers.keys()) capture(id);
      }
    };

    const move = (event: PointerEvent): void => {
      const before = fingers.get(event.pointerId);
      if (!before) return;
      const now = { x: event.clientX, y: event.clientY };
      fingers.set(event.pointerId, now);
      const box = element.getBoundingClientRect();
      const { view: seen } = latest.current;
      const other = [...fingers].find(([id]) => id !== event.pointerId)?.[1];
      if (other) {
        const wasApart = Math.hypot(before.x - other.x, before.y - other.y);
        const apart = Math.hypot(now.x - other.x, now.y - other.y);
        const at = spotOf({ x: (now.x + other.x) / 2, y: (now.y + other.y) / 2 });
        const slid = panned(seen, (now.x - before.x) / 2 / box.width, (now.y - before.y) / 2 / box.height);
        set(zoomed(slid, wasApart > 0 ? apart / wasApart : 1, at));
        return;
      }
      if (seen.zoom === 1 || !began) return;
      if (!dragging && Math.hypot(now.x - began.x, now.y - began.y) < SLOP_PX) return;
      if (!dragging) {
        dragging = true;
        moved = true;
        capture(event.pointerId);
      }
      set(panned(seen, (now.x - before.x) / box.width, (now.y - before.y) / box.height));
    };

    const up = (event: PointerEvent): void => {
      fingers.delete(event.pointerId);
      // The finger that stays goes on dragging from where it is.
      began = [...fingers.values()][0] ?? null;
    };

    const click = (event: MouseEvent): void => {
      if (!moved) return;
      moved = false;
      event.preventDefault();
      event.stopPropagation();
    };

    const wheel = (event: WheelEvent): void => {
      const { view: seen } = latest.current;
      const meant = event.ctrlKey || event.metaKey || seen.zoom > 1;
      if (!meant) return;
      const next = zoomed(
        seen,
        Math.exp(-event.deltaY * (event.ctrlKey ? 0.01 : 0.0025)),
        spotOf({ x: event.clientX, y: event.clientY }),
      );
      event.preventDefault();
      set(next);
    };

    // Some browsers take two fingers for themselves unless told here.
    const touch = (event: TouchEvent): void => {
      if (event.touches.length > 1 && event.cancelable) event.preventDefault();
    };

    const gone = new AbortController();
    const { signal } = gone;
    element.addEventListener('pointerdown', down, { signal });
    element.addEventListener('pointermove', move, { signal });
    element.addEventListener('pointerup', up, { signal });
    element.addEventListener('pointercancel', up, { signal });
    element.addEventListener('click', click, { signal, capture: true });
    element.addEventListener('touchmove', touch, { signal, passive: false });
    // Not passive: it may keep the page from scrolling.
    element.addEventListener('wheel', wheel, { signal, passive: false });
    return () => gone.abort();
  }, [frame]);
}

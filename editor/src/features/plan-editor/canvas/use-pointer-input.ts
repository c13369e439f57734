import { type RefObject, useEffect, useState } from 'react';
import type { PlanEditor } from '../page/editor';
import { PointerInput, type PointerSample, readWheel } from './pointer-input';

/** Connects the drawing's pointers, wheel and space bar; says whether the view is being panned. */
export function usePointerInput(frame: RefObject<HTMLElement | null>, editor: PlanEditor): boolean {
  const [panning, setPanning] = useState(false);
  useEffect(() => {
    const element = frame.current;
    if (element === null) return;
    const input = new PointerInput({
      camera: () => editor.camera.camera,
      tool: (event) => editor.tools.handle(event),
      touchDrag: (at) => editor.tools.touchDrag(at),
      pan: (dx, dy) => editor.camera.pan(dx, dy),
      zoom: (factor, anchor) => editor.camera.zoom(factor, anchor),
      readOnly: () => !editor.canEdit,
      panning: setPanning,
    });
    const place = (e: MouseEvent) => {
      const box = element.getBoundingClientRect();
      return { x: e.clientX - box.left, y: e.clientY - box.top };
    };
    const sample = (e: PointerEvent): PointerSample => ({
      id: e.pointerId,
      type: e.pointerType === 'touch' ? 'touch' : e.pointerType === 'pen' ? 'pen' : 'mouse',
      at: place(e),
      button: e.button,
      mods: { shift: e.shiftKey, alt: e.altKey },
      time: e.timeStamp,
    });
    const onDrawing = (e: Event) => e.target instanceof HTMLCanvasElement || e.target === element;
    const down = (e: PointerEvent) => {
      if (!onDrawing(e)) return;
      element.focus({ preventScroll: true });
      element.setPointerCapture(e.pointerId);
      // The middle button would start the browser's own scrolling.
      if (e.button === 1) e.preventDefault();
      input.down(sample(e));
    };
    const move = (e: PointerEvent) => {
      if (onDrawing(e)) input.move(sample(e));
    };
    const up = (e: PointerEvent) => input.up(sample(e));
    const cancel = (e: PointerEvent) => input.cancel(e.pointerId);
    const leave = () => input.leave();
    const wheel = (e: WheelEvent) => {
      e.preventDefault();
      const asked = readWheel({
        deltaX: e.deltaX,
        deltaY: e.deltaY,
        deltaMode: e.deltaMode,
        ctrl: e.ctrlKey,
        shift: e.shiftKey,
      });
      if ('zoom' in asked) editor.camera.zoom(asked.zoom, place(e));
      else editor.camera.pan(asked.dx, asked.dy);
    };
    const key = (e: KeyboardEvent) => {
      if (e.code === 'Space' && (e.type === 'keyup' || e.target === element)) {
        if (e.target === element) e.preventDefault();
        input.space(e.type === 'keydown');
      }
    };
    const menu = (e: Event) => {
      if (onDrawing(e)) e.preventDefault();
    };
    element.addEventListener('pointerdown', down);
    element.addEventListener('pointermove', move);
    element.addEventListener('pointerup', up);
    element.addEventListener('pointercancel', cancel);
    element.addEventListener('pointerleave', leave);
    element.addEventListener('wheel', wheel, { passive: false });
    element.addEventListener('contextmenu', menu);
    window.addEventListener('keydown', key);
    window.addEventListener('keyup', key);
    return () => {
      element.removeEventListener('pointerdown', down);
      element.removeEventListener('pointermove', move);
      element.removeEventListener('pointerup', up);
      element.removeEventListener('pointercancel', cancel);
      element.removeEventListener('pointerleave', leave);
      element.removeEventListener('wheel', wheel);
      element.removeEventListener('contextmenu', menu);
      window.removeEventListener('keydown', key);
      window.removeEventListener('keyup', key);
    };
  }, [frame, editor]);
  return panning;
}

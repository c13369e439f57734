import type { PlanRecord } from '@lampwright/geometry/plan';
import { type Camera, type Point, toWindow } from '../../../plan-view/camera';
import type { PlanEditor } from './editor';

/** What tests in a real browser need of a canvas, whose shapes no selector can find. */
export interface PlanTestHandle {
  records(): PlanRecord[];
  /** Where a placed record is in the browser's window, in CSS pixels; null for what has no single place. */
  positionOf(id: string): Point | null;
  /** The window position of a point of the open sheet. */
  windowPoint(p: Point): Point;
  camera(): Camera;
  selection(): string[];
  volts(): Record<string, number>;
  /** Resolves when no estimate is waiting or under way. */
  settled(): Promise<void>;
}

declare global {
  interface Window {
    __plan?: PlanTestHandle;
  }
}

/** Only test builds have the handle: elsewhere the flag is unset and this code is dropped from the bundle. */
export function exposeTestHandle(editor: PlanEditor): (() => void) | null {
  if (import.meta.env.VITE_TEST_HANDLE !== '1') return null;
  const windowPoint = (p: Point): Point => {
    const frame = document.querySelector('[data-testid="plan-canvas"]')?.getBoundingClientRect();
    const at = toWindow(editor.camera.camera, p);
    return { x: at.x + (frame?.left ?? 0), y: at.y + (frame?.top ?? 0) };
  };
  window.__plan = {
    records: () => [...editor.doc.values()],
    positionOf(id) {
      const record = editor.doc.get(id);
      return record !== undefined && 'at' in record ? windowPoint(record.at) : null;
    },
    windowPoint,
    camera: () => editor.camera.camera,
    selection: () => [...editor.session.getState().selection],
    volts: () =>
      Object.fromEntries(
        [...(editor.estimate.state.getState().answers?.fixtures ?? [])].map(([id, f]) => [id, f.volts]),
      ),
    settled: () => editor.estimate.settled(),
  };
  return () => {
    delete window.__plan;
  };
}

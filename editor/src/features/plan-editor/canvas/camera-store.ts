import { createStore, type StoreApi } from 'zustand/vanilla';
import {
  type Box,
  type Camera,
  fitBox,
  type Point,
  panBy,
  type Size,
  zoomAt,
} from '../../../plan-view/camera';

export interface CameraState {
  readonly camera: Camera;
  /** The drawing's part of the window, in CSS pixels. */
  readonly size: Size;
}

/** Zoom to a choice never goes closer than this: one fixture needs its surroundings. */
const CHOICE_ZOOM = 2;

/** A part of the sheet with a little of what is around it. */
function closeUp(box: Box, size: Size): Camera {
  const pad = Math.max(box.right - box.left, box.bottom - box.top) * 0.1;
  return fitBox(
    { left: box.left - pad, top: box.top - pad, right: box.right + pad, bottom: box.bottom + pad },
    size,
    CHOICE_ZOOM,
  );
}

export class CameraStore {
  readonly state: StoreApi<CameraState> = createStore<CameraState>(() => ({
    camera: { x: 0, y: 0, zoom: 1 },
    size: { width: 0, height: 0 },
  }));
  /** True until the person moves the view: till then the sheet stays fitted while the window finds its size. */
  private untouched = true;
  private sheet: Size | null = null;
  /** What the view begins with instead of the whole sheet. */
  private aim: Box | null = null;

  get camera(): Camera {
    return this.state.getState().camera;
  }

  /** Shows another sheet, fitted. */
  show(sheet: Size): void {
    this.sheet = sheet;
    this.untouched = true;
    this.begin();
  }

  /** Has the view begin with a part of the sheet, until the person moves it; null: with the whole. */
  aimAt(box: Box | null): void {
    this.aim = box;
    this.untouched = true;
    this.begin();
  }

  private begin(): void {
    const { size } = this.state.getState();
    if (this.aim === null) this.fit();
    else if (size.width > 0) this.state.setState({ camera: closeUp(this.aim, size) });
  }

  resize(size: Size): void {
    const before = this.state.getState().size;
    if (before.width === size.width && before.height === size.height) return;
    this.state.setState({ size });
    if (this.untouched || before.width === 0) this.begin();
    // What was in the middle stays in the middle.
    else this.set(panBy(this.camera, (size.width - before.width) / 2, (size.height - before.height) / 2));
  }

  fit(): void {
    const { size } = this.state.getState();
    if (this.sheet === null || size.width === 0 || size.height === 0) return;
    const box: Box = { left: 0, top: 0, right: this.sheet.width, bottom: this.sheet.height };
    this.state.setState({ camera: fitBox(box, size) });
  }

  fitTo(box: Box): void {
    const { size } = this.state.getState();
    if (size.width === 0) return;
    this.set(closeUp(box, size));
  }

  pan(dx: number, dy: number): void {
    this.set(panBy(this.camera, dx, dy));
  }

  zoom(factor: number, anchor?: Point): void {
    const { size } = this.state.getState();
    this.set(zoomAt(this.camera, anchor ?? { x: size.width / 2, y: size.height / 2 }, factor));
  }

  /** Brings a sheet point into the window, if it is out of it, without changing the zoom. */
  reveal(p: Point): void {
    const { camera, size } = this.state.getState();
    const x = p.x * camera.zoom + camera.x;
    const y = p.y * camera.zoom + camera.y;
    const margin = Math.min(60, size.width / 4, size.height / 4);
    const dx = x < margin ? margin - x : x > size.width - margin ? size.width - margin - x : 0;
    const dy = y < margin ? margin - y : y > size.height - margin ? size.height - margin - y : 0;
    if (dx !== 0 || dy !== 0) this.set(panBy(camera, dx, dy));
  }

  set(camera: Camera): void {
    this.untouched = false;
    this.state.setState({ camera });
  }
}

import { toWindow } from '../../../plan-view/camera';
import type { PlanEditor } from '../page/editor';
import { extentOf } from '../tools/hit';
import type { Lightable } from './subject';

/** In a narrower window the panel comes up from below; see the page's styles. */
const NARROW_WINDOW = 760;
/** There the middle of what stays free, as a share of the drawing's height. */
const FREE_MIDDLE = 0.44;

/** Keeps what is to be lit beside its panel: gives the side that the panel stands at, or moves the view above it. */
export function bringIntoView(editor: PlanEditor, record: Lightable): 'start' | 'end' {
  const { camera, size } = editor.camera.state.getState();
  const points = extentOf({ doc: () => editor.doc }, record);
  if (points.length === 0 || size.width === 0) return 'start';
  const xs = points.map(({ x }) => x);
  const ys = points.map(({ y }) => y);
  const middle = toWindow(camera, {
    x: (Math.min(...xs) + Math.max(...xs)) / 2,
    y: (Math.min(...ys) + Math.max(...ys)) / 2,
  });
  if (window.innerWidth > NARROW_WINDOW) return middle.x < size.width / 2 ? 'end' : 'start';
  editor.camera.pan(size.width / 2 - middle.x, size.height * FREE_MIDDLE - middle.y);
  return 'start';
}

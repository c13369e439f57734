import type { PlanEditor } from '../page/editor';
import { pickByDigit } from '../page/pick-by-digit';

/** Window pixels that an arrow key moves the view. */
const PAN_STEP = 60;
const ZOOM_STEP = 1.25;

/** Keys on the drawing: the tool's first, then those of the view. Says whether the key was used. */
export function canvasKey(editor: PlanEditor, e: KeyboardEvent): boolean {
  if (e.ctrlKey || e.metaKey) return false;
  if (editor.tools.handle({ type: 'key', key: e.key, mods: { shift: e.shiftKey, alt: e.altKey } }))
    return true;
  // With Alt, arrows move what is chosen; the page hears that, from the ledger as well.
  if (e.altKey) return false;
  if (/^[1-9]$/.test(e.key) && pickByDigit(editor, Number(e.key))) return true;
  switch (e.key) {
    case 'ArrowLeft':
      editor.camera.pan(PAN_STEP, 0);
      return true;
    case 'ArrowRight':
      editor.camera.pan(-PAN_STEP, 0);
      return true;
    case 'ArrowUp':
      editor.camera.pan(0, PAN_STEP);
      return true;
    case 'ArrowDown':
      editor.camera.pan(0, -PAN_STEP);
      return true;
    case '+':
    case '=':
      editor.camera.zoom(ZOOM_STEP);
      return true;
    case '-':
      editor.camera.zoom(1 / ZOOM_STEP);
      return true;
    case '0':
      editor.camera.fit();
      return true;
    case '1':
      editor.camera.zoom(1 / editor.camera.camera.zoom);
      return true;
    case '2':
      editor.zoomToSelection();
      return true;
    default:
      return false;
  }
}

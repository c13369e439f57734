import { Button } from '../../../components/button';
import { type Point, toSheet } from '../../../plan-view/camera';
import type { Request } from '../tools/tool';
import { crownHeights, upperEdge } from '../tools/uprights';
import { useEditor, useSession, useSheet, useTools } from './context';
import type { PlanEditor } from './editor';
import styles from './page.module.css';

/** How to draw a wall face, what is asked for next, and a way without a pointer. */
export function FaceOptions() {
  const editor = useEditor();
  const photo = useSheet()?.view === 'photo';
  const preview = useTools((s) => s.preview);
  const asked = useSession((s) => s.request !== null);
  const started = preview?.kind === 'face' && preview.foot.length > 0;
  const footDone = started && preview.waitsForTop && !asked;
  return (
    <>
      <p>
        {footDone
          ? 'Now click on its upper edge, above the first point of the foot.'
          : photo
            ? 'Click along the foot of the wall, then once on its upper edge above the first point. Enter or a double click ends the foot; Esc takes back a point.'
            : 'Click along the foot of the wall. Enter or a double click ends it; Esc takes back a point.'}
      </p>
      {started && !asked && <Steps end={footDone ? null : 'End the foot'} />}
      {!started && !asked && (
        <Button onClick={() => editor.session.setState({ request: faceInView(editor, photo) })}>
          Put one in the middle of the view
        </Button>
      )}
    </>
  );
}

export function TreeOptions() {
  const editor = useEditor();
  const photo = useSheet()?.view === 'photo';
  const preview = useTools((s) => s.preview);
  const asked = useSession((s) => s.request !== null);
  const started = preview?.kind === 'tree' && preview.outline.length > 0;
  return (
    <>
      <p>
        Click where it stands, then go round its crown{photo ? ' as you see it' : ' as seen from above'}:
        corner by corner, or in one stroke. It may reach beyond the sheet.
      </p>
      {started && !asked && <Steps end="Close the crown" />}
      {!started && !asked && (
        <Button onClick={() => editor.session.setState({ request: treeInView(editor, photo) })}>
          Put one in the middle of the view
        </Button>
      )}
    </>
  );
}

export function AimOptions() {
  const chosen = useSession((s) => s.selection.size);
  return (
    <p>
      {chosen === 0
        ? 'Click a light, shift-click more, then click what they are to light.'
        : 'Click what the chosen lights are to light: the ground, a wall face or a tree. Exact figures are under “Chosen”.'}
    </p>
  );
}

/** What Enter and Esc do, for hands without a keyboard. */
function Steps({ end }: { readonly end: string | null }) {
  const editor = useEditor();
  const press = (key: string) =>
    editor.tools.handle({ type: 'key', key, mods: { shift: false, alt: false } });
  return (
    <div className={styles.buttons}>
      {end !== null && (
        <Button kind="strong" onClick={() => press('Enter')}>
          {end}
        </Button>
      )}
      <Button onClick={() => press('Escape')}>Take back</Button>
    </div>
  );
}

/** A place of the view, in shares of its width and height, on the sheet. */
function placer(editor: PlanEditor): (x: number, y: number) => Point {
  const { camera, size } = editor.camera.state.getState();
  return (x, y) => toSheet(camera, { x: size.width * x, y: size.height * y });
}

const worldOf = (editor: PlanEditor) => ({
  doc: () => editor.doc,
  sheetId: () => editor.session.getState().sheetId,
  scale: () => editor.scale,
});

function faceInView(editor: PlanEditor, photo: boolean): Request {
  const at = placer(editor);
  const foot = [at(0.35, 0.6), at(0.65, 0.6)];
  if (!photo) return { kind: 'face', foot, top: null, seenMeters: null };
  const { top, heightMeters } = upperEdge(worldOf(editor), foot, at(0.35, 0.35));
  return { kind: 'face', foot, top, seenMeters: heightMeters };
}

/** Corners of a crown that is put down without a pointer. */
const CROWN_CORNERS = 10;

function treeInView(editor: PlanEditor, photo: boolean): Request {
  const at = placer(editor);
  const { size } = editor.camera.state.getState();
  const foot = at(0.5, photo ? 0.65 : 0.5);
  const r = 0.12 * Math.min(size.width, size.height);
  const outline = Array.from({ length: CROWN_CORNERS }, (_, i) => {
    const turn = (i / CROWN_CORNERS) * 2 * Math.PI;
    return at(
      0.5 + (r * Math.cos(turn)) / size.width,
      (photo ? 0.4 : 0.5) + (r * Math.sin(turn)) / size.height,
    );
  });
  return { kind: 'tree', foot, outline, seen: crownHeights(worldOf(editor), foot, outline) };
}

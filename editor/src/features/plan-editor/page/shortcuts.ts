import { toggleMode } from '../night/set-mode';
import type { PlanEditor } from './editor';
import { toolKeys } from './icons';

/** Window pixels of one nudge, and of one with Shift. */
const NUDGE = 2;
const NUDGE_FAR = 20;

const arrows: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

/** Keys of the whole plan page, wherever the focus is but in a field. Says whether the key was used. */
export function pageKey(editor: PlanEditor, e: KeyboardEvent): boolean {
  if (isTyping(e.target)) return false;
  const key = e.key.length === 1 ? e.key.toLowerCase() : e.key;
  if (e.ctrlKey || e.metaKey) return commandKey(editor, key, e.shiftKey);
  const arrow = arrows[e.key];
  if (e.altKey) {
    if (arrow === undefined || editor.session.getState().selection.size === 0) return false;
    const step = e.shiftKey ? NUDGE_FAR : NUDGE;
    editor.nudge(arrow[0] * step, arrow[1] * step);
    return true;
  }
  switch (key) {
    case 'Delete':
    case 'Backspace':
      editor.deleteSelection();
      return true;
    case 'Escape':
      return stepBack(editor);
    case 'l':
      toggleMode(editor.session);
      return true;
    default: {
      const tool = toolKeys[key];
      if (tool === undefined || !editor.canEdit) return false;
      editor.use(tool);
      return true;
    }
  }
}

function commandKey(editor: PlanEditor, key: string, shift: boolean): boolean {
  switch (key) {
    case 'z':
      if (shift) editor.redo();
      else editor.undo();
      return true;
    case 'y':
      editor.redo();
      return true;
    case 'd':
      editor.duplicateSelection();
      return true;
    case 'a':
      editor.selectAll();
      return true;
    default:
      return false;
  }
}

/** From the innermost outwards: the question, the panel, the tool, the choice. */
function stepBack(editor: PlanEditor): boolean {
  const { session, tools } = editor;
  if (session.getState().request !== null) {
    session.setState({ request: null });
    return true;
  }
  if (tools.handle({ type: 'key', key: 'Escape', mods: { shift: false, alt: false } })) return true;
  if (session.getState().panel !== 'none' && session.getState().panel !== 'scale') {
    session.setState({ panel: 'none' });
    return true;
  }
  if (tools.state.getState().toolId !== 'select') {
    editor.use('select');
    return true;
  }
  if (session.getState().selection.size > 0) {
    editor.select([]);
    return true;
  }
  return false;
}

export function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  // Nothing is typed into a slider or a tick.
  if (target instanceof HTMLInputElement && ['range', 'checkbox', 'radio'].includes(target.type))
    return false;
  return target.isContentEditable || ['INPUT', 'TEXTAREA', 'SELECT'].includes(target.tagName);
}

import type { PlanEditor } from './editor';
import { fixtureChoice, pickItems, transformerPicks } from './items';

/** Chooses the nth item of the tool's list; false where the tool has no list, or none so long. */
export function pickByDigit(editor: PlanEditor, digit: number): boolean {
  const { choices } = editor.session.getState();
  switch (editor.tools.state.getState().toolId) {
    case 'fixture': {
      const pick = pickItems(editor.doc, editor.entries, 'fixture')[digit - 1];
      if (pick === undefined) return false;
      const lamps = pickItems(editor.doc, editor.entries, 'lamp');
      editor.session.setState({ choices: { ...choices, fixture: fixtureChoice(pick, lamps) } });
      editor.tools.refresh();
      return true;
    }
    case 'transformer': {
      const pick = transformerPicks(editor.doc, editor.entries)[digit - 1];
      if (pick === undefined) return false;
      editor.session.setState({ choices: { ...choices, transformer: { kind: 'new', item: pick.choice } } });
      return true;
    }
    default:
      return false;
  }
}

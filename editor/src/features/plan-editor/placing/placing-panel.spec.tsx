// @vitest-environment jsdom
import {
  apply,
  type Change,
  type EditResult,
  inverse,
  type PlanDocument,
  placeMeasurement,
  placeTree,
  recordsOf,
} from '@lampwright/geometry/plan';
import { cleanup, configure, fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { createStore } from 'zustand/vanilla';
import { Inspector } from '../inspector/Inspector';
import { EditorContext, useSession } from '../page/context';
import { PlanEditor } from '../page/editor';
import type { CatalogueEntry } from '../page/items';
import type { PlanPortState } from '../page/plan-port';
import { Driver, sheet } from '../tools/driver.testkit';
import { PlacingPanel } from './PlacingPanel';
import { entries as catalogue } from './placing.testkit';
import { type Proposer, proposerHere } from './proposer';
import { ProposerContext } from './use-proposal';

// Proposals are worked out for real here, on whatever machine this is.
configure({ asyncUtilTimeout: 10_000 });
afterEach(cleanup);

interface Setting {
  readonly entries?: readonly CatalogueEntry[];
  readonly proposer?: () => Proposer;
  readonly canEdit?: boolean;
}

function Page({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const panel = useSession((s) => s.panel);
  return (
    <>
      <Inspector entries={entries} />
      {panel === 'placing' && <PlacingPanel entries={entries} />}
    </>
  );
}

/** A plan with one thing on it that is chosen, in the parts of the page that this is about. */
function open(
  doc: PlanDocument,
  edit: EditResult,
  { entries = catalogue, proposer, canEdit = true }: Setting = {},
) {
  if (edit.kind !== 'change') throw new Error('it was refused');
  const labels: string[] = [];
  const undoes: Change[] = [];
  const state = createStore<PlanPortState>(() => ({
    doc: apply(doc, edit.change),
    undoLabel: null,
    redoLabel: null,
    save: { kind: 'saved', at: null },
    conflicts: [],
    choices: new Map(),
  }));
  const now = () => state.getState().doc;
  const port = {
    state,
    commit: (change: Change, label: string) => {
      labels.push(label);
      undoes.push(inverse(now(), change, `undo${undoes.length}`));
      state.setState({ doc: apply(now(), change) });
    },
    undo: () => {
      const change = undoes.pop();
      if (change !== undefined) state.setState({ doc: apply(now(), change) });
      return null;
    },
    redo: () => null,
    resolve: () => {},
    close: () => {},
  };
  const editor = new PlanEditor(port, canEdit, 'sheet', {
    ask: () => new Promise(() => {}),
    sentence: String,
  });
  editor.select(edit.selected);
  render(
    <EditorContext value={{ editor, units: 'metric' }}>
      <ProposerContext value={proposer ?? proposerHere}>
        <Page entries={entries} />
      </ProposerContext>
    </EditorContext>,
  );
  return { editor, labels, fixtures: () => [...recordsOf(now(), 'fixture')] };
}

const points = [
  { x: 100, y: 500 },
  { x: 1300, y: 500 },
];
const bare = () => new Driver().doc;
const path = (doc = bare()) => placeMeasurement(doc, { sheetId: 'sheet', points });

const press = (name: string | RegExp) => fireEvent.click(screen.getByRole('button', { name }));
const inPanel = (label: string) =>
  screen
    .getAllByLabelText<HTMLInputElement>(label)
    .find((field) => field.closest('section')?.querySelector('header'))!;
function type(label: string, text: string): void {
  const field = inPanel(label);
  fireEvent.change(field, { target: { value: text } });
  fireEvent.blur(field);
}

describe('lighting a path', () => {
  it('shows a proposal with its light, draws it, and places it as one change', async () => {
    const page = open(bare(), path());
    press('Light this path…');
    expect(document.activeElement?.textContent).toBe('Light this path');
    const place = await screen.findByRole('button', { name: /^Place \d+ lights$/ });
    expect(screen.getByText('Darkest place')).toBeTruthy();
    expect(screen.getByText('It gives the light that is wanted.')).toBeTruthy();
    const { proposed } = page.editor.session.getState();
    expect(proposed?.lights.length).toBe(Number(/\d+/.exec(place.textContent ?? '')?.[0]));
    expect(page.fixtures()).toHaveLength(0);

    fireEvent.click(place);
    expect(page.labels).toEqual([`Place ${proposed!.lights.length} lights`]);
    expect(page.fixtures().map(({ at }) => at)).toEqual(proposed!.lights.map(({ at }) => at));
    const session = page.editor.session.getState();
    expect([...session.selection].sort()).toEqual(
      page
        .fixtures()
        .map(({ id }) => id)
        .sort(),
    );
    expect(session.message).toMatch(/lights placed and chosen/);
    expect(session.proposed).toBeNull();
    expect(session.panel).toBe('none');
    page.editor.undo();
    expect(page.fixtures()).toHaveLength(0);
  });

  it('takes another number, spacing and item, and goes back to what was proposed', async () => {
    const page = open(bare(), path());
    press('Light this path…');
    const first = (await screen.findByRole('button', { name: /^Place/ })).textContent;
    type('How many', '3');
    await screen.findByRole('button', { name: 'Place 3 lights' });
    expect(inPanel('Apart').value).toBe('4.00 m');
    expect(page.editor.session.getState().proposed?.lights).toHaveLength(3);
    type('Apart', '1.5 m');
    await screen.findByRole('button', { name: 'Place 8 lights' });
    type('How many', 'many');
    expect(screen.getByRole('alert').textContent).toBe('A whole number from 1 to 200.');
    press('As proposed');
    await waitFor(() => expect(screen.getByRole('button', { name: /^Place/ }).textContent).toBe(first));
    fireEvent.change(inPanel('Item'), { target: { value: 'path-faint ' } });
    expect(await screen.findByText(/^Path light, 1 W: /)).toBeTruthy();
    expect(page.labels).toEqual([]);
  });

  it('shows nothing on the drawing any more once it is closed', async () => {
    const page = open(bare(), path());
    press('Light this path…');
    await screen.findByRole('button', { name: /^Place/ });
    press('Close: Light this path');
    expect(page.editor.session.getState().proposed).toBeNull();
  });
});

describe('what stands in the way', () => {
  it('says that the scale is missing, and leads to it', () => {
    const doc = new Driver([{ ...sheet, references: [] }]).doc;
    const page = open(doc, path(doc));
    press('Light this path…');
    expect(screen.getByText(/waits for this sheet’s scale/)).toBeTruthy();
    press('Set the scale');
    expect(page.editor.session.getState().panel).toBe('scale');
  });

  it('says what the catalogue lacks', async () => {
    open(bare(), path(), { entries: [] });
    press('Light this path…');
    expect(await screen.findByText(/The catalogue has no path light or bollard/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: /^Place/ })).toBeNull();
  });

  it('says when working it out failed, and tries again', async () => {
    let fails = true;
    const proposer = (): Proposer => ({
      propose: (ask) => (fails ? Promise.reject(new Error('no memory')) : proposerHere().propose(ask)),
      close: () => {},
    });
    open(bare(), path(), { proposer });
    press('Light this path…');
    expect(await screen.findByText(/could not be worked out: no memory/)).toBeTruthy();
    fails = false;
    press('Try again');
    expect(await screen.findByRole('button', { name: /^Place/ })).toBeTruthy();
  });

  it('is not offered to those who only look', () => {
    open(bare(), path(), { canEdit: false });
    expect(screen.queryByRole('button', { name: /^Light this/ })).toBeNull();
  });

  it('says that what was to be lit is gone', async () => {
    const page = open(bare(), path());
    press('Light this path…');
    await screen.findByRole('button', { name: /^Place/ });
    page.editor.deleteSelection();
    expect(await screen.findByText('What was to be lit is not on the plan any more.')).toBeTruthy();
    expect(page.editor.session.getState().proposed).toBeNull();
  });
});

describe('lighting a tree', () => {
  it('places lights that are aimed at it', async () => {
    const tree = placeTree(bare(), {
      sheetId: 'sheet',
      foot: { x: 850, y: 850 },
      outline: [
        { x: 700, y: 700 },
        { x: 1000, y: 700 },
        { x: 850, y: 1000 },
      ],
      heightMeters: 6,
      crownBaseMeters: 2,
    });
    const page = open(bare(), tree);
    press('Light this tree…');
    type('How many', '2');
    fireEvent.click(await screen.findByRole('button', { name: 'Place 2 lights' }));
    expect(page.fixtures().map(({ aim, lampId }) => [aim?.kind, lampId !== null])).toEqual([
      ['point', true],
      ['point', true],
    ]);
  });
});

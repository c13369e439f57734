// @vitest-environment jsdom
import {
  apply,
  type Change,
  type EditResult,
  type PlanDocument,
  placeFace,
  placeTree,
  recordsOf,
} from '@lampwright/geometry/plan';
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { createStore } from 'zustand/vanilla';
import { EditorContext } from '../page/context';
import { PlanEditor } from '../page/editor';
import type { PlanPortState } from '../page/plan-port';
import { type Driver, yardWith } from '../tools/driver.testkit';
import { Inspector } from './Inspector';

afterEach(cleanup);

/** The plan of a driven yard, open on the plan page. */
function open(d: Driver, choose: (doc: PlanDocument) => Iterable<string>) {
  const labels: string[] = [];
  const state = createStore<PlanPortState>(() => ({
    doc: d.doc,
    undoLabel: null,
    redoLabel: null,
    save: { kind: 'saved', at: null },
    conflicts: [],
    choices: new Map(),
  }));
  const port = {
    state,
    commit: (change: Change, label: string) => {
      labels.push(label);
      state.setState({ doc: apply(state.getState().doc, change) });
    },
    undo: () => null,
    redo: () => null,
    resolve: () => {},
    close: () => {},
  };
  const editor = new PlanEditor(port, true, 'sheet', {
    ask: () => new Promise(() => {}),
    sentence: String,
  });
  editor.select(choose(d.doc));
  render(
    <EditorContext value={{ editor, units: 'metric' }}>
      <Inspector entries={[]} />
    </EditorContext>,
  );
  return { labels, doc: () => state.getState().doc };
}

const ids = (doc: PlanDocument, kind: Parameters<typeof recordsOf>[1]) =>
  [...recordsOf(doc, kind)].map((r) => r.id);

function put(d: Driver, result: EditResult): void {
  if (result.kind !== 'change') throw new Error('it was refused');
  d.doc = apply(d.doc, result.change);
}

const foot = [
  { x: 100, y: 600 },
  { x: 500, y: 600 },
];
const outline = [
  { x: 700, y: 700 },
  { x: 900, y: 700 },
  { x: 800, y: 900 },
];

/** Types into a field and leaves it. */
function type(label: string | RegExp, text: string): void {
  const field = screen.getByLabelText(label);
  fireEvent.change(field, { target: { value: text } });
  fireEvent.blur(field);
}

describe('aiming in the inspector', () => {
  it('says where a light points and takes direction, distance and height, each as one change', () => {
    const page = open(yardWith(1), (doc) => ids(doc, 'fixture'));
    expect(screen.getByText('Straight down.')).toBeTruthy();
    fireEvent.change(screen.getByLabelText('Points'), { target: { value: 'point' } });
    type('Direction', '90');
    type('Distance', '2 m');
    type('Height', '1.5 m');
    expect(page.labels).toEqual(['Aim', 'Aim', 'Aim', 'Aim']);
    const [fixture] = [...recordsOf(page.doc(), 'fixture')];
    // 100 pixels a metre: 2 m to the right of 300, 100.
    expect(fixture!.aim).toEqual({
      kind: 'point',
      at: { x: expect.closeTo(500, 6), y: expect.closeTo(100, 6) },
      heightMeters: 1.5,
    });
    expect(screen.getByText('At a place 2.00 m away, 1.50 m high.')).toBeTruthy();
  });

  it('changes all that are chosen, and says where they differ', () => {
    const page = open(yardWith(2), (doc) => ids(doc, 'fixture'));
    fireEvent.change(screen.getByLabelText('Points'), { target: { value: 'tilt' } });
    type('Tilt', '30');
    type('Direction', '180');
    expect([...recordsOf(page.doc(), 'fixture')].map((f) => f.aim)).toEqual([
      { kind: 'tilt', toward: { x: expect.closeTo(300, 6), y: expect.closeTo(200, 6) }, degreesFromDown: 30 },
      { kind: 'tilt', toward: { x: expect.closeTo(500, 6), y: expect.closeTo(200, 6) }, degreesFromDown: 30 },
    ]);
    type('Tilt', '300');
    expect(screen.getByRole('alert').textContent).toBe('Degrees from 0 to 180.');
  });

  it('shows the usual mounting height and takes another', () => {
    const page = open(yardWith(1), (doc) => ids(doc, 'fixture'));
    expect(screen.getByLabelText<HTMLInputElement>('Stands').placeholder).toBe('0.50 m, as usual');
    type('Stands', '0.8 m');
    expect([...recordsOf(page.doc(), 'fixture')][0]!.mountingHeightMeters).toBe(0.8);
    expect(screen.getByText(/Not wired yet: the wiring will say/)).toBeTruthy();
  });
});

describe('walls and trees in the inspector', () => {
  it('take name, height and points without a pointer', () => {
    const d = yardWith(0);
    put(d, placeFace(d.doc, { sheetId: 'sheet', foot, top: null, heightMeters: 3 }));
    const page = open(d, (doc) => ids(doc, 'face'));
    type('Name', 'House');
    type('Height', '2.8 m');
    type('Foot 2, to the right', '640');
    fireEvent.click(screen.getByLabelText('Add a point after foot 1'));
    expect([...recordsOf(page.doc(), 'face')][0]).toMatchObject({
      name: 'House',
      heightMeters: 2.8,
      foot: [foot[0], { x: 370, y: 600 }, { x: 640, y: 600 }],
    });
    type('Height', '0 m');
    expect(screen.getByRole('alert').textContent).toMatch(/stops no light/);
  });

  it('keep a crown below its top', () => {
    const d = yardWith(0);
    put(
      d,
      placeTree(d.doc, {
        sheetId: 'sheet',
        foot: { x: 800, y: 800 },
        outline,
        heightMeters: 6,
        crownBaseMeters: 2,
      }),
    );
    const page = open(d, (doc) => ids(doc, 'tree'));
    type('Crown from', '7 m');
    expect(screen.getByRole('alert').textContent).toBe('Below the top, 6.00 m.');
    type('Crown from', '0 m');
    expect([...recordsOf(page.doc(), 'tree')][0]).toMatchObject({ crownBaseMeters: 0, heightMeters: 6 });
    // The least number of corners can't be gone below.
    expect(screen.getByLabelText<HTMLButtonElement>('Take out crown 1').disabled).toBe(true);
  });
});

describe('switching in the inspector', () => {
  it('gives a run a switch of its own, and says what that makes apart', () => {
    const d = yardWith(2);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    const page = open(d, (doc) => ids(doc, 'run'));
    fireEvent.click(screen.getByLabelText('Its own'));
    expect([...recordsOf(page.doc(), 'run')][0]!.schedule).not.toBeNull();
    fireEvent.click(screen.getByLabelText('With T1'));
    expect([...recordsOf(page.doc(), 'run')][0]!.schedule).toBeNull();
  });

  it('makes zones of smart lights from the plan’s times', () => {
    const page = open(yardWith(1), () => ['settings']);
    fireEvent.click(screen.getByRole('button', { name: 'Add a zone of smart lights' }));
    expect(page.labels).toEqual(['Make zone']);
    expect([...recordsOf(page.doc(), 'zone')]).toMatchObject([{ name: 'Zone 1' }]);
    expect(screen.getByText(/No light is in it yet/)).toBeTruthy();
  });
});

describe('light wanted', () => {
  it('offers the usual targets with their source, and own figures', () => {
    const d = yardWith(0);
    d.use('measure').click(800, 800).click(900, 800).key('Enter');
    const page = open(d, (doc) => ids(doc, 'measurement'));
    fireEvent.change(screen.getByLabelText('Target'), { target: { value: '0' } });
    const target = () => [...recordsOf(page.doc(), 'measurement')][0]!.lightTarget;
    expect(target()).toEqual({ leastLux: 1, meanLux: null, uniformity: null });
    expect(screen.getByText(/Guidance, not a rule/)).toBeTruthy();
    type('Mean', '3');
    type('Evenness', '0.25');
    expect(target()).toEqual({ leastLux: 1, meanLux: 3, uniformity: 0.25 });
    fireEvent.change(screen.getByLabelText('Target'), { target: { value: '' } });
    expect(target()).toBeNull();
  });
});

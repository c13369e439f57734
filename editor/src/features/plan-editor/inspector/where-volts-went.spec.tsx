// @vitest-environment jsdom
import type { EstimateAnswer, EstimateRequest } from '@lampwright/geometry/estimate';
import { type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
import { act, cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import { afterEach, expect, it } from 'vitest';
import { createStore } from 'zustand/vanilla';
import { EditorContext } from '../page/context';
import { PlanEditor } from '../page/editor';
import type { PlanPortState } from '../page/plan-port';
import { yardWith } from '../tools/driver.testkit';
import { Inspector } from './Inspector';

afterEach(cleanup);

/** One amp from each lamp; each cable loses half a volt for every amp in it, each lead a tenth. */
function answerTo({ runs }: EstimateRequest): EstimateAnswer {
  const [run] = runs;
  const cables = run!.cables.map(({ id }, i) => {
    const amps = run!.cables.length - i;
    return { id, amps, dropVolts: amps / 2, fromVolts: 0, toVolts: 0, lossWatts: 0, ampacityPercent: null };
  });
  let volts = 11.8;
  for (const cable of cables) {
    cable.fromVolts = volts;
    volts -= cable.dropVolts;
    cable.toVolts = volts;
  }
  return {
    fixtures: run!.fixtures.map(({ id }, i) => ({
      id,
      volts: cables[i]!.toVolts - 0.1,
      amps: 1,
      voltAmps: 10,
      dropPercent: 0,
      state: 'in-window' as const,
      aim: null,
    })),
    cables,
    runs: [
      {
        id: run!.id,
        terminalVolts: 11.8,
        amps: 2,
        voltAmps: 20,
        lowestVolts: 10,
        highestVolts: 11,
        lengthMeters: 4,
      },
    ],
    commons: [],
    taps: [],
    transformers: [],
    warnings: [],
  };
}

it('tells each length on the way, adds up to the volts at the lamp, and lights it on the plan', async () => {
  const d = yardWith(2).use('cable').click(100, 100).click(300, 100).click(500, 100);
  d.key('Enter');
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
    commit: () => {},
    undo: () => null,
    redo: () => null,
    resolve: () => {},
    close: () => {},
  };
  const editor = new PlanEditor(port, true, 'sheet', {
    ask: (request) => Promise.resolve(answerTo(request)),
    sentence: String,
  });
  const last = lastFixture(d.doc);
  editor.select([last.id]);
  await act(() => editor.estimate.settled());
  render(
    <EditorContext value={{ editor, units: 'metric' }}>
      <Inspector entries={[]} />
    </EditorContext>,
  );
  fireEvent.click(screen.getByText('Where its volts went'));
  const rows = within(screen.getByRole('table')).getAllByRole('row');
  const figures = rows.slice(1).map((row) => row.lastElementChild!.textContent);
  const [open, ...rest] = figures.map((text) => Number(text!.replace('−', '-').replace(' V', '')));
  const atLamp = rest.pop()!;
  // Sag, two lengths and the lead, as they are shown.
  expect(rest).toHaveLength(4);
  expect(rest.slice(1)).toEqual([-1, -0.5, -0.1]);
  expect(open! + rest.reduce((sum, lost) => sum + lost, 0)).toBeCloseTo(atLamp, 9);
  expect(atLamp).toBeCloseTo(10.2, 9);

  const first = within(rows[3]!).getByRole('button');
  fireEvent.focus(first);
  const [cable] = [...recordsOf(d.doc, 'cable')];
  expect(editor.session.getState().hoveredId).toBe(cable!.id);
  fireEvent.click(screen.getByRole('button', { name: 'Choose all cable on the way' }));
  expect(editor.session.getState().selection).toEqual(
    new Set([...recordsOf(d.doc, 'cable')].map(({ id }) => id)),
  );
});

function lastFixture(doc: PlanDocument) {
  return [...recordsOf(doc, 'fixture')].at(-1)!;
}

import { describe, expect, it } from 'vitest';
import {
  type AreaRecord,
  apply,
  type CableRecord,
  drawCable,
  type EditResult,
  moveRecords,
  type PlanDocument,
  placeArea,
  placeFeed,
  placeFixture,
  placeTransformer,
  putRecords,
  recordOf,
  setFields,
  setItem,
} from '../../plan/index.js';
import {
  cable12,
  choice,
  countedIds,
  halogenLamp,
  must,
  pathLight,
  sheet,
  startPlan,
  transformer300,
  upLight,
} from '../../plan/plan.testkit.js';
import { type EstimateAnswer, parseEstimateRequest } from '../contract/index.js';
import {
  cableLengths,
  conduitLengths,
  countBySeverity,
  estimateRequestOf,
  planFaults,
  voltsInWords,
} from './index.js';

/** A transformer at 0, 0, and two fixtures at 4 m and 7 m, chained, on a sheet of 100 px to the metre. */
function chain() {
  const ids = countedIds();
  let doc: PlanDocument = startPlan();
  const make = (result: EditResult): string[] => {
    doc = apply(doc, must(result));
    return result.kind === 'change' ? result.selected : [];
  };
  const sheetId = 'sheet1';
  const [t = ''] = make(
    placeTransformer(doc, { sheetId, at: { x: 0, y: 0 }, transformer: choice(transformer300) }, ids),
  );
  const [f1 = ''] = make(
    placeFixture(
      doc,
      { sheetId, at: { x: 400, y: 0 }, fixture: choice(pathLight), lamp: null, quantity: 2 },
      ids,
    ),
  );
  const [f2 = ''] = make(
    placeFixture(
      doc,
      { sheetId, at: { x: 700, y: 0 }, fixture: choice(upLight), lamp: choice(halogenLamp) },
      ids,
    ),
  );
  const stops = [t, f1, f2].map((id) => ({ on: 'record' as const, id }));
  const [k1 = '', k2 = ''] = make(drawCable(doc, { sheetId, stops, cable: choice(cable12) }, ids));
  const runId = recordOf(doc, k1, 'cable')?.runId ?? '';
  return { doc: () => doc, make, ids, t, f1, f2, k1, k2, runId };
}

const noAnswer: EstimateAnswer = {
  fixtures: [],
  cables: [],
  runs: [],
  commons: [],
  taps: [],
  transformers: [],
  warnings: [],
};

describe('cable lengths', () => {
  it('are drawn or measured, plus slack at both ends, plus rise', () => {
    const { doc, make, ids, k1, k2 } = chain();
    // US settings: 3 ft at the transformer, 2 ft at a fixture.
    expect(cableLengths(doc()).get(k1)?.totalMeters).toBeCloseTo(4 + 0.9144 + 0.6096, 9);
    make(setFields(doc(), [k1], 'cable', { measuredMeters: 5, riseMeters: 1.5, slackFromMeters: 0.2 }, ids));
    const length = cableLengths(doc()).get(k1);
    expect(length?.plan?.meters).toBeCloseTo(4, 9);
    expect(length?.totalMeters).toBeCloseTo(5 + 0.2 + 0.6096 + 1.5, 9);
    expect(cableLengths(doc()).get(k2)?.totalMeters).toBeCloseTo(3 + 2 * 0.6096, 9);
  });

  it('are computed again only where something moved', () => {
    const { doc, make, ids, f2, k1, k2 } = chain();
    const before = cableLengths(doc());
    make(moveRecords(doc(), [f2], 100, 0, ids));
    const after = cableLengths(doc());
    expect(after.get(k1)).toBe(before.get(k1));
    expect(after.get(k2)).not.toBe(before.get(k2));
    expect(after.get(k2)?.plan?.meters).toBeCloseTo(4, 9);
  });

  it('wait without a scale, unless measured, and follow recalibration', () => {
    const { doc, make, ids, k1, k2 } = chain();
    make(putRecords(doc(), [{ ...sheet(), references: [] }], ids));
    expect(cableLengths(doc()).get(k1)).toMatchObject({ totalMeters: null, waitsFor: 'scale' });
    make(setFields(doc(), [k2], 'cable', { measuredMeters: 3 }, ids));
    expect(cableLengths(doc()).get(k2)?.totalMeters).toBeCloseTo(3 + 2 * 0.6096, 9);
    make(
      putRecords(
        doc(),
        [{ ...sheet(), references: [], pixelsPerPaperMeter: 10_000, groundMetersPerPaperMeter: 200 }],
        ids,
      ),
    );
    expect(cableLengths(doc()).get(k1)?.plan?.meters).toBeCloseTo(8, 9);
  });
});

describe('conduit', () => {
  it('is the cable under paving, overlapping paving once', () => {
    const { doc, make, ids, k1, k2 } = chain();
    const pave = (x0: number, x1: number) =>
      make(
        placeArea(
          doc(),
          {
            sheetId: 'sheet1',
            use: 'paved',
            points: [
              { x: x0, y: -20 },
              { x: x1, y: -20 },
              { x: x1, y: 20 },
              { x: x0, y: 20 },
            ],
          },
          ids,
        ),
      );
    expect(conduitLengths(doc()).size).toBe(0);
    pave(100, 200);
    pave(150, 250);
    pave(300, 500);
    pave(2000, 2100);
    const lengths = conduitLengths(doc());
    expect(lengths.get(k1)).toBeCloseTo(1.5 + 1, 9);
    expect(lengths.get(k2)).toBeCloseTo(1, 9);
    make(putRecords(doc(), [{ ...sheet(), references: [] }], ids));
    expect(conduitLengths(doc()).size).toBe(0);
  });
});

describe('the estimate request', () => {
  it('is accepted by the contract and names the plan’s own records', () => {
    const { doc, t, f1, f2, k1, k2, runId } = chain();
    const { request, unwired, waiting, faults } = estimateRequestOf(doc());
    expect(parseEstimateRequest(request)).toMatchObject({ ok: true });
    expect(request?.runs).toMatchObject([
      {
        id: runId,
        transformerId: t,
        tapId: '12V',
        commonId: 'C1',
        source: t,
        cables: [
          { id: k1, from: t, to: f1, conductor: { awg: 12 }, ampacityAmps: 20 },
          { id: k2, from: f1, to: f2 },
        ],
        fixtures: [
          {
            id: f1,
            at: f1,
            quantity: 2,
            load: pathLight.light === 'integrated' && pathLight.load,
            lead: pathLight.lead,
          },
          { id: f2, at: f2, load: halogenLamp.load, window: halogenLamp.window, target: halogenLamp.target },
        ],
      },
    ]);
    expect(request?.transformers).toMatchObject([
      { id: t, ratedVA: 300, lineVolts: 120, regulationPercent: 3 },
    ]);
    expect({ unwired, waiting, faults }).toEqual({ unwired: [], waiting: [], faults: [] });
  });

  it('leaves out what waits for a length and what is beyond it', () => {
    const { doc, make, ids, f1, f2, k1, k2 } = chain();
    make(putRecords(doc(), [{ ...sheet(), references: [] }], ids));
    expect(estimateRequestOf(doc())).toMatchObject({
      request: null,
      waiting: [k1, k2],
      waitingFixtures: [f1, f2],
    });
    make(setFields(doc(), [k2], 'cable', { measuredMeters: 3 }, ids));
    expect(estimateRequestOf(doc())).toMatchObject({ request: null, waiting: [k1, k2] });
    make(setFields(doc(), [k2], 'cable', { measuredMeters: null }, ids));
    make(setFields(doc(), [k1], 'cable', { measuredMeters: 4 }, ids));
    const { request, waiting, waitingFixtures, faults } = estimateRequestOf(doc());
    expect(request?.runs[0]?.cables.map((c) => c.id)).toEqual([k1]);
    expect(request?.runs[0]?.fixtures.map((f) => f.id)).toEqual([f1]);
    expect({ waiting, waitingFixtures }).toEqual({ waiting: [k2], waitingFixtures: [f2] });
    expect(faults.map((f) => f.message)).toEqual([
      'Part of run 1 has no length yet and is left out of the volts: set the scale of the sheet, or type measured lengths.',
    ]);
  });

  it('sums feeds of one transformer on several sheets', () => {
    const { doc, make, ids, t } = chain();
    make(putRecords(doc(), [sheet('sheet2', 1)], ids));
    const place = { sheetId: 'sheet2', at: { x: 0, y: 0 } };
    const [feed = ''] = make(placeFeed(doc(), { ...place, transformerId: t }, ids));
    const [f3 = ''] = make(
      placeFixture(
        doc(),
        { sheetId: 'sheet2', at: { x: 500, y: 0 }, fixture: choice(pathLight), lamp: null },
        ids,
      ),
    );
    const stops = [feed, f3].map((id) => ({ on: 'record' as const, id }));
    make(drawCable(doc(), { sheetId: 'sheet2', stops, cable: choice(cable12) }, ids));
    const { request } = estimateRequestOf(doc());
    expect(request?.transformers).toHaveLength(1);
    expect(request?.runs.map((run) => run.source)).toEqual([t, t]);
    expect(request?.runs[1]?.cables[0]).toMatchObject({ from: t, to: f3 });
    expect(parseEstimateRequest(request).ok).toBe(true);
  });

  it('says which fixtures are not wired and which have no lamp', () => {
    const { doc, make, ids } = chain();
    const at = { x: 1000, y: 1000 };
    const [f3 = ''] = make(
      placeFixture(doc(), { sheetId: 'sheet1', at, fixture: choice(upLight), lamp: null }, ids),
    );
    expect(estimateRequestOf(doc()).unwired).toEqual([f3]);
    expect(planFaults(doc(), null).map((f) => [f.code, f.recordId])).toEqual([
      ['no-light', f3],
      ['not-wired', f3],
    ]);
  });
});

describe('faults of the plan', () => {
  it('tell volts with the digits that the limit needs', () => {
    expect(voltsInWords(9.44, 10)).toBe('9.4 V');
    expect(voltsInWords(9.96, 10)).toBe('9.96 V');
    expect(voltsInWords(12.62, 12.6)).toBe('12.62 V');
    const { doc, f1, f2 } = chain();
    const answer = (id: string, volts: number, state: 'dim' | 'in-window', aim: 'below' | 'inside') => ({
      id,
      volts,
      amps: 1,
      voltAmps: 12,
      dropPercent: 1,
      state,
      aim,
    });
    const faults = planFaults(doc(), {
      ...noAnswer,
      fixtures: [answer(f1, 10.2, 'in-window', 'below'), answer(f2, 9.96, 'dim', 'below')],
    });
    expect(faults.map((f) => [f.severity, f.message])).toEqual([
      ['fault', 'Fixture 2 gets 9.96 V; it needs 10 V.'],
      ['advice', 'Fixture 1 gets 10.2 V, below the 10.5 V aimed at.'],
    ]);
    expect(countBySeverity(faults)).toEqual({ fault: 1, caution: 0, advice: 1 });
  });

  it('tell cable through buildings and water, and fixtures near water with the distance', () => {
    const { doc, make, ids, f2, k2 } = chain();
    const box = (x0: number, x1: number, y0: number, y1: number) => [
      { x: x0, y: y0 },
      { x: x1, y: y0 },
      { x: x1, y: y1 },
      { x: x0, y: y1 },
    ];
    const area = (use: AreaRecord['use'], points: AreaRecord['points']) =>
      make(placeArea(doc(), { sheetId: 'sheet1', use, points }, ids));
    area('building', box(500, 600, -50, 50));
    area('water', box(850, 1200, -50, 50));
    area('paved', box(100, 200, -50, 50));
    const codes = planFaults(doc(), null, { system: 'metric' }).map((f) => [f.code, f.recordId, f.message]);
    expect(codes).toEqual([
      ['cable-through-building', k2, 'A cable runs through a building; lead it around.'],
      [
        'near-water',
        f2,
        'Fixture 2 is 1.50 m from water; keep 3.05 m unless it is listed for less and the code allows it.',
      ],
    ]);
    make(moveRecords(doc(), [f2], 200, 0, ids));
    expect(planFaults(doc(), null).map((f) => f.code)).toContain('fixture-in-water');
    expect(planFaults(doc(), null).map((f) => f.code)).toContain('cable-through-water');
  });

  it('do not mind cable that goes to what hangs on a wall, or to a light in its water', () => {
    const { doc, make, ids, t, f2, k2 } = chain();
    const box = (x0: number, x1: number) => [
      { x: x0, y: -50 },
      { x: x1, y: -50 },
      { x: x1, y: 50 },
      { x: x0, y: 50 },
    ];
    make(setFields(doc(), ['settings'], 'settings', { waterClearanceMeters: 1 }, ids));
    make(placeArea(doc(), { sheetId: 'sheet1', use: 'building', points: box(-600, 80) }, ids));
    make(placeArea(doc(), { sheetId: 'sheet1', use: 'water', points: box(650, 900) }, ids));
    expect(planFaults(doc(), null).map((f) => [f.code, f.recordId])).toEqual([
      ['cable-through-water', k2],
      ['fixture-in-water', f2],
    ]);
    const wet = { ...upLight, kind: 'underwater' as const, wetListed: true };
    make(setItem(doc(), [f2], 'itemId', choice(wet), ids));
    expect(planFaults(doc(), null)).toEqual([]);
    make(moveRecords(doc(), [t], -200, 0, ids));
    expect(planFaults(doc(), null).map((f) => f.code)).toEqual(['cable-through-building']);
  });

  it('put every warning of the estimate in words', () => {
    const { doc, t, f1, k1, runId } = chain();
    const common = { kind: 'common', id: 'C1', transformerId: t } as const;
    const warnings: EstimateAnswer['warnings'] = [
      { code: 'common-over-limit', subject: common, message: '' },
      { code: 'tap-over-limit', subject: { kind: 'tap', id: '12V', transformerId: t }, message: '' },
      { code: 'winding-over-rating', subject: { kind: 'winding', id: 'w1', transformerId: t }, message: '' },
      { code: 'transformer-over-rating', subject: { kind: 'transformer', id: t }, message: '' },
      { code: 'transformer-over-target', subject: { kind: 'transformer', id: t }, message: '' },
      { code: 'cable-over-ampacity', subject: { kind: 'cable', id: k1 }, message: '' },
      { code: 'weak-short', subject: { kind: 'run', id: runId }, message: '' },
      { code: 'unreached', subject: { kind: 'fixture', id: f1 }, message: '' },
      { code: 'unreached', subject: { kind: 'fixture', id: 'gone' }, message: '' },
    ];
    const faults = planFaults(doc(), {
      ...noAnswer,
      commons: [{ transformerId: t, id: 'C1', amps: 27.5, loadPercent: 110 }],
      taps: [{ transformerId: t, id: '12V', amps: 27.5 }],
      transformers: [{ id: t, voltAmps: 330, loadPercent: 110, lossWatts: 1 }],
      cables: [
        { id: k1, amps: -22, fromVolts: 12, toVolts: 11, dropVolts: 1, lossWatts: 22, ampacityPercent: 110 },
      ],
      warnings,
    });
    expect(faults.map((f) => `${f.severity} ${f.recordId === t ? 'T' : ''} ${f.message}`)).toEqual([
      'fault T Common C1 of T1 carries too much (27.5 A, 110 % of its limit); move a run off it.',
      'fault T Tap 12V of T1 carries more than its limit (27.5 A); move a run off it.',
      'fault T Winding w1 of T1 is loaded beyond its rating by run 1.',
      'fault T T1 is loaded to 110 % (330 VA), beyond its rating.',
      'fault  A cable carries 22.0 A, 110 % of what it may; use a heavier one.',
      'fault  No cable brings current to fixture 1.',
      'caution T T1 is loaded to 110 % (330 VA); keep to 80 % and leave room for additions.',
      'caution  A dead short at the far end of run 1 may draw too little to trip the breaker; use heavier cable or a shorter run.',
    ]);
  });

  it('tell runs that two people joined, and loops that nobody confirmed', () => {
    const { doc, make, ids, t, f2, k2 } = chain();
    const at = { x: 400, y: 400 };
    const [f3 = ''] = make(
      placeFixture(doc(), { sheetId: 'sheet1', at, fixture: choice(pathLight), lamp: null }, ids),
    );
    const stops = [t, f3].map((id) => ({ on: 'record' as const, id }));
    const [k3 = ''] = make(drawCable(doc(), { sheetId: 'sheet1', stops, cable: choice(cable12) }, ids));
    const cable = recordOf(doc(), k2, 'cable') as CableRecord;
    // As it would come from somebody who joined them at the same time: no edit makes this.
    const join: CableRecord = { ...cable, id: 'join', fromId: f2, toId: f3 };
    const joined = new Map(doc()).set(join.id, join);
    const run3 = recordOf(joined, recordOf(joined, k3, 'cable')?.runId ?? '', 'run');
    expect(planFaults(joined, null)).toMatchObject([{ code: 'joined-runs', severity: 'caution' }]);
    if (run3) joined.set(run3.id, { ...run3, tapId: '13V' });
    expect(planFaults(joined, null)).toMatchObject([{ code: 'joined-runs', severity: 'fault' }]);

    const loop = new Map(doc()).set('loop', { ...cable, id: 'loop', fromId: t, toId: f2 });
    expect(planFaults(loop, null)).toMatchObject([{ code: 'loop-not-confirmed', recordId: cable.runId }]);
    loop.set('loop', { ...cable, id: 'loop', fromId: t, toId: f2, markedToMarked: true });
    expect(planFaults(loop, null)).toEqual([]);
  });

  it('tell numbers used twice and terminals with too many conductors', () => {
    const { doc, make, ids, t, f1, f2, runId } = chain();
    make(setFields(doc(), [f2], 'fixture', { number: 1 }, ids));
    expect(planFaults(doc(), null)).toMatchObject([{ code: 'number-used-twice', recordId: f2, otherId: f1 }]);
    for (const n of [1, 2, 3]) {
      const at = { x: 10 * n, y: 500 };
      const [f = ''] = make(
        placeFixture(doc(), { sheetId: 'sheet1', at, fixture: choice(pathLight), lamp: null }, ids),
      );
      const stops = [t, f].map((id) => ({ on: 'record' as const, id }));
      make(drawCable(doc(), { sheetId: 'sheet1', stops, cable: choice(cable12), runId }, ids));
    }
    const crowded = planFaults(doc(), null).filter((f) => f.code === 'terminal-crowded');
    expect(crowded.map((f) => f.message)).toEqual([
      'Common C1 of T1 holds 3 conductors; 4 are landed on it. Splice them outside, or use another.',
      'Tap 12V of T1 holds 3 conductors; 4 are landed on it. Splice them outside, or use another.',
    ]);
  });
});

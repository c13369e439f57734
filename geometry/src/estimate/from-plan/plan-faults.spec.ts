import { describe, expect, it } from 'vitest';
import {
  type AreaRecord,
  type CableRecord,
  drawCable,
  moveRecords,
  placeArea,
  placeFixture,
  recordOf,
  setFields,
  setItem,
} from '../../plan/index.js';
import { cable12, choice, pathLight, upLight } from '../../plan/plan.testkit.js';
import type { EstimateAnswer } from '../contract/index.js';
import { chain } from './from-plan.testkit.js';
import { countBySeverity, planFaults, voltsInWords } from './index.js';

const noAnswer: EstimateAnswer = {
  fixtures: [],
  cables: [],
  runs: [],
  commons: [],
  taps: [],
  transformers: [],
  warnings: [],
};

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
      ['fault', 'U1 gets 9.96 V; it needs 10 V.'],
      ['advice', 'P1 gets 10.2 V, below the 10.5 V aimed at.'],
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
        'U1 is 1.50 m from water; keep 3.05 m unless it is listed for less and the code allows it.',
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
      'fault  No cable brings current to P1.',
      'caution T T1 is loaded to 110 % (330 VA); keep to 80 % and leave room for additions.',
      'caution  A dead short at the far end of run 1 may draw too little to trip the breaker; use heavier cable or a shorter run.',
    ]);
    // Terminals and windings of one transformer are told apart.
    expect(faults.flatMap((f) => f.part ?? [])).toEqual(['C1', '12V', 'w1']);
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
    const { doc, make, ids, t, f1, runId } = chain();
    const twice = () => planFaults(doc(), null).filter((f) => f.code === 'number-used-twice');
    // P1 and U1 are two numbers; a second P1 is not.
    expect(twice()).toEqual([]);
    const placing = { sheetId: 'sheet1', at: { x: 5, y: 490 }, fixture: choice(pathLight), lamp: null };
    const [second = ''] = make(placeFixture(doc(), placing, ids));
    make(setFields(doc(), [second], 'fixture', { number: 1 }, ids));
    expect(twice()).toMatchObject([{ recordId: second, otherId: f1 }]);
    expect(twice()[0]?.message).toContain('Number P1');
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

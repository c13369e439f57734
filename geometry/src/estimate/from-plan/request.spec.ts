import { describe, expect, it } from 'vitest';
import {
  drawCable,
  moveRecords,
  placeArea,
  placeFeed,
  placeFixture,
  putRecords,
  setFields,
} from '../../plan/index.js';
import { cable12, choice, halogenLamp, pathLight, sheet, upLight } from '../../plan/plan.testkit.js';
import { parseEstimateRequest } from '../contract/index.js';
import { chain } from './from-plan.testkit.js';
import { cableLengths, conduitLengths, estimateRequestOf, planFaults } from './index.js';

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

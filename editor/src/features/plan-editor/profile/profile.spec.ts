import { cableLengths, type EstimateAnswer, type FixtureAnswer } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { indexAnswer } from '../../../plan-view/answers';
import { type Driver, yardWith } from '../tools/driver.testkit';
import { axisOver, profileOf, voltsRange } from './profile';

/** An answer that drops a tenth of a volt at each cable, as drawn. */
function answerFor(d: Driver): EstimateAnswer {
  const volts = new Map<string, number>([[d.all('transformer')[0]!.id, 12]]);
  const cables = d.all('cable').map((c) => {
    const from = volts.get(c.fromId) ?? 12;
    volts.set(c.toId, from - 0.1);
    return {
      id: c.id,
      amps: 1,
      fromVolts: from,
      toVolts: from - 0.1,
      dropVolts: 0.1,
      lossWatts: 0.1,
      ampacityPercent: 5,
    };
  });
  const fixtures = d.all('fixture').map(
    (f): FixtureAnswer => ({
      id: f.id,
      volts: volts.get(f.id) ?? 0,
      amps: 0.3,
      voltAmps: 3,
      dropPercent: 1,
      state: 'in-window',
      aim: 'inside',
    }),
  );
  const runs = d.all('run').map((r) => ({
    id: r.id,
    terminalVolts: 12,
    amps: 1,
    voltAmps: 12,
    lowestVolts: 11,
    highestVolts: 12,
    lengthMeters: 1,
  }));
  return { fixtures, cables, runs, commons: [], taps: [], transformers: [], warnings: [] };
}

function teed(): Driver {
  const d = yardWith(3);
  d.use('cable').click(100, 100).click(300, 100).click(500, 100).key('Enter');
  d.click(300, 100).click(700, 100).key('Enter');
  return d;
}

describe('the profile of a run', () => {
  it('has each fixture at its cable distance, with slack, nearest first', () => {
    const d = teed();
    const lengths = cableLengths(d.doc);
    const profile = profileOf(d.doc, d.all('run')[0]!.id, indexAnswer(answerFor(d)), lengths)!;
    const [first, second, third] = d.all('cable').map((c) => lengths.get(c.id)!.totalMeters!);
    expect(profile.points.map((p) => p.tag)).toEqual(['P1', 'P2', 'P3']);
    expect(profile.points[0]!.meters).toBeCloseTo(first!, 9);
    expect(profile.points[1]!.meters).toBeCloseTo(first! + second!, 9);
    expect(profile.points[2]!.meters).toBeCloseTo(first! + third!, 9);
    expect(profile.lengthMeters).toBeCloseTo(first! + second! + third!, 9);
    expect(profile.farthestMeters).toBeCloseTo(first! + third!, 9);
  });

  it('draws a branch from where it leaves', () => {
    const d = teed();
    const profile = profileOf(d.doc, d.all('run')[0]!.id, indexAnswer(answerFor(d)), cableLengths(d.doc))!;
    const [a, b, c] = profile.lines;
    expect(b!.from).toEqual(a!.to);
    expect(c!.from).toEqual(a!.to);
  });

  it('takes the shorter way round a loop', () => {
    const d = teed();
    d.click(500, 100).click(700, 100).key('Enter');
    const request = d.requests[0];
    if (request?.kind !== 'confirm') throw new Error('the loop was not asked about');
    request.proceed();
    const profile = profileOf(d.doc, d.all('run')[0]!.id, indexAnswer(answerFor(d)), cableLengths(d.doc))!;
    const p3 = profile.points.find((p) => p.tag === 'P3')!;
    const lengths = d.all('cable').map((c) => cableLengths(d.doc).get(c.id)!.totalMeters!);
    expect(p3.meters).toBeCloseTo(
      Math.min(lengths[0]! + lengths[2]!, lengths[0]! + lengths[1]! + lengths[3]!),
      9,
    );
    expect(profile.lines).toHaveLength(4);
  });

  it('is nothing while the run has no answer', () => {
    const d = teed();
    const none = {
      fixtures: [],
      cables: [],
      runs: [],
      commons: [],
      taps: [],
      transformers: [],
      warnings: [],
    };
    expect(profileOf(d.doc, d.all('run')[0]!.id, indexAnswer(none), cableLengths(d.doc))).toBeNull();
  });

  it('shares the window of its fixtures', () => {
    const d = teed();
    const profile = profileOf(d.doc, d.all('run')[0]!.id, indexAnswer(answerFor(d)), cableLengths(d.doc))!;
    expect(profile.band).toEqual({ minVolts: 9, maxVolts: 15 });
    const range = voltsRange(profile, 12);
    expect(range.low).toBeLessThan(11.8);
    // The far edges of a wide window don't flatten the line.
    expect(range.low).toBeGreaterThan(9.2);
    expect(range.high).toBeLessThan(15);
  });
});

describe('axes', () => {
  it('have round steps that cover the range', () => {
    expect(axisOver(0, 65, 7)).toEqual({ from: 0, to: 70, ticks: [0, 10, 20, 30, 40, 50, 60, 70] });
    expect(axisOver(10.4, 12.8, 4)).toEqual({ from: 10, to: 13, ticks: [10, 11, 12, 13] });
    expect(axisOver(11.9, 12.1, 4).ticks).toEqual([11.9, 11.95, 12, 12.05, 12.1]);
  });
});

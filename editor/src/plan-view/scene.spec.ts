import type { EstimateAnswer } from '@lampwright/geometry/estimate';
import {
  type CableRecord,
  defaultSettings,
  type FixtureRecord,
  type PlanDocument,
  planOf,
  type RunRecord,
} from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { indexAnswer } from './answers';
import { cableWeight, loadBand } from './cable-look';
import { buildScene, worstOfRuns } from './scene';

const fixture = (n: number, x: number): FixtureRecord => ({
  kind: 'fixture',
  id: `f${n}`,
  sheetId: 's',
  at: { x, y: 0 },
  number: n,
  name: '',
  itemId: 'light',
  lampId: null,
  quantity: 1,
  lead: null,
  aim: null,
  mountingHeightMeters: null,
  zoneId: null,
  note: '',
});
const cable = (id: string, fromId: string, toId: string, runId: string | null): CableRecord => ({
  kind: 'cable',
  id,
  sheetId: 's',
  runId,
  fromId,
  toId,
  via: [],
  itemId: 'cable',
  measuredMeters: null,
  slackFromMeters: null,
  slackToMeters: null,
  riseMeters: 0,
  extraOhms: 0,
  markedToMarked: false,
});
const run: RunRecord = {
  kind: 'run',
  id: 'r',
  number: 1,
  name: '',
  transformerId: 't',
  tapId: '12V',
  commonId: '1',
  schedule: null,
};

const doc: PlanDocument = planOf([
  defaultSettings('us'),
  {
    kind: 'item',
    id: 'light',
    sourceId: null,
    item: {
      category: 'fixture',
      name: 'Path light',
      kind: 'path',
      lead: { conductor: { awg: 18 }, lengthMeters: 1 },
      mountingHeightMeters: null,
      wetListed: false,
      light: 'integrated',
      load: { kind: 'driver', watts: 3, minVolts: 9 },
      window: { minVolts: 10, maxVolts: 15 },
      target: null,
      lumens: null,
      beamDegrees: null,
      cctKelvin: null,
    },
  },
  {
    kind: 'item',
    id: 'cable',
    sourceId: null,
    item: {
      category: 'cable',
      name: '12 AWG',
      conductor: { awg: 12 },
      ampacityAmps: null,
      directBurial: true,
    },
  },
  run,
  fixture(1, 100),
  fixture(2, 200),
  fixture(3, 300),
  fixture(4, 900),
  cable('c1', 'f1', 'f2', 'r'),
  cable('c2', 'f2', 'f3', 'r'),
  cable('c3', 'f3', 'f4', null),
]);

const reading = (id: string, volts: number, state: 'in-window' | 'dim' = 'in-window') => ({
  id,
  volts,
  amps: 0.3,
  voltAmps: 3.3,
  dropPercent: 4,
  state,
  aim: null,
});
const answer: EstimateAnswer = {
  fixtures: [reading('f1', 11.8), reading('f2', 11.2), reading('f3', 9.96, 'dim')],
  cables: [
    { id: 'c1', amps: 25, fromVolts: 12, toVolts: 11.8, dropVolts: 0.2, lossWatts: 5, ampacityPercent: 125 },
  ],
  runs: [],
  commons: [],
  taps: [],
  transformers: [],
  warnings: [],
};
const words = { lengthText: () => '', areaText: () => '', heightText: () => '', cableLength: () => '3.00 m' };
const scene = buildScene(doc, 's', { answers: indexAnswer(answer), unwired: new Set(['f4']) }, words);
const byId = new Map(scene.fixtures.map((f) => [f.id, f]));

describe('the scene of a sheet', () => {
  it('labels faults, and of each run the fixture with least room', () => {
    expect(byId.get('f3')).toMatchObject({ standing: 'fault', look: { kind: 'dim' }, text: 'P3 9.96 V' });
    expect([...worstOfRuns(doc, indexAnswer(answer))]).toEqual(['f3']);
    expect(byId.get('f1')!.standing).toBeNull();
  });

  it('tells volts, amps and drop of what is hovered', () => {
    expect(byId.get('f2')!.fullText).toBe('P2 11.2 V · 0.3 A · 4.0 % drop');
    expect(scene.cables[0]!.text).toBe('3.00 m · 25.0 A · 0.20 V lost');
  });

  it('says of what no run feeds that it is not wired yet, and dashes its cable', () => {
    expect(byId.get('f4')).toMatchObject({
      look: { kind: 'unwired' },
      text: 'P4 not wired yet',
      standing: 'unwired',
    });
    expect(scene.cables.map((c) => c.dashed)).toEqual([false, false, true]);
  });

  it('draws cable over its limit in the hue of what is over', () => {
    expect(scene.cables[0]!.colour).toBe('#D55E00');
    expect(scene.cables[1]!.colour).toBe('#16202E');
  });

  it('shows only what is on the sheet', () => {
    expect(buildScene(doc, 'other', { answers: null, unwired: new Set() }, words).fixtures).toEqual([]);
  });
});

describe('cable and loads', () => {
  it('are drawn heavier the thicker they are', () => {
    const weights = ([18, 16, 14, 12, 10, 8] as const).map((awg) => cableWeight({ awg }));
    expect([...weights].sort((a, b) => a - b)).toEqual(weights);
    expect(new Set(weights).size).toBe(6);
    expect(cableWeight({ mm2: 4 })).toBeGreaterThan(cableWeight({ mm2: 1.5 }));
  });

  it('are calm to 80 % of their limit, near it to 100 %, and over beyond', () => {
    expect([null, 80, 80.1, 100, 100.1].map(loadBand)).toEqual(['calm', 'calm', 'near', 'near', 'over']);
  });
});

import type { EstimateRequest } from './request.js';

/** A whole request in the widest form: every optional part is there. */
export function fullRequest(): EstimateRequest {
  return {
    conductorTemperatureC: 25,
    transformers: [
      {
        id: 'T',
        ratedVA: 300,
        lineVolts: 120,
        nominalLineVolts: 120,
        regulationPercent: 0,
        ratedAt: 'open',
        windings: [
          { id: 'w1', ratedVA: 300 },
          { id: 'w2', ratedVA: 300 },
        ],
        taps: [
          { id: '12V', volts: 12, winding: 'w1', limitAmps: 20 },
          { id: '13V', volts: 13, winding: 'w2' },
        ],
        commons: [
          { id: 'C1', limitAmps: 25, winding: 'w1' },
          { id: 'C2', limitAmps: 25, winding: 'w2' },
        ],
      },
    ],
    runs: [
      {
        id: 'R1',
        transformerId: 'T',
        tapId: '12V',
        commonId: 'C1',
        source: 's',
        cables: [
          {
            id: 'k1',
            from: 's',
            to: 'p1',
            lengthMeters: 12.4,
            conductor: { awg: 12 },
            extraOhms: 0,
            ampacityAmps: 20,
          },
        ],
        fixtures: [
          {
            id: 'f1',
            at: 'p1',
            quantity: 1,
            load: { kind: 'driver', watts: 4, powerFactor: 0.9, minVolts: 9 },
            lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
            window: { minVolts: 9, maxVolts: 15 },
            target: { minVolts: 10.5, maxVolts: 13 },
          },
        ],
      },
    ],
  };
}

/** The smallest form: nothing optional. */
export function leanRequest(): EstimateRequest {
  return {
    transformers: [{ id: 'T', ratedVA: 300, taps: [{ id: '12V', volts: 12 }], commons: [{ id: 'C1' }] }],
    runs: [
      {
        id: 'R1',
        transformerId: 'T',
        tapId: '12V',
        commonId: 'C1',
        source: 's',
        cables: [],
        fixtures: [
          {
            id: 'f1',
            at: 's',
            load: { kind: 'driver', watts: 4, minVolts: 9 },
            window: { minVolts: 9, maxVolts: 15 },
          },
        ],
      },
    ],
  };
}

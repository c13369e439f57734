import { type NormalizedTransformer, normalizeEstimateRequest } from '@lampwright/geometry/estimate';
import { voltAmperes } from '@lampwright/geometry/units';
import { openVolts, sagPerVoltAmpere } from '../circuit/index.js';
import type { VoltRange } from './options.js';
import type { TransformerModel } from './problem.js';

export interface ModelTap {
  readonly id: string;
  readonly winding: number;
  readonly openVolts: number;
  readonly limitAmps: number;
  readonly maxConductors: number;
}

export interface ModelWinding {
  readonly id: string;
  /** Volt-amperes that it may supply. */
  readonly mostVA: number;
  readonly sagPerVA: number;
  readonly commons: readonly { id: string; limitAmps: number; maxConductors: number }[];
}

/** A transformer model worked out for the search. */
export interface Model {
  readonly source: TransformerModel;
  readonly transformer: NormalizedTransformer;
  /** Volt-amperes that it may supply in all. */
  readonly mostVA: number;
  readonly windings: readonly ModelWinding[];
  /** Only taps that have a common on their winding. */
  readonly taps: readonly ModelTap[];
}

export function modelOf(source: TransformerModel, targetPercent: number): Model {
  const [transformer] = normalizeEstimateRequest({
    transformers: [{ ...source.transformer, id: source.id }],
    runs: [],
  }).transformers as [NormalizedTransformer];
  const room = targetPercent / 100;
  const conductors = (id: string) => source.maxConductors.get(id) ?? Number.POSITIVE_INFINITY;
  const windings = transformer.windings.map(({ id, ratedVA }) => ({
    id,
    mostVA: ratedVA * room,
    sagPerVA: sagPerVoltAmpere(transformer, voltAmperes(ratedVA)),
    commons: transformer.commons
      .filter(({ winding }) => winding === id)
      .map((common) => ({
        id: common.id,
        limitAmps: common.limitAmps ?? Number.POSITIVE_INFINITY,
        maxConductors: conductors(common.id),
      })),
  }));
  return {
    source,
    transformer,
    mostVA: transformer.ratedVA * room,
    windings,
    taps: transformer.taps.flatMap((tap) => {
      const winding = windings.findIndex(({ id }) => id === tap.winding);
      if (winding < 0 || windings[winding]!.commons.length === 0) return [];
      return [
        {
          id: tap.id,
          winding,
          openVolts: openVolts(transformer, tap.volts),
          limitAmps: tap.limitAmps ?? Number.POSITIVE_INFINITY,
          maxConductors: conductors(tap.id),
        },
      ];
    }),
  };
}

/** The volts that a tap may have, whatever else its winding feeds within its limit. */
export function rangeOfTap(model: Model, tap: ModelTap): VoltRange {
  const { sagPerVA, mostVA } = model.windings[tap.winding]!;
  return { from: tap.openVolts * (1 - sagPerVA * Math.min(mostVA, model.mostVA)), to: tap.openVolts };
}

export function meet(a: VoltRange, b: VoltRange): boolean {
  return a.from <= b.to && b.from <= a.to;
}

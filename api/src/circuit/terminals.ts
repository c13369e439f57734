import type {
  CommonAnswer,
  NormalizedRun,
  NormalizedTransformer,
  TapAnswer,
  TransformerAnswer,
} from '@lampwright/geometry/estimate';
import { percentOf } from './percent.js';

interface Sum {
  amps: number;
}

interface TransformerTotals {
  readonly transformer: NormalizedTransformer;
  readonly taps: Map<string, Sum>;
  readonly commons: Map<string, Sum>;
  readonly windingVA: Map<string, number>;
  voltAmps: number;
  lossWatts: number;
}

/** Adds up what the runs draw, by tap, common, winding and transformer. */
export class TerminalTotals {
  private readonly byId: Map<string, TransformerTotals>;

  constructor(transformers: readonly NormalizedTransformer[]) {
    this.byId = new Map(
      transformers.map((transformer) => [
        transformer.id,
        { transformer, taps: new Map(), commons: new Map(), windingVA: new Map(), voltAmps: 0, lossWatts: 0 },
      ]),
    );
  }

  add(run: NormalizedRun, amps: number, voltAmps: number, lossWatts: number): void {
    const totals = this.byId.get(run.transformerId);
    const tap = totals?.transformer.taps.find(({ id }) => id === run.tapId);
    if (!totals || !tap) throw new Error(`Run ${run.id} is on no known tap.`);
    addTo(totals.taps, run.tapId, amps);
    addTo(totals.commons, run.commonId, amps);
    totals.windingVA.set(tap.winding, (totals.windingVA.get(tap.winding) ?? 0) + voltAmps);
    totals.voltAmps += voltAmps;
    totals.lossWatts += lossWatts;
  }

  /** Volt-amperes that a winding supplies. */
  windingVA(transformerId: string, windingId: string): number {
    return this.byId.get(transformerId)?.windingVA.get(windingId) ?? 0;
  }

  /** In the order of the request; taps and commons only where a run uses them. */
  answers(): { commons: CommonAnswer[]; taps: TapAnswer[]; transformers: TransformerAnswer[] } {
    const commons: CommonAnswer[] = [];
    const taps: TapAnswer[] = [];
    const transformers: TransformerAnswer[] = [];
    for (const totals of this.byId.values()) {
      const { transformer, voltAmps, lossWatts } = totals;
      const transformerId = transformer.id;
      for (const { id, limitAmps } of transformer.commons) {
        const amps = totals.commons.get(id)?.amps;
        if (amps === undefined) continue;
        const loadPercent = limitAmps === undefined ? null : percentOf(amps, limitAmps);
        commons.push({ transformerId, id, amps, loadPercent });
      }
      for (const { id } of transformer.taps) {
        const amps = totals.taps.get(id)?.amps;
        if (amps !== undefined) taps.push({ transformerId, id, amps });
      }
      transformers.push({
        id: transformerId,
        voltAmps,
        loadPercent: percentOf(voltAmps, transformer.ratedVA),
        lossWatts,
      });
    }
    return { commons, taps, transformers };
  }
}

function addTo(sums: Map<string, Sum>, id: string, amps: number): void {
  const sum = sums.get(id);
  if (sum) sum.amps += amps;
  else sums.set(id, { amps });
}

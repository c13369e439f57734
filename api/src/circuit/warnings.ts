import type {
  CableAnswer,
  CommonAnswer,
  EstimateWarning,
  NormalizedEstimateRequest,
  NormalizedTransformer,
  TapAnswer,
  TransformerAnswer,
  WarningCode,
  WarningSubject,
} from '@lampwright/geometry/estimate';
import { percentOf } from './percent.js';
import type { WeakShort } from './short.js';
import type { TerminalTotals } from './terminals.js';

/** What a continuous load should stay below, by common practice (rating at 125 % of the load). */
const TARGET_PERCENT = 80;
/** Loads that meet a limit exactly must not warn for the last bit of a sum. */
const ROUNDING = 1 + 1e-9;

interface Figures {
  readonly cables: readonly CableAnswer[];
  readonly commons: readonly CommonAnswer[];
  readonly taps: readonly TapAnswer[];
  readonly transformers: readonly TransformerAnswer[];
}

const over = (percent: number | null, limit: number): percent is number =>
  percent !== null && percent > limit * ROUNDING;
const amps = (value: number) => `${value.toFixed(value < 10 ? 2 : 1)} A`;
const va = (value: number) => `${value.toFixed(0)} VA`;
const whole = (percent: number) => `${percent < 1000 ? percent.toFixed(1) : percent.toPrecision(3)} %`;

/** All warnings of the contract; `shorts` are by run, in the request's order. */
export function collectWarnings(
  request: NormalizedEstimateRequest,
  figures: Figures,
  totals: TerminalTotals,
  unreached: readonly string[],
  shorts: readonly (WeakShort | null)[],
): EstimateWarning[] {
  const warnings: EstimateWarning[] = [];
  const warn = (code: WarningCode, subject: WarningSubject, message: string) =>
    warnings.push({ code, subject, message });
  const transformerOf = new Map(request.transformers.map((transformer) => [transformer.id, transformer]));
  warnOfTerminals(figures, transformerOf, warn);
  for (const { id, amps: drawn, ampacityPercent } of figures.cables) {
    if (!over(ampacityPercent, 100)) continue;
    const message = `Cable ${id} carries ${amps(Math.abs(drawn))}, ${whole(ampacityPercent)} of what it may carry.`;
    warn('cable-over-ampacity', { kind: 'cable', id }, message);
  }
  for (const answer of figures.transformers) {
    const transformer = transformerOf.get(answer.id);
    if (transformer) warnOfTransformer(transformer, answer, totals, warn);
  }
  for (const id of unreached) {
    warn('unreached', { kind: 'fixture', id }, `No cable joins fixture ${id} to its source.`);
  }
  request.runs.forEach(({ id }, index) => {
    const short = shorts[index];
    if (!short) return;
    const message =
      `A dead short at ${short.node}, the far end of run ${id}, would draw only ${amps(short.amps)}; the breaker of ` +
      `common ${short.commonId} (${amps(short.limitAmps)}) may not trip.`;
    warn('weak-short', { kind: 'run', id }, message);
  });
  return warnings;
}

type Warn = (code: WarningCode, subject: WarningSubject, message: string) => void;

function warnOfTerminals(
  { commons, taps }: Figures,
  transformerOf: ReadonlyMap<string, NormalizedTransformer>,
  warn: Warn,
): void {
  for (const { id, transformerId, amps: drawn, loadPercent } of commons) {
    if (!over(loadPercent, 100)) continue;
    const message = `Common ${id} of ${transformerId} carries ${amps(drawn)}, ${whole(loadPercent)} of its limit.`;
    warn('common-over-limit', { kind: 'common', id, transformerId }, message);
  }
  for (const { id, transformerId, amps: drawn } of taps) {
    const limit = transformerOf.get(transformerId)?.taps.find((tap) => tap.id === id)?.limitAmps;
    const percent = limit === undefined ? null : percentOf(drawn, limit);
    if (!over(percent, 100)) continue;
    const message = `Tap ${id} of ${transformerId} carries ${amps(drawn)}, ${whole(percent)} of its limit.`;
    warn('tap-over-limit', { kind: 'tap', id, transformerId }, message);
  }
}

function warnOfTransformer(
  transformer: NormalizedTransformer,
  { voltAmps, loadPercent }: TransformerAnswer,
  totals: TerminalTotals,
  warn: Warn,
): void {
  const { id, ratedVA, windings } = transformer;
  const subject = { kind: 'transformer', id } as const;
  const supplies = `Transformer ${id} supplies ${va(voltAmps)}, ${whole(loadPercent)} of its ${va(ratedVA)}`;
  if (over(loadPercent, TARGET_PERCENT)) {
    warn('transformer-over-target', subject, `${supplies}; ${TARGET_PERCENT} % is the most to plan for.`);
  }
  if (over(loadPercent, 100))
    warn('transformer-over-rating', subject, `${supplies}: more than it is rated for.`);
  for (const winding of windings) {
    const supplied = totals.windingVA(id, winding.id);
    const percent = percentOf(supplied, winding.ratedVA);
    if (!over(percent, 100)) continue;
    const message =
      `Winding ${winding.id} of transformer ${id} supplies ${va(supplied)}, ${whole(percent)} of its ` +
      `${va(winding.ratedVA)}.`;
    warn('winding-over-rating', { kind: 'winding', id: winding.id, transformerId: id }, message);
  }
}

import { ampacityOf, type RunOnBench, type RunReading } from './bench-run.js';

/** Terminal volts, both ends included. */
export interface VoltRange {
  readonly from: number;
  readonly to: number;
}

/** One run in one cable: the terminal volts at which every lamp gets its volts, and what it draws there. */
export interface RunOption {
  readonly cableIndex: number;
  readonly costMinor: number;
  readonly works: VoltRange;
  readonly ampsFrom: number;
  readonly ampsTo: number;
  readonly voltAmpsFrom: number;
  readonly voltAmpsTo: number;
}

/** Volts to which the ends of a range are found. */
const FOUND_TO_VOLTS = 1e-6;
/** Ranges are widened by so much, so that a choice is never ruled out by rounding; the estimate has the last word. */
const SLACK_VOLTS = 4e-6;

/**
 * Volts of every lamp rise with the terminal's, so those that suit all of them are one range: found by halving.
 * Null where no terminal volts within `within` do.
 */
export function optionOf(bench: RunOnBench, costMinor: number, within: VoltRange, cableIndex: number) {
  const works = workingRange(bench, within);
  if (!works) return null;
  const low = bench.at(works.from);
  const high = bench.at(works.to);
  if (!low || !high) return null;
  const { ampsFrom, ampsTo } = ampsBetween(bench, low, high);
  const limit = ampacityOf(bench.cable);
  if (limit !== null && hasOneFeed(bench) && ampsFrom > limit) return null;
  const option: RunOption = {
    cableIndex,
    costMinor,
    works: { from: works.from - SLACK_VOLTS, to: works.to + SLACK_VOLTS },
    ampsFrom,
    ampsTo,
    voltAmpsFrom: works.from * ampsFrom,
    voltAmpsTo: works.to * ampsTo,
  };
  return option;
}

/** The terminal volts that suit all fixtures, or only the given ones, of a run. */
export function workingRange(
  bench: RunOnBench,
  within: VoltRange,
  only: (index: number) => boolean = () => true,
): VoltRange | null {
  const every = (reading: RunReading, fits: (volts: number, index: number) => boolean) =>
    reading.volts.every((volts, i) => bench.limits[i] === null || !only(i) || fits(volts, i));
  const enough = (terminal: number): boolean => {
    const reading = bench.at(terminal);
    return reading !== null && every(reading, (volts, i) => volts >= bench.limits[i]!.minVolts);
  };
  const notTooMuch = (terminal: number): boolean => {
    const reading = bench.at(terminal);
    return reading === null || every(reading, (volts, i) => volts <= bench.limits[i]!.maxVolts);
  };
  if (!enough(within.to) || !notTooMuch(within.from)) return null;
  const from = enough(within.from) ? within.from : turningPoint(within, (v) => !enough(v)).to;
  const to = notTooMuch(within.to) ? within.to : turningPoint(within, notTooMuch).from;
  return from <= to ? { from, to } : null;
}

/** Between which neighbours a condition that holds at the start, and not at the end, stops to hold. */
function turningPoint({ from, to }: VoltRange, holds: (volts: number) => boolean): VoltRange {
  let low = from;
  let high = to;
  while (high - low > FOUND_TO_VOLTS) {
    const middle = (low + high) / 2;
    if (holds(middle)) low = middle;
    else high = middle;
  }
  return { from: low, to: high };
}

/**
 * Bounds on what the run draws between two readings. Each load's current runs one way with its volts, but for a
 * driver, which draws most where it begins to regulate.
 */
function ampsBetween(bench: RunOnBench, low: RunReading, high: RunReading) {
  let ampsFrom = 0;
  let ampsTo = 0;
  bench.run.fixtures.forEach(({ load, quantity = 1 }, i) => {
    const [a, b] = [low.fixtureAmps[i]!, high.fixtureAmps[i]!];
    ampsFrom += Math.min(a, b);
    const peak =
      load.kind === 'driver' ? (quantity * load.watts) / (load.powerFactor ?? 1) / load.minVolts : 0;
    const passesPeak =
      load.kind === 'driver' && low.volts[i]! < load.minVolts && high.volts[i]! > load.minVolts;
    ampsTo += Math.max(a, b, passesPeak ? peak : 0);
  });
  return { ampsFrom, ampsTo };
}

function hasOneFeed({ run }: RunOnBench): boolean {
  return run.cables.filter(({ from, to }) => from === run.source || to === run.source).length === 1;
}

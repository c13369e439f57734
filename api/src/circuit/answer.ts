import type {
  CableAnswer,
  EstimateAnswer,
  FixtureAnswer,
  NormalizedEstimateRequest,
  RunAnswer,
} from '@lampwright/geometry/estimate';
import type { SolvedRun } from './circuit.js';
import { conductorAmpacity } from './conductors.js';
import { UNREACHED } from './network.js';
import { percentOf } from './percent.js';
import { weakShort } from './short.js';
import { aimOf, stateOf } from './state.js';
import { TerminalTotals } from './terminals.js';
import { collectWarnings } from './warnings.js';

/** Everything the contract lists, from solved runs in the order of the request. */
export function buildAnswer(
  request: NormalizedEstimateRequest,
  solved: readonly SolvedRun[],
): EstimateAnswer {
  const totals = new TerminalTotals(request.transformers);
  const fixtures: FixtureAnswer[] = [];
  const cables: CableAnswer[] = [];
  const runs: RunAnswer[] = [];
  const unreached: string[] = [];
  for (const one of solved) {
    const run = one.circuit.run;
    const ofRun = fixtureAnswers(one, fixtures, unreached);
    const cableLossWatts = cableAnswers(one, cables);
    const amps = one.circuit.amps;
    const terminalVolts = one.share * one.circuit.open;
    runs.push({
      id: run.id,
      terminalVolts,
      amps,
      voltAmps: terminalVolts * amps,
      lowestVolts: ofRun.lowest,
      highestVolts: ofRun.highest,
      lengthMeters: run.cables.reduce((sum, { lengthMeters }) => sum + lengthMeters, 0),
    });
    totals.add(run, amps, terminalVolts * amps, cableLossWatts + ofRun.leadLossWatts);
  }
  const answer = { fixtures, cables, runs, ...totals.answers() };
  const shorts = solved.map((one) => weakShort(one, request));
  return { ...answer, warnings: collectWarnings(request, answer, totals, unreached, shorts) };
}

/** Adds the run's fixtures to `answers`. */
function fixtureAnswers({ circuit, share }: SolvedRun, answers: FixtureAnswer[], unreached: string[]) {
  const { run, loads, nodeOfFixture, open } = circuit;
  const terminalVolts = share * open;
  let lowest: number | null = null;
  let highest: number | null = null;
  let leadLossWatts = 0;
  let row = 0;
  for (let index = 0; index < run.fixtures.length; index++) {
    const fixture = run.fixtures[index]!;
    const node = nodeOfFixture[index]!;
    let volts: number = circuit.voltsAt(node, share);
    let amps = 0;
    // Rows of the load table are in the order of the fixtures; those that draw nothing have none.
    if (loads.fixture[row] === index) {
      volts = loads.volts[row]!;
      amps = loads.amps[row]! * fixture.quantity;
      leadLossWatts += loads.amps[row]! ** 2 * loads.lead[row]! * fixture.quantity;
      row++;
    }
    const reached = node !== UNREACHED;
    if (!reached) unreached.push(fixture.id);
    if (reached && fixture.load.kind !== 'off') {
      lowest = lowest === null ? volts : Math.min(lowest, volts);
      highest = highest === null ? volts : Math.max(highest, volts);
    }
    answers.push({
      id: fixture.id,
      volts,
      amps,
      voltAmps: volts * amps,
      dropPercent: ((terminalVolts - volts) / terminalVolts) * 100,
      state: stateOf(fixture, volts, reached, open),
      aim: aimOf(fixture.target, volts),
    });
  }
  return { lowest, highest, leadLossWatts };
}

/** Adds the run's cables to `answers`; returns the watts lost in them. */
function cableAnswers({ circuit, share }: SolvedRun, answers: CableAnswer[]): number {
  const { run, network } = circuit;
  let lossWatts = 0;
  for (let k = 0; k < run.cables.length; k++) {
    const cable = run.cables[k]!;
    const from = network.cableFrom[k]!;
    const to = network.cableTo[k]!;
    // Not the difference of the two volts, so that a short cable's current keeps its digits. + 0 makes −0 a 0.
    const dropVolts = circuit.fall(from, to) + 0;
    const amps = dropVolts * network.cableSiemens[k]! + 0;
    const ampacity = cable.ampacityAmps ?? conductorAmpacity(cable.conductor);
    lossWatts += amps * dropVolts;
    answers.push({
      id: cable.id,
      amps,
      fromVolts: circuit.voltsAt(from, share),
      toVolts: circuit.voltsAt(to, share),
      dropVolts,
      lossWatts: amps * dropVolts,
      ampacityPercent: ampacity === null ? null : percentOf(Math.abs(amps), ampacity),
    });
  }
  return lossWatts;
}

import {
  cableLengths,
  conduitLengths,
  countBySeverity,
  type EstimateAnswer,
  type EstimateRequest,
  estimateRequestOf,
  normalizeEstimateRequest,
  type PlanFault,
  parseEstimateRequest,
  planFaults,
} from '@lampwright/geometry/estimate';
import { labelOf, type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
import type { UnitSystem } from '@lampwright/geometry/units';
import { NoConvergence, solveEstimate, solverVersion } from '../../circuit/index.js';
import type { PlanSummary } from './plans.dto.js';

/** Faults told in a summary; all are counted. */
const FAULTS_LISTED = 100;

/** What the server makes of a plan: its own request, its own solver, never what a client claims. */
export function summarise(plan: PlanDocument, planVersion: number, system: UnitSystem): PlanSummary {
  const lengths = cableLengths(plan);
  const estimate = estimateRequestOf(plan, lengths);
  const { answer, failure } = solve(estimate.request);
  const faults = planFaults(plan, answer, { estimate, lengths, system });
  const label = (id: string) => {
    const record = plan.get(id);
    return record ? labelOf(record, plan) : id;
  };
  const runs = answer?.runs ?? [];
  return {
    planVersion,
    solverVersion: String(solverVersion),
    fixtures: [...recordsOf(plan, 'fixture')].length,
    unwired: estimate.unwired.length,
    waiting: estimate.waitingFixtures.length,
    counts: countBySeverity(faults),
    lowestVolts: bound(
      runs.map((run) => run.lowestVolts),
      Math.min,
    ),
    highestVolts: bound(
      runs.map((run) => run.highestVolts),
      Math.max,
    ),
    cableMeters: sum([...lengths.values()].map((length) => length.totalMeters ?? 0)),
    conduitMeters: sum([...conduitLengths(plan).values()]),
    failure,
    transformers: (answer?.transformers ?? []).map(({ id, voltAmps, loadPercent }) => ({
      id,
      label: label(id),
      voltAmps,
      loadPercent,
    })),
    runs: runs.map(({ id, lowestVolts, highestVolts, lengthMeters }) => ({
      id,
      label: label(id),
      lowestVolts,
      highestVolts,
      lengthMeters,
    })),
    faults: faults.slice(0, FAULTS_LISTED).map(told),
  };
}

function solve(request: EstimateRequest | null): { answer: EstimateAnswer | null; failure: string | null } {
  if (!request) return { answer: null, failure: null };
  const parsed = parseEstimateRequest(request);
  if (!parsed.ok)
    return { answer: null, failure: parsed.errors[0]?.detail ?? 'The plan could not be estimated.' };
  try {
    return { answer: solveEstimate(normalizeEstimateRequest(parsed.request)), failure: null };
  } catch (error) {
    if (!(error instanceof NoConvergence)) throw error;
    return { answer: null, failure: error.message };
  }
}

const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

function bound(volts: readonly (number | null)[], of: (...values: number[]) => number): number | null {
  const known = volts.filter((v) => v !== null);
  return known.length > 0 ? of(...known) : null;
}

const told = ({ code, severity, recordId, otherId, message }: PlanFault) => ({
  code,
  severity,
  recordId,
  otherId,
  message,
});

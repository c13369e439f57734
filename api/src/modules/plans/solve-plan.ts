import {
  type CableLength,
  cableLengths,
  type EstimateAnswer,
  type EstimateRequest,
  estimateRequestOf,
  normalizeEstimateRequest,
  type PlanEstimate,
  type PlanFault,
  parseEstimateRequest,
  planFaults,
} from '@lampwright/geometry/estimate';
import type { PlanDocument } from '@lampwright/geometry/plan';
import type { UnitSystem } from '@lampwright/geometry/units';
import { NoConvergence, solveEstimate } from '../../circuit/index.js';

/** What the server makes of a plan: its own request, its own solver, never what a client claims. */
export interface SolvedPlan {
  readonly lengths: ReadonlyMap<string, CableLength>;
  readonly estimate: PlanEstimate;
  /** Null where there is nothing to ask, or no answer. */
  readonly answer: EstimateAnswer | null;
  /** Why there is no answer, in a sentence; null where there is one, or nothing to ask. */
  readonly failure: string | null;
  /** Worst first. */
  readonly faults: readonly PlanFault[];
}

/** Costs a few milliseconds for a hundred fixtures. */
export function solvePlan(plan: PlanDocument, system: UnitSystem): SolvedPlan {
  const lengths = cableLengths(plan);
  const estimate = estimateRequestOf(plan, lengths);
  const { answer, failure } = solve(estimate.request);
  const faults = planFaults(plan, answer, { estimate, lengths, system });
  return { lengths, estimate, answer, failure, faults };
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

import { conduitLengths, countBySeverity, type PlanFault } from '@lampwright/geometry/estimate';
import { labelOf, type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
import type { UnitSystem } from '@lampwright/geometry/units';
import { solverVersion } from '../../circuit/index.js';
import type { PlanSummary } from './plans.dto.js';
import { solvePlan } from './solve-plan.js';

/** Faults told in a summary; all are counted. */
const FAULTS_LISTED = 100;

/** What is kept of a plan for lists and for those who only look. */
export function summarise(plan: PlanDocument, planVersion: number, system: UnitSystem): PlanSummary {
  const { lengths, estimate, answer, failure, faults } = solvePlan(plan, system);
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

import { labelOf, type PlanDocument, recordOf } from '../../plan/index.js';
import type { UnitSystem } from '../../units/index.js';
import type { EstimateAnswer } from '../contract/index.js';
import { type CableLength, cableLengths } from './cable-lengths.js';
import type { FaultSeverity, PlanFault } from './fault.js';
import { groundFaults } from './ground-faults.js';
import { estimateRequestOf, type PlanEstimate } from './request.js';
import { voltFaults } from './volt-faults.js';
import { wiringFaults } from './wiring-faults.js';
import { capitalised } from './words.js';

export interface PlanFaultOptions {
  /** How distances are told. Default imperial. */
  readonly system?: UnitSystem;
  /** Where the caller has them already. */
  readonly lengths?: ReadonlyMap<string, CableLength>;
  readonly estimate?: PlanEstimate;
}

const rank: Record<FaultSeverity, number> = { fault: 0, caution: 1, advice: 2 };

/**
 * Everything about the plan that a person should know, worst first. `answer` is what the estimate said, or
 * null while it is not known: then the rest is told.
 */
export function planFaults(
  doc: PlanDocument,
  answer: EstimateAnswer | null,
  options: PlanFaultOptions = {},
): PlanFault[] {
  const lengths = options.lengths ?? cableLengths(doc);
  const estimate = options.estimate ?? estimateRequestOf(doc, lengths);
  const faults = [
    ...(answer ? voltFaults(doc, answer) : []),
    ...wiringFaults(doc),
    ...groundFaults(doc, options.system ?? 'imperial'),
    ...estimate.faults,
    ...estimate.unwired.flatMap((id) => notWired(doc, id)),
    ...distrusted(doc, lengths),
  ];
  return faults.sort((a, b) => rank[a.severity] - rank[b.severity]);
}

function notWired(doc: PlanDocument, id: string): PlanFault[] {
  const fixture = recordOf(doc, id, 'fixture');
  if (!fixture) return [];
  return [
    {
      code: 'not-wired',
      severity: 'caution',
      recordId: id,
      otherId: null,
      message: `${capitalised(labelOf(fixture, doc))} is not wired yet.`,
    },
  ];
}

/** Drawn lengths that count, in places where the scale can't carry them. */
function distrusted(doc: PlanDocument, lengths: ReadonlyMap<string, CableLength>): PlanFault[] {
  const faults: PlanFault[] = [];
  for (const [id, length] of lengths) {
    if (length.measuredMeters !== null || !length.plan || length.plan.trusted) continue;
    const cable = recordOf(doc, id, 'cable');
    if (!cable) continue;
    const ends = [cable.fromId, cable.toId].flatMap((end) => {
      const record = doc.get(end);
      return record ? [labelOf(record, doc)] : [];
    });
    const why =
      length.plan.reason === 'near-horizon' ? 'runs near the horizon' : 'may be off by more than 10 %';
    faults.push({
      code: 'scale-not-trusted',
      severity: 'caution',
      recordId: id,
      otherId: null,
      message: `The cable from ${ends.join(' to ')} ${why}: the scale can’t be trusted there. Measure it on site.`,
    });
  }
  return faults;
}

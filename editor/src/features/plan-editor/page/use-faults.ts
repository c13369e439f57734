import { countBySeverity, type PlanFault, planFaults } from '@lampwright/geometry/estimate';
import { useMemo } from 'react';
import { useDoc, useEstimate, useUnitSystem } from './context';

export interface Faults {
  readonly list: readonly PlanFault[];
  readonly counts: ReturnType<typeof countBySeverity>;
  /** False while there is cable to reckon with and no answer yet: then no faults mean nothing. */
  readonly voltsKnown: boolean;
}

/** Everything wrong with the plan, worst first, as the last answer and the plan say it. */
export function useFaults(): Faults {
  const doc = useDoc();
  const system = useUnitSystem();
  const answer = useEstimate((s) => s.answer);
  const estimated = useEstimate((s) => s.doc);
  const plan = useEstimate((s) => s.plan);
  const lengths = useEstimate((s) => s.lengths);
  return useMemo(() => {
    const known = plan !== null && estimated === doc ? { lengths, estimate: plan } : {};
    const list = planFaults(doc, answer, { system, ...known });
    const voltsKnown = answer !== null || plan === null || plan.request === null;
    return { list, counts: countBySeverity(list), voltsKnown };
  }, [doc, system, answer, estimated, plan, lengths]);
}

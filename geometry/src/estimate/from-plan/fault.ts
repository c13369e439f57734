/**
 * `fault`: will not work, harms equipment, or breaks a rule. `caution`: may be fine, a person must look.
 * `advice`: works, but misses what the company aims at or leaves work undone.
 */
export type FaultSeverity = 'fault' | 'caution' | 'advice';

export type PlanFaultCode =
  | 'dark'
  | 'dim'
  | 'overdriven'
  | 'below-aim'
  | 'above-aim'
  | 'not-wired'
  | 'unreached'
  | 'no-light'
  | 'lamp-does-not-fit'
  | 'lamp-too-strong'
  | 'waits-for-scale'
  | 'scale-not-trusted'
  | 'common-over-limit'
  | 'tap-over-limit'
  | 'cable-over-ampacity'
  | 'transformer-over-target'
  | 'transformer-over-rating'
  | 'winding-over-rating'
  | 'weak-short'
  | 'terminal-crowded'
  | 'joined-runs'
  | 'joined-transformers'
  | 'loop-not-confirmed'
  | 'dc-polarity'
  | 'cable-through-building'
  | 'cable-through-water'
  | 'fixture-in-water'
  | 'near-water'
  | 'number-used-twice';

/** Something about the plan that a person should know, told in one sentence. */
export interface PlanFault {
  readonly code: PlanFaultCode;
  readonly severity: FaultSeverity;
  /** The record it is about. */
  readonly recordId: string;
  /** Another record that it is about, such as the water or the second run; null where there is none. */
  readonly otherId: string | null;
  /** The terminal or winding of the record that it is about, where it is about one of several. */
  readonly part?: string;
  readonly message: string;
}

export function countBySeverity(faults: Iterable<PlanFault>): Record<FaultSeverity, number> {
  const counts = { fault: 0, caution: 0, advice: 0 };
  for (const { severity } of faults) counts[severity] += 1;
  return counts;
}

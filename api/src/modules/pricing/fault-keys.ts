import type { PlanFault } from '@lampwright/geometry/estimate';
import type { AcceptanceRow } from './fault-acceptances.repository.js';
import type { Acceptance, QuoteAnswer } from './pricing.dto.js';

export type OpenFault = QuoteAnswer['faults'][number];

/** Names a fault whatever its words: code, records, and the terminal or winding where there is one. */
export const keyOf = ({ code, recordId, otherId, part }: PlanFault): string =>
  [code, recordId, otherId ?? '', part ?? ''].join(':').replace(/:+$/, '');

/** Faults that stand in the way of an offer, by severity; cautions and advice don't. */
export const seriousOf = (faults: readonly PlanFault[]): PlanFault[] =>
  faults.filter(({ severity }) => severity === 'fault');

/**
 * Each fault with whoever answers for it. An acceptance is of the words that were read: with other volts in
 * them it does not count, and the fault has to be accepted anew.
 */
export function withAcceptances(
  faults: readonly PlanFault[],
  acceptances: readonly AcceptanceRow[],
): OpenFault[] {
  return faults.map((fault) => {
    const key = keyOf(fault);
    const row = acceptances.findLast((one) => one.faultKey === key && one.message === fault.message);
    const { code, recordId, message } = fault;
    return { key, code, recordId, message, acceptance: row ? acceptanceOf(row) : null };
  });
}

export const acceptanceOf = ({ id, reason, acceptedByName, createdAt }: AcceptanceRow): Acceptance => ({
  id,
  reason,
  by: acceptedByName,
  at: createdAt.toISOString(),
});

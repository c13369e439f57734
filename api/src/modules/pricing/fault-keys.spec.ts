import type { PlanFault } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import type { AcceptanceRow } from './fault-acceptances.repository.js';
import { keyOf, withAcceptances } from './fault-keys.js';

const fault = (edit: Partial<PlanFault> = {}): PlanFault => ({
  code: 'common-over-limit',
  severity: 'fault',
  recordId: 't1',
  otherId: null,
  message: 'Common C1 of T1 carries too much (26.0 A).',
  ...edit,
});

const row = (faultKey: string, message: string, edit: Partial<AcceptanceRow> = {}): AcceptanceRow => ({
  id: crypto.randomUUID(),
  companyId: 'c',
  jobId: 'j',
  faultKey,
  message,
  reason: 'A second common is on its way.',
  acceptedBy: 'u',
  acceptedByName: 'Corin',
  createdAt: new Date('2026-05-01T10:00:00Z'),
  withdrawnAt: null,
  ...edit,
});

describe('the key of a fault', () => {
  it('tells faults of one record apart, by the other record and by terminal', () => {
    const faults = [
      fault({ part: 'C1' }),
      fault({ part: 'C2' }),
      fault(),
      fault({ otherId: 'C1' }),
      fault({ code: 'tap-over-limit', part: 'C1' }),
      fault({ recordId: 't2', part: 'C1' }),
    ];
    expect(new Set(faults.map(keyOf)).size).toBe(faults.length);
  });

  it('does not depend on words', () => {
    expect(keyOf(fault({ message: 'x' }))).toBe(keyOf(fault()));
  });
});

describe('acceptances', () => {
  it('are of one fault in the words that were read; the newest of several counts', () => {
    const one = fault({ part: 'C1' });
    const two = fault({ part: 'C2' });
    const stale = row(keyOf(two), 'Common C2 of T1 carries too much (30.0 A).');
    const older = row(keyOf(one), one.message, { reason: 'First.' });
    const newer = row(keyOf(one), one.message, { reason: 'Then.' });
    const [first, second] = withAcceptances([one, two], [stale, older, newer]);
    expect(first?.acceptance).toEqual({
      id: newer.id,
      reason: 'Then.',
      by: 'Corin',
      at: '2026-05-01T10:00:00.000Z',
    });
    expect(second?.acceptance).toBeNull();
  });
});

import type { FixtureRecord } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { yardWith } from '../tools/driver.testkit';
import { describeRecord } from './describe';
import { withTag } from './FaultList';

const d = yardWith(1);
const base = d.all('fixture')[0] as FixtureRecord;

describe('what differs between two people’s records', () => {
  it('is told field by field, and only where it differs', () => {
    expect(describeRecord(base, base)).toEqual([]);
    expect(describeRecord({ ...base, at: { x: 12.4, y: 7.6 }, name: 'Gate' }, base)).toEqual([
      'place at 12, 8',
      'name “Gate”',
    ]);
    expect(describeRecord({ ...base, quantity: 3, note: 'x'.repeat(80) }, base)[1]).toMatch(
      /^note “x{59}…”$/,
    );
  });
});

describe('faults', () => {
  it('call a nameless fixture by its tag on the drawing', () => {
    const fault = { code: 'dim', severity: 'fault', recordId: base.id, otherId: null } as const;
    expect(withTag(d.doc, { ...fault, message: 'Fixture 1 gets 10.7 V; it needs 10.8 V.' })).toBe(
      'P1 gets 10.7 V; it needs 10.8 V.',
    );
    expect(withTag(d.doc, { ...fault, message: 'Fixture 12 is another one.' })).toBe(
      'Fixture 12 is another one.',
    );
  });
});

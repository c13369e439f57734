import type { FixtureRecord } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { yardWith } from '../tools/driver.testkit';
import { describeRecord } from './describe';

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

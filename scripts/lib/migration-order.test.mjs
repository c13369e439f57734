import assert from 'node:assert/strict';
import { test } from 'node:test';
import { orderFaults } from './migration-order.mjs';

const first = { idx: 0, when: 100, tag: '0000_first' };

test('rising dates are in order', () => {
  assert.deepEqual(orderFaults([first, { idx: 1, when: 101, tag: '0001_second' }]), []);
});

test('a migration dated at or before its forerunner is named', () => {
  for (const when of [99, 100]) {
    const [fault, ...rest] = orderFaults([first, { idx: 1, when, tag: '0001_second' }]);
    assert.match(fault ?? '', /^0001_second is dated/);
    assert.deepEqual(rest, []);
  }
});

test('a gap in the numbers and an empty journal are faults', () => {
  assert.equal(orderFaults([first, { idx: 2, when: 101, tag: '0002_third' }]).length, 1);
  assert.equal(orderFaults([]).length, 1);
});

import { describe, expect, it } from 'vitest';
import { stableAddress } from './caller-address.js';

describe('stableAddress', () => {
  it.each([
    ['192.0.2.7', '192.0.2.7'],
    ['::ffff:192.0.2.7', '192.0.2.7'],
    ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2'],
    ['2001:0DB8:0001:0002::', '2001:db8:1:2'],
    ['2001:db8::6', '2001:db8:0:0'],
    ['2001:db8:1::5:6:7:8', '2001:db8:1:0'],
    ['::1', '0:0:0:0'],
    ['', ''],
  ])('%s counts as %s', (address, stable) => {
    expect(stableAddress(address)).toBe(stable);
  });
});

import { isIPv6 } from 'node:net';

/**
 * What one caller can't easily change about their address: an IPv4 address whole, of IPv6 the first 64 bits,
 * since the rest is theirs to choose.
 */
export function stableAddress(address: string): string {
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address);
  if (mapped?.[1]) return mapped[1];
  if (!isIPv6(address)) return address;
  const [left = '', right] = address.split('::');
  const head = left === '' ? [] : left.split(':');
  const tail = right === undefined || right === '' ? [] : right.split(':');
  const zeros =
    right === undefined ? [] : Array<string>(Math.max(0, 8 - head.length - tail.length)).fill('0');
  const groups = [...head, ...zeros, ...tail].slice(0, 4);
  return groups.map((group) => Number.parseInt(group, 16).toString(16)).join(':');
}

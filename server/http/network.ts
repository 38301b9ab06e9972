import { isIPv6 } from 'node:net';
import type { Request } from 'express';

/**
 * The network a request comes from, as `trust proxy` sees it: an IPv4 address, or the 64-bit prefix that an IPv6
 * network is given as a whole (RFC 6177 §2, RFC 7421).
 */
export function networkOf({ ip }: Pick<Request, 'ip'>): string {
  const address = (ip ?? '').replace(/^::ffff:(?=\d+\.)/i, '').replace(/%.*$/, '');
  if (!isIPv6(address)) return address;
  const [head, tail] = address.split('::');
  const before = head === '' ? [] : head.split(':');
  const after = tail ? tail.split(':') : [];
  const zeros = tail === undefined ? 0 : Math.max(0, 8 - before.length - after.length);
  const groups = [...before, ...Array<string>(zeros).fill('0'), ...after];
  return `${groups
    .slice(0, 4)
    .map((group) => Number.parseInt(group, 16).toString(16))
    .join(':')}::/64`;
}

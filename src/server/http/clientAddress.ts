import { isIPv6 } from 'node:net';
import type { APIContext } from 'astro';

/**
 * Key under which a client's requests are counted. The web server has taken off every forwarding header
 * that no proxy of ours vouches for, so Astro's address can be believed. An IPv4 address stays as it is;
 * of an IPv6 address the /64 counts, since one household has a whole one.
 */
export function clientKey(context: Pick<APIContext, 'clientAddress'>): string {
  const address = context.clientAddress.replace(/^::ffff:(?=\d+\.)/i, '');
  if (!isIPv6(address)) return address;
  const [head = '', tail] = address.split('::');
  const start = head.split(':').filter(Boolean);
  const end = (tail ?? '').split(':').filter(Boolean);
  const missing = tail === undefined ? 0 : 8 - start.length - end.length;
  const groups = [...start, ...Array<string>(Math.max(0, missing)).fill('0'), ...end];
  return `${groups
    .slice(0, 4)
    .map((group) => parseInt(group, 16).toString(16))
    .join(':')}::/64`;
}

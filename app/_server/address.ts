/** The network address behind a request. */
import { isIPv4, isIPv6 } from 'node:net';

/**
 * The client's address from x-forwarded-for. With `hops` proxies of our own, the entry that the first of them wrote;
 * with none, the last entry, which the web server itself adds when the client sends no such header.
 */
export function clientAddress(forwardedFor: string | null, hops: number): string {
  const entries = (forwardedFor ?? '').split(',').map((part) => part.trim());
  const entry = entries.at(-Math.max(1, hops)) ?? '';
  const plain = entry.replace(/^::ffff:/i, '');
  return isIPv4(plain) || isIPv6(plain) ? plain : 'unknown';
}

/** /24 of an IPv4 address, /48 of an IPv6 one: one household or firm, and all that we keep. */
export function addressPrefix(address: string): string {
  if (isIPv4(address)) return `${address.split('.').slice(0, 3).join('.')}.0/24`;
  if (!isIPv6(address)) return 'unknown';
  const head = address.split('::')[0] ?? '';
  const groups = head.split(':').filter((g) => g !== '');
  while (groups.length < 3) groups.push('0');
  return `${groups.slice(0, 3).join(':').toLowerCase()}::/48`;
}

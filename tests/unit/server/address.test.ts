import { describe, expect, it } from 'vitest';
import { addressPrefix, clientAddress } from '../../../app/_server/address';

// Addresses of RFC 5737 and RFC 3849, which belong to nobody.
describe("the client's address", () => {
  it.each([
    ['the only entry without a proxy', '192.0.2.7', 0, '192.0.2.7'],
    ['what one proxy appended, not what the client claims', '203.0.113.9, 192.0.2.7', 1, '192.0.2.7'],
    ['what the outer of two proxies appended', '203.0.113.9, 192.0.2.7, 198.51.100.1', 2, '192.0.2.7'],
    ['an IPv4 address in IPv6 form as IPv4', '::ffff:192.0.2.7', 0, '192.0.2.7'],
    ['unknown for what is no address', 'localhost', 0, 'unknown'],
    ['unknown when there are fewer entries than proxies', '192.0.2.7', 2, 'unknown'],
    ['unknown without the header', null, 0, 'unknown'],
  ])('is %s', (_, header, hops, expected) => {
    expect(clientAddress(header, hops)).toBe(expected);
  });
});

describe('the network part', () => {
  it.each([
    ['192.0.2.7', '192.0.2.0/24'],
    ['2001:db8:1:2::7', '2001:db8:1::/48'],
    ['2001:DB8::7', '2001:db8:0::/48'],
    ['::1', '0:0:0::/48'],
    ['unknown', 'unknown'],
  ])('of %s is %s', (address, expected) => {
    expect(addressPrefix(address)).toBe(expected);
  });
});

import { expect, it } from 'vitest';
import { addressIn } from './client-address';

// 192.0.2.0/24 and 198.51.100.0/24 are kept for documentation (RFC 5737), 2001:db8::/32 likewise (RFC 3849).
it.each([
  ['192.0.2.7', '192.0.2.7'],
  ['198.51.100.9, 192.0.2.7', '192.0.2.7'],
  ['2001:DB8::1', '2001:db8::1'],
  ['::ffff:192.0.2.7', '::ffff:192.0.2.7'],
  ['', 'unknown'],
  [null, 'unknown'],
  [undefined, 'unknown'],
  ["192.0.2.7'; DROP TABLE people", 'unknown'],
  ['1'.repeat(65), 'unknown'],
])('takes from %j what the nearest proxy wrote', (header, address) => {
  expect(addressIn(header)).toBe(address);
});

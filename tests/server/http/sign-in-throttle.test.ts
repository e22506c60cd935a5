import { describe, expect, it } from 'vitest';
import { addressKey } from '#server/http/sign-in-throttle.ts';

describe('the address that attempts are counted by', () => {
  it.each([
    ['203.0.113.7', '203.0.113.7'],
    ['::ffff:203.0.113.7', '203.0.113.7'],
    ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
    ['2001:0db8:0001:0002::9', '2001:db8:1:2::/64'],
    ['2001:db8::1', '2001:db8:0:0::/64'],
    ['::1', '0:0:0:0::/64'],
    ['', ''],
  ])('of %j is %j', (ip, key) => expect(addressKey(ip)).toBe(key));
});

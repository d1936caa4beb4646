import { Secret } from 'otpauth';
import { describe, expect, it } from 'vitest';
import { addressOfKey, newKey, stepOfCode } from '@/lib/access/totp';

/** RFC 6238, appendix B: the key of its SHA-1 rows. */
const KEY = Secret.fromLatin1('12345678901234567890').base32;

describe('stepOfCode(key, code, moment)', () => {
  // RFC 6238, appendix B, last six of eight digits; the step is its column T.
  it.each([
    [59, '287082', 0x1],
    [1111111109, '081804', 0x23523ec],
    [1111111111, '050471', 0x23523ed],
    [1234567890, '005924', 0x273ef07],
    [2000000000, '279037', 0x3f940aa],
    [20000000000, '353130', 0x27bc86aa],
  ])('at %i s takes %s for its step', (seconds, code, step) => {
    expect(stepOfCode(KEY, code, seconds * 1000)).toBe(step);
    expect(stepOfCode(KEY, ` ${code.slice(0, 3)} ${code.slice(3)} `, seconds * 1000)).toBe(step);
  });

  it('takes a code one step early or late for its own step, and no other', () => {
    const at = (steps: number) => stepOfCode(KEY, '287082', (59 + 30 * steps) * 1000);
    expect([-1, 0, 1].map(at)).toEqual([1, 1, 1]);
    expect([2, 3, 100].map(at)).toEqual([null, null, null]);
  });

  it.each(['', '28708', '2870822', '28708a', 'abcdef', '٢٨٧٠٨٢'])('refuses %j', (code) => {
    expect(stepOfCode(KEY, code, 59_000)).toBeNull();
  });
});

describe('newKey()', () => {
  it('holds 160 bits, other ones each time, and stands in the address', () => {
    const key = newKey();
    expect(Secret.fromBase32(key).bytes).toHaveLength(20);
    expect(newKey()).not.toBe(key);
    const address = new URL(addressOfKey(key, 'r.castellan@observatory.example'));
    expect(address.protocol).toBe('otpauth:');
    expect(address.searchParams.get('secret')).toBe(key);
    expect(address.searchParams.get('issuer')).toBe('Rarebound');
    expect(decodeURIComponent(address.pathname)).toContain('r.castellan@observatory.example');
  });
});

import { describe, expect, it } from 'vitest';
import { endingOf, hashToken, isWellFormedToken, makeToken } from '@/lib/access/tokens';

describe('makeToken()', () => {
  it('gives the prefix, 40 random characters and a checksum of 6', () => {
    const token = makeToken();
    expect(token).toMatch(/^rb_[0-9A-Za-z]{46}$/);
    expect(isWellFormedToken(token)).toBe(true);
  });

  it('never gives the same twice, and uses the whole alphabet evenly', () => {
    const tokens = Array.from({ length: 500 }, makeToken);
    expect(new Set(tokens).size).toBe(500);
    const counts = new Map<string, number>();
    for (const token of tokens) {
      for (const character of token.slice(3, 43)) {
        counts.set(character, (counts.get(character) ?? 0) + 1);
      }
    }
    expect(counts.size).toBe(62);
    // 20 000 draws over 62 characters: 322 each, give or take 18; six sigma hold for chance.
    for (const count of counts.values()) expect(Math.abs(count - 322.6)).toBeLessThan(6 * 18);
  });
});

describe('isWellFormedToken(text)', () => {
  it('finds every single mistyped character', () => {
    const token = makeToken();
    for (let at = 3; at < token.length; at++) {
      const other = token[at] === 'a' ? 'b' : 'a';
      expect(isWellFormedToken(`${token.slice(0, at)}${other}${token.slice(at + 1)}`)).toBe(false);
    }
  });

  it('refuses what was cut, extended or has another prefix', () => {
    const token = makeToken();
    expect(isWellFormedToken(token.slice(0, -1))).toBe(false);
    expect(isWellFormedToken(`${token}a`)).toBe(false);
    expect(isWellFormedToken(`gh_${token.slice(3)}`)).toBe(false);
    expect(isWellFormedToken('')).toBe(false);
  });
});

describe('what is kept of a token', () => {
  it('is its SHA-256 and its last four characters', () => {
    // printf 'rb_abc' | sha256sum
    expect(hashToken('rb_abc')).toBe(
      'bcff61ebfce24cd9a7b80d93c210eee98a92c4dd31aeb4b764312e75af4cecab',
    );
    expect(endingOf('rb_abcdef')).toBe('cdef');
  });
});

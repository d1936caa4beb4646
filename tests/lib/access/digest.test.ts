import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { canonicalJson, digestOf, sha256Hex } from '@/models/digest';

describe('canonicalJson(value)', () => {
  it('sorts keys at every depth and writes no spaces', () => {
    const value = { b: [1, { z: null, a: true }], a: 'x "y"', '10': 1, '9': 2 };
    expect(canonicalJson(value)).toBe('{"10":1,"9":2,"a":"x \\"y\\"","b":[1,{"a":true,"z":null}]}');
  });

  it('gives equal text for equal values in any order', () => {
    expect(canonicalJson({ a: 1, b: { c: 2, d: 3 } })).toBe(
      canonicalJson({ b: { d: 3, c: 2 }, a: 1 }),
    );
    expect(canonicalJson([1, 2])).not.toBe(canonicalJson([2, 1]));
  });

  it('leaves out what JSON leaves out, and writes typed arrays as lists', () => {
    expect(canonicalJson({ a: undefined, b: new Float64Array([0.1, 2]) })).toBe('{"b":[0.1,2]}');
    expect(canonicalJson(new Date('2027-01-02T03:04:05Z'))).toBe('"2027-01-02T03:04:05.000Z"');
  });

  it('keeps every digit of a number', () => {
    expect(canonicalJson([0.1 + 0.2, 1e-300, -0])).toBe('[0.30000000000000004,1e-300,0]');
  });

  it.each([
    [Number.NaN],
    [Number.POSITIVE_INFINITY],
    [[undefined]],
    [1n],
    [() => 1],
    [Symbol('a')],
  ])('refuses %s, which JSON would lose', (value) => {
    expect(() => canonicalJson(value)).toThrow(TypeError);
  });
});

describe('sha256Hex(content)', () => {
  it('agrees with the published value for "abc"', () => {
    const published = 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad';
    expect(sha256Hex('abc')).toBe(published);
    expect(sha256Hex(new Uint8Array([97, 98, 99]))).toBe(published);
  });

  it('takes text as UTF-8', () => {
    expect(sha256Hex('β')).toBe(
      createHash('sha256').update(Buffer.from('β', 'utf8')).digest('hex'),
    );
  });

  it('is taken over the canonical JSON by digestOf', () => {
    expect(digestOf({ b: 1, a: 2 })).toBe(sha256Hex('{"a":2,"b":1}'));
  });
});

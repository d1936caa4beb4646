import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { orcidCheckCharacter, readOrcid } from '@/lib/schemas/orcid';

describe('ORCID iDs', () => {
  // Both are given as examples in ORCID's documentation of the identifier's structure.
  it.each(['0000-0002-1825-0097', '0000-0002-1694-233X'])('reads %s', (orcid) => {
    expect(readOrcid(orcid)).toBe(orcid);
    expect(readOrcid(`https://orcid.org/${orcid}`)).toBe(orcid);
    expect(readOrcid(orcid.replaceAll('-', '').toLowerCase())).toBe(orcid);
  });

  it('refuses every iD of which one digit was mistyped', () => {
    const digits = fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 15, maxLength: 15 });
    fc.assert(
      fc.property(digits, fc.nat(14), fc.integer({ min: 1, max: 9 }), (given, at, step) => {
        const check = orcidCheckCharacter(given.join(''));
        expect(readOrcid(`${given.join('')}${check}`)).not.toBeNull();
        const wrong = given.map((digit, i) => (i === at ? (digit + step) % 10 : digit));
        expect(readOrcid(`${wrong.join('')}${check}`)).toBeNull();
      }),
    );
  });

  it('refuses other shapes', () => {
    for (const text of ['', '0000-0002-1825-009', 'https://example.org/0000-0002-1825-0097']) {
      expect(readOrcid(text)).toBeNull();
    }
  });
});

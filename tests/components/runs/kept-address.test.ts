import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { keptFromHash, keptToHash } from '@/components/runs/kept-address';

const stars = Array.from({ length: 287 }, (_, i) => `NTY ${i} ~#&`);

describe('sets of stars in an address', () => {
  it('come back as they were, whatever the names', () => {
    const positions = fc.uniqueArray(fc.nat(stars.length - 1), { minLength: 1, maxLength: 286 });
    fc.assert(
      fc.property(fc.array(positions, { maxLength: 4 }), fc.nat(99), (sets, run) => {
        const kept = sets.map((places) => new Set(places.map((place) => stars[place])));
        const hash = keptToHash(run, stars, kept);
        expect(hash).toMatch(/^(#without=[\w~-]+)?$/);
        expect(keptFromHash(run, stars, hash)).toEqual(kept);
      }),
    );
    expect(keptToHash(4, stars, [new Set([stars[0], stars[286]])]).length).toBeLessThan(60);
  });

  it('are of one run and its stars: anything else gives none', () => {
    const hash = keptToHash(4, stars, [new Set(stars.slice(0, 9))]);
    expect(keptFromHash(5, stars, hash)).toEqual([]);
    expect(keptFromHash(4, stars.slice(0, 3), hash)).toEqual([]);
    for (const other of [
      '',
      '#further-questions',
      '#without=',
      '#without=4',
      '#without=4~A!',
      '#without=4~A',
    ]) {
      expect(keptFromHash(4, stars, other)).toEqual([]);
    }
    // Without any star there is nothing to compare with.
    expect(keptFromHash(4, ['a', 'b'], '#without=4~D')).toEqual([]);
    expect(keptFromHash(4, ['a', 'b'], '#without=4~B')).toEqual([new Set(['a'])]);
  });
});

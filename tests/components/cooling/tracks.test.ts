import { describe, expect, it } from 'vitest';
import { differenceOf, pickMasses, sharedBands, tracksOf } from '@/components/cooling/tracks';
import { outsideWords, startWords } from '@/components/cooling/used-by';
import type { CoolingRelationView } from '@/lib/schemas/cooling';

const relation = (given: Partial<CoolingRelationView> = {}): CoolingRelationView => ({
  id: 'built-in',
  name: 'first',
  startCondition: 'hot',
  isApproximate: false,
  source: null,
  massMjup: [1, 10],
  ageMyr: [10, 100, 1000],
  magnitudes: { H: [14, 16, null, 9, 11, 13], Ks: [13, 15, 17, 8, 10, 12] },
  usedBy: [],
  ...given,
});

describe('tracks of a relation', () => {
  it('are its own entries, with a gap where there is none', () => {
    const [light, heavy] = tracksOf(relation(), 'H');
    expect([...light.values]).toEqual([14, 16, Number.NaN]);
    expect(heavy.massMjup).toBe(10);
    expect([...heavy.values]).toEqual([9, 11, 13]);
  });

  it('are at most twelve, the ends among them', () => {
    const masses = pickMasses(Array.from({ length: 40 }, (_, i) => i + 1));
    expect(masses).toHaveLength(12);
    expect([masses[0], masses[11]]).toEqual([1, 40]);
    expect(pickMasses([1, 2])).toEqual([1, 2]);
  });
});

describe('the difference of two relations', () => {
  it('is nothing for a relation and itself', () => {
    const values = differenceOf(relation(), relation(), 'Ks').flatMap((track) => [...track.values]);
    expect(values).toEqual([0, 0, 0, 0, 0, 0]);
  });

  it('is how much fainter the second is', () => {
    const fainter = relation({ magnitudes: { Ks: [14.5, 16.5, 18.5, 9.5, 11.5, 13.5] } });
    const values = differenceOf(relation(), fainter, 'Ks').flatMap((track) => [...track.values]);
    expect(values.every((value) => Math.abs(value - 1.5) < 1e-12)).toBe(true);
    expect(sharedBands(relation(), fainter)).toEqual(['Ks']);
  });

  it('is not drawn where one of them does not reach', () => {
    const narrow = relation({ ageMyr: [100, 1000], magnitudes: { Ks: [15, 17, 10, 12] } });
    const [light] = differenceOf(relation(), narrow, 'Ks');
    expect([...light.values]).toEqual([Number.NaN, 0, 0]);
    const elsewhere = relation({ massMjup: [40, 80] });
    expect(differenceOf(relation(), elsewhere, 'Ks')).toEqual([]);
  });
});

describe('words', () => {
  it('name the start, and the targets outside', () => {
    expect(startWords({ startCondition: 'cold' })).toBe('cold start');
    expect(startWords({ startCondition: 'unstated' })).toBe('start not stated');
    const star = (name: string, lowerMyr: number, upperMyr: number) => ({
      name,
      lowerMyr,
      upperMyr,
    });
    expect(outsideWords([star('A', 3, 8), star('B', 9, 9)])).toBe('A (3 to 8 Myr), B (9 Myr)');
    const many = Array.from({ length: 9 }, (_, i) => star(`S${i}`, 1, 1));
    expect(outsideWords(many)).toMatch(/S5 \(1 Myr\) and 3 more$/);
  });
});

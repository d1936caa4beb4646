import { describe, expect, it } from 'vitest';
import { ageNumbers, ageWords, distanceNumbers } from '@/components/stars/star-words';
import { formatErrorPart, formatMeasured } from '@/components/surveys/measured';

const age = (given: object) => ({
  ageMyr: null,
  ageLowerMyr: null,
  ageUpperMyr: null,
  ageMinMyr: null,
  ageMaxMyr: null,
  ...given,
});
const distance = (distancePc: number | null, distanceErrorPc: number | null, parallax = {}) => ({
  ...{ distancePc, distanceErrorPc, parallaxMas: null, parallaxErrorMas: null },
  ...parallax,
});
const plain = (text: string) => text.replaceAll('\u00a0', ' ');

describe('the values of a star in words', () => {
  it('stand to the decimals of their error, in the list of stars as in that of a survey', () => {
    for (const [value, error, words] of [
      [48.6712, 0.2, '48.7 ± 0.2'],
      [29.5641, 0.0941, '29.564 ± 0.094'],
      [123.04, 0.634, '123.04 ± 0.63'],
      [18.9812, 0.077, '18.981 ± 0.077'],
      [364, 138, '364 ± 138'],
    ] as const) {
      expect(plain(distanceNumbers(distance(value, error)))).toBe(words);
      expect(`${formatMeasured(value, error)} ± ${formatErrorPart(error)}`).toBe(words);
    }
    const parallax = { parallaxMas: 20, parallaxErrorMas: 0.1 };
    expect(plain(distanceNumbers(distance(null, null, parallax)))).toBe('50.00 ± 0.25');
  });

  it('say where nobody gives the error of an age', () => {
    expect(plain(ageWords(age({ ageMyr: 45 })))).toBe('45 ± ? Myr');
    expect(plain(ageNumbers(age({ ageMyr: 45, ageLowerMyr: 40, ageUpperMyr: 52 })))).toBe(
      '45 +7 \u22125',
    );
    expect(plain(ageNumbers(age({ ageMyr: 45, ageMinMyr: 10, ageMaxMyr: 100 })))).toBe(
      '45 (10–100)',
    );
    expect(ageNumbers(age({ ageMinMyr: 10, ageMaxMyr: 100 }))).toBe('10–100');
  });
});

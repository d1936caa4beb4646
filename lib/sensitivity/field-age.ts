import type { AgeOfStar, SensitivitySettings, StarInputs } from './types';

/**
 * The age of a star under the settings: where a field age is set and the star belongs to its group
 * with a probability below 1, the mixture of the group's age and the field's.
 *
 * The field age is uniform in log age. A star without a stated probability belongs to its group; an
 * age that is a mixture already stays.
 *
 * @param star see StarInputs
 * @param settings see SensitivitySettings
 * @throws RangeError for a probability outside 0 to 1, or a field age whose ends are not in order
 */
export function ageUnder(star: StarInputs, settings: SensitivitySettings): AgeOfStar {
  const { age, membershipProbability: member } = star;
  const { fieldAge } = settings;
  if (!fieldAge || member === undefined || member === 1 || 'mixture' in age) return age;
  if (!(member >= 0 && member < 1)) {
    throw new RangeError(
      `membershipProbability of ${star.name} must be between 0 and 1, got ${member}`,
    );
  }
  const { minMyr, maxMyr } = fieldAge;
  if (!(minMyr > 0 && maxMyr > minMyr && Number.isFinite(maxMyr))) {
    throw new RangeError(`fieldAge must have 0 < minMyr < maxMyr, got ${minMyr} and ${maxMyr}`);
  }
  const field = { medianMyr: Math.sqrt(minMyr * maxMyr), minMyr, maxMyr };
  return {
    mixture: [
      { probability: member, age },
      { probability: 1 - member, age: field },
    ],
  };
}

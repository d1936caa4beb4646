import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf } from '@/lib/schemas/study-settings';

type GroupBy = SettingsOf<'influence'>['groupBy'];

export const groupNames: Record<GroupBy, string> = {
  'moving-group': 'moving groups',
  'spectral-type': 'spectral types',
};

/** Something that moves the limit by more than this is worth a warning. */
export const STRONG = 0.2;

export const isStrong = (ratio: number) => Math.abs(ratio - 1) > STRONG;

export function influenceInWords({ groupBy }: SettingsOf<'influence'>): string {
  return `each star, each survey, ${groupNames[groupBy]}`;
}

/** "20 of 287 stars carry half of the sensitivity." */
export function halfInWords({ halfCarriedBy, stars }: ResultOf<'influence'>): string {
  const count = halfCarriedBy === 1 ? '1 star carries' : `${halfCarriedBy} stars carry`;
  return `${count} half of the sensitivity, out of ${stars.length}.`;
}

/** Stars that leave with a survey: those that no other survey saw. */
export function countLeaving(stars: readonly { surveys: string[] }[], surveyId: string): number {
  return stars.filter(({ surveys }) => surveys.every((id) => id === surveyId)).length;
}

import type { SettingsOf } from '@/lib/schemas/study-settings';

export function comparisonInWords({ populationIds }: SettingsOf<'population-comparison'>): string {
  const count = populationIds.length;
  return `the run’s own against ${count === 1 ? 'one other' : `${count} others`}`;
}

/**
 * Steps of ln B: half of the published ends of 2 ln B.
 *
 * @source R. E. Kass and A. E. Raftery, Journal of the American Statistical Association 90 (1995) 773
 */
export const evidenceSteps = [
  { at: 1, words: 'positive' },
  { at: 3, words: 'strong' },
  { at: 5, words: 'very strong' },
];
export const evidenceSource =
  'Words at ln B of 1, 3 and 5: Kass & Raftery 1995, Journal of the American Statistical Association 90, 773.';

/** What a Bayes factor says, in the words of the cited scale. */
export function evidenceInWords(logBayesFactor: number): string {
  const size = Math.abs(logBayesFactor);
  const step = evidenceSteps.filter(({ at }) => size >= at).at(-1);
  if (!step) return 'not worth more than a bare mention';
  return `${step.words} evidence ${logBayesFactor > 0 ? 'for it' : 'against it'}`;
}

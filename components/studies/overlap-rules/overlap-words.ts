import type { ResultOf } from '@/lib/schemas/study-results';

type Rule = ResultOf<'overlap-rules'>['rules'][number]['rule'];

/** Names of the rules for a star in several surveys. */
export const ruleNames: Record<Rule, string> = {
  'same-position': 'same position',
  deepest: 'deepest map',
  independent: 'independent epochs',
  refuse: 'refuse shared stars',
};

export function overlapRulesInWords(): string {
  return 'every rule for stars in several surveys';
}

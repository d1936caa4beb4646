import type { CombinationDefinition, CombinationRule } from './combinations';

export const ruleNames: Record<CombinationRule, string> = {
  default: 'same position where all entries have curves, otherwise the deepest map',
  'same-position': 'same position',
  deepest: 'the deepest map',
  independent: 'independent epochs',
  refuse: 'no star may be in two surveys',
};

/**
 * A combination read back in words.
 *
 * @param surveyName name of a survey by its id
 */
export function describeStoredCombination(
  { surveyIds, rule, starRules, grid }: CombinationDefinition,
  surveyName: (id: string) => string,
): string {
  const names = surveyIds.map(surveyName);
  const list = `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}, in this order`;
  const own =
    starRules.length === 0
      ? ''
      : starRules.length === 1
        ? ', 1 star by a rule of its own'
        : `, ${starRules.length} stars by rules of their own`;
  const nodes = grid.choice === 'survey' ? `; on the grid of ${surveyName(grid.surveyId)}` : '';
  return `${list}; shared stars: ${ruleNames[rule]}${own}${nodes}`;
}

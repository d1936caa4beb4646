import type { SampleDefinition, SampleRange } from './samples';

function rangeWords({ min, max }: SampleRange, unit: string): string {
  if (min === undefined) return `at most ${max} ${unit}`;
  if (max === undefined) return `at least ${min} ${unit}`;
  return min === max ? `${min} ${unit}` : `${min} to ${max} ${unit}`;
}

function listWords(words: readonly string[], joint: 'and' | 'or'): string {
  if (words.length < 2) return words.join('');
  return `${words.slice(0, -1).join(', ')} ${joint} ${words[words.length - 1]}`;
}

/**
 * A selection of stars read back in words.
 *
 * @param surveyName name of a survey by its id
 */
export function describeSample(
  definition: SampleDefinition,
  surveyName: (id: string) => string,
): string {
  const { surveyIds, spectralType, ageMyr, distancePc, hostMassMsun } = definition;
  const { movingGroups, multiplicity, knownCompanion, unknown } = definition;
  const facts: string[] = [];
  if (spectralType) {
    const { from, to } = spectralType;
    facts.push(from === to ? `of spectral type ${from}` : `of spectral types ${from} to ${to}`);
  }
  if (ageMyr) facts.push(`aged ${rangeWords(ageMyr, 'Myr')}`);
  if (distancePc) facts.push(`at a distance of ${rangeWords(distancePc, 'pc')}`);
  if (hostMassMsun) facts.push(`with a mass of ${rangeWords(hostMassMsun, 'solar masses')}`);
  if (movingGroups) facts.push(`in the moving group ${listWords(movingGroups, 'or')}`);
  if (multiplicity === 'single') facts.push('listed as single');
  if (multiplicity === 'multiple') facts.push('listed as binary or multiple');
  const where = surveyIds ? ` that ${listWords(surveyIds.map(surveyName), 'or')} lists` : '';
  const first = facts.length === 0 && !surveyIds ? 'All stars' : `Stars${where}`;
  const sentence =
    facts.length === 0 ? first : `${first}${where && ','} ${listWords(facts, 'and')}`;
  const rest =
    knownCompanion === 'left-out'
      ? 'those chosen because a companion was known are left out'
      : 'those chosen because a companion was known are kept, although they are no fair draw';
  const kept = unknown === 'kept' && facts.length > 0;
  return `${sentence}; ${rest}${kept ? '; stars of which a fact is not known are kept' : ''}`;
}

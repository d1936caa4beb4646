import { formatPlain } from '@/lib/quantities/display';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { EccentricityLaw, SensitivitySettings } from '@/lib/sensitivity';
import type { Sample } from './run-sample';

export function describeEccentricity(law: EccentricityLaw): string {
  switch (law.law) {
    case 'circular':
      return 'circular orbits';
    case 'fixed':
      return `eccentricity ${formatPlain(law.eccentricity)}`;
    case 'uniform':
      return `eccentricity uniform from 0 to ${formatPlain(law.max)}`;
    case 'beta':
      return `eccentricity from Beta(${formatPlain(law.alpha)}, ${formatPlain(law.beta)})`;
    case 'rayleigh':
      return `eccentricity from a Rayleigh law, σ = ${formatPlain(law.sigma)}`;
  }
}

const thresholds = {
  hard: 'seen at or above the contrast limit, never below it',
  smooth: 'chance to be seen rises through one half at the contrast limit, Gaussian noise',
};

/** The threshold, and every rule beside it that changes what a curve says. */
export function describeDetection(settings: SensitivitySettings): string {
  const { smallSample, unstableZone, candidates, fieldAge, threshold } = settings;
  const parts = [thresholds[threshold]];
  if (smallSample) {
    parts.push(
      `thresholds near the star raised for few resolution elements of ${formatPlain(smallSample.fwhmArcsec)} arcsec (Mawet et al. 2014)`,
    );
  }
  if (candidates) {
    parts.push(
      `curves cut within ${formatPlain(candidates.halfWidthArcsec)} arcsec of candidates without an answer`,
    );
  }
  if (unstableZone) {
    parts.push(
      'semi-major axes that a listed stellar companion makes unstable taken out (Holman & Wiegert 1999)',
    );
  }
  if (fieldAge) {
    parts.push(
      `stars outside their group, by its membership probability, ${formatPlain(fieldAge.minMyr)} to ${formatPlain(fieldAge.maxMyr)} Myr old`,
    );
  }
  return parts.join('; ');
}

const UPLOADED = 'as in the uploaded maps';

/** One text where all surveys agree, else each with its surveys. */
function perSurvey(sample: Sample, wordsOf: (survey: Sample['surveys'][number]) => string): string {
  const users = new Map<string, string[]>();
  for (const survey of sample.surveys) {
    const maps = sample.stars
      .flatMap(({ entries }) => entries)
      .filter((entry) => entry.survey === survey);
    const texts = [
      ...(maps.some(({ map }) => map.origin === 'computed') ? [wordsOf(survey)] : []),
      ...(maps.some(({ map }) => map.origin === 'uploaded') ? [UPLOADED] : []),
    ];
    for (const text of texts) users.set(text, [...(users.get(text) ?? []), survey.row.name]);
  }
  if (users.size === 1) return [...users.keys()][0];
  return [...users].map(([text, names]) => `${text} (${names.join(', ')})`).join('; ');
}

/** How the maps of the sample were made, for the conditions of its limit. */
export function describeMaps(sample: Sample) {
  return {
    cooling: perSurvey(sample, ({ recipe }) => recipe.coolingName),
    eccentricity: perSurvey(sample, ({ recipe }) =>
      describeEccentricity(recipe.settings.eccentricity),
    ),
    threshold: perSurvey(sample, ({ recipe }) => describeDetection(recipe.settings)),
  };
}

const FIRST_SURVEY = 'age and distance of a shared star from the survey listed first';
const rules: Record<AnalysisRecipe['combination'], string> = {
  default: `same position where all entries have curves, otherwise the deepest map; ${FIRST_SURVEY}`,
  'same-position': `same position: no movement between the epochs; ${FIRST_SURVEY}`,
  deepest: 'the deepest map at each node, a lower bound',
  independent: 'independent epochs, optimistic for repeated observations',
  refuse: 'none is shared',
};

export function describeCombination(
  rule: AnalysisRecipe['combination'],
  sharedStars: number,
  surveys: number,
): string {
  if (surveys === 1) return 'one survey, every star once';
  if (sharedStars === 0) return 'none is shared, every star once';
  const count = sharedStars === 1 ? '1 star' : `${sharedStars} stars`;
  return `${count} in several surveys, each counted once: ${rules[rule]}`;
}

import { type Likelihood, MOST_CANDIDATES, type RatePrior, type RateQuestion } from './contract';

/**
 * The same prior for the other quantity, for the table that shows both: cut at 1 for a fraction.
 *
 * @returns null where the law has no counterpart: gamma belongs to a mean number, beta to a
 *   fraction, a log-uniform prior may begin above 1, and a table may reach above it
 */
export function priorFor(prior: RatePrior, likelihood: Likelihood): RatePrior | null {
  if (likelihood === 'mean-number') return prior.law === 'beta' ? null : prior;
  switch (prior.law) {
    case 'uniform':
      return { ...prior, max: Math.min(prior.max, 1) };
    case 'log-uniform':
      return prior.min < 1 ? { ...prior, max: Math.min(prior.max, 1) } : null;
    case 'jeffreys':
      return prior.max === undefined ? prior : { ...prior, max: Math.min(prior.max, 1) };
    case 'gamma':
      return null;
    case 'beta':
      return prior;
    case 'tabulated':
      return prior.value[prior.value.length - 1] <= 1 ? prior : null;
  }
}

const columnNames: Record<Likelihood, string> = {
  'host-fraction': 'no fraction of stars beside the mean number',
  'mean-number': 'no mean number beside the fraction of stars',
};

/** What decides whether a question has an answer of either quantity. */
export type AskedColumns = Pick<
  RateQuestion,
  'prior' | 'background' | 'candidates' | 'detectedStars' | 'rateScale'
>;

/** Why a fraction of stars cannot be asked beside a mean number; null where it can. */
function whyNoFraction({ background, candidates, detectedStars, rateScale }: AskedColumns) {
  if (background !== undefined && background > 0) {
    return 'a known background belongs to the mean number';
  }
  if (candidates?.treatment === 'rate-dependent') {
    const top = 1 / Math.max(1, ...(rateScale ?? []));
    return candidates.referenceRate < top
      ? null
      : 'the rate that the candidates were quoted for is no fraction of stars';
  }
  const open = candidates?.entries.filter(
    ({ star, probability }) => probability > 0 && probability < 1 && !detectedStars.includes(star),
  );
  return new Set(open?.map(({ star }) => star)).size > MOST_CANDIDATES
    ? `a fraction of stars weighs at most ${MOST_CANDIDATES} candidates`
    : null;
}

/**
 * Why the table of limits has no column for a likelihood, in words; null where it has one.
 *
 * @param asked with the prior as it was chosen, for whichever quantity
 */
export function whyNoColumn(asked: AskedColumns, likelihood: Likelihood): string | null {
  if (priorFor(asked.prior, likelihood) === null) {
    return 'the prior has no counterpart for it';
  }
  return likelihood === 'host-fraction' ? whyNoFraction(asked) : null;
}

export function otherLikelihood(likelihood: Likelihood): Likelihood {
  return likelihood === 'host-fraction' ? 'mean-number' : 'host-fraction';
}

/** Why the table beside an answer lacks the other quantity, as a sentence without a full stop. */
export function sayMissingColumn(
  question: AskedColumns & { likelihood: Likelihood },
): string | null {
  const other = otherLikelihood(question.likelihood);
  const why = whyNoColumn(question, other);
  return why === null ? null : `${columnNames[other]}: ${why}`;
}

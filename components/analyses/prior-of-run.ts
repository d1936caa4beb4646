import type { Likelihood, RatePrior } from '@/lib/inference';
import type { DrawnRun } from '@/lib/schemas/runs';

/** A table that no run has filled yet: the recipe refuses it. */
export const NO_TABLE: RatePrior = { law: 'tabulated', value: [], density: [], source: '' };

const counts = {
  'host-fraction': 'the fraction of stars with a planet',
  'mean-number': 'planets per star',
};

/** The quantity that a likelihood asks for, as runs name it. */
export function quantityFor(likelihood: Likelihood) {
  return likelihood === 'host-fraction' ? 'host_fraction' : 'companions_per_star';
}

/**
 * The posterior of a finished run as the prior of another analysis.
 *
 * @throws RangeError in words for a run without a result, or of another quantity
 */
export function priorOfRun(run: DrawnRun, likelihood: Likelihood): RatePrior {
  const { result, resultDigest, analysis, number } = run;
  const name = `${analysis.key} run ${number}`;
  if (!result || !resultDigest) throw new RangeError(`${name} has no result yet`);
  if (result.quantity !== quantityFor(likelihood)) {
    const other = likelihood === 'host-fraction' ? 'mean-number' : 'host-fraction';
    throw new RangeError(
      `${name} answers for ${counts[other]}, and this analysis asks for ${counts[likelihood]}: a ` +
        'posterior of the one is no prior of the other',
    );
  }
  const { value, density } = result.answer.curve;
  return {
    law: 'tabulated',
    value: [...value],
    density: [...density],
    source: `${name}, fingerprint ${resultDigest.slice(0, 12)}`,
  };
}

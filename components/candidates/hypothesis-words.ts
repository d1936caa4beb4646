import { formatPercent, formatSignificant } from '@/lib/quantities/display';
import type { CandidateDetail, FitView } from '@/lib/schemas/candidates';

/** A hypothesis is refused where chance gives so large a chi-squared less often: 3 σ of a normal error (our rule). */
const REFUSED_BELOW = 0.0027;

export const isRefused = ({ probability }: Pick<FitView, 'probability'>) =>
  probability < REFUSED_BELOW;

/** A probability in words that a reader can hold against others. */
export function chanceWords(probability: number): string {
  if (probability < 1e-6) return 'less than one in a million';
  return probability < 0.001 ? `${formatSignificant(probability, 1)}` : formatPercent(probability);
}

/** "χ² 1.9 for 4 degrees of freedom, chance 75 %: fits". */
export function fitWords(fit: FitView): string {
  const { chiSquared, degreesOfFreedom, probability } = fit;
  return `χ² ${formatSignificant(chiSquared, 3)} for ${degreesOfFreedom} degrees of freedom, chance ${chanceWords(probability)}: ${isRefused(fit) ? 'refused' : 'fits'}`;
}

export interface MotionConclusion {
  title: string;
  meaning: string;
  tone: 'ok' | 'warn' | 'neutral';
}

/** What both fits together say; the verdict stays with a person. */
export function concludeMotion(
  hypotheses: NonNullable<CandidateDetail['hypotheses']>,
): MotionConclusion {
  const moves = !isRefused(hypotheses.commonProperMotion);
  const stands = !isRefused(hypotheses.background);
  if (moves && !stands) {
    return {
      title: 'It moves with its star.',
      meaning: 'A source without motion of its own behind it is refused.',
      tone: 'ok',
    };
  }
  if (stands && !moves) {
    return {
      title: 'It stands still behind its star.',
      meaning: 'Common proper motion is refused.',
      tone: 'neutral',
    };
  }
  if (moves && stands) {
    return {
      title: 'The epochs cannot tell yet.',
      meaning: 'Both hypotheses fit: the star has not moved by enough of the errors.',
      tone: 'warn',
    };
  }
  return {
    title: 'Neither hypothesis fits.',
    meaning:
      'Orbital motion, a background source with a proper motion of its own, or errors that are too small would do this; none of them is modelled.',
    tone: 'warn',
  };
}

/** Why there is no test, and what would make one. */
export function whyNoTest(candidate: CandidateDetail): string {
  if (candidate.motionMissing !== null) return `${candidate.motionMissing}.`;
  const { length } = candidate.seen.filter(
    ({ separationErrorArcsec, positionAngleErrorDeg }) =>
      separationErrorArcsec !== null && positionAngleErrorDeg !== null,
  );
  const there = length === 1 ? '1 epoch has' : `${length} epochs have`;
  return `A test needs two days with errors of separation and position angle; ${there} them so far.`;
}

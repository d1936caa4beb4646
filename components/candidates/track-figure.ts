import type { FigureSettings } from '@/components/charts/figure-context';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import { fitWords, whyNoTest } from './hypothesis-words';
import { statusWords } from './status-words';

/** What the files of a candidate's track say. */
export function trackFigures(candidate: CandidateDetail): Omit<FigureSettings, 'toPdf'> {
  const { hypotheses, motion } = candidate;
  const name = `${candidate.star} ${candidate.name}`;
  return {
    file: name.replace(/[^A-Za-z0-9+-]+/g, '-'),
    title: name,
    label: statusWords[candidate.status],
    caption: [
      hypotheses
        ? `Moves with its star: ${fitWords(hypotheses.commonProperMotion)}. At rest behind it: ${fitWords(hypotheses.background)}.`
        : whyNoTest(candidate),
      motion
        ? `Star: proper motion ${motion.pmRaMasYr.toFixed(1)} mas/yr east, ${motion.pmDecMasYr.toFixed(1)} north, parallax ${motion.parallaxMas.toFixed(2)} mas.`
        : '',
      'East is left; bars: 1 σ; the first epoch with errors is the reference. Orbital motion is not modelled.',
    ].filter((line) => line !== ''),
  };
}

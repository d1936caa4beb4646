import {
  candidateTreatment,
  countCandidates,
  countDetections,
  isSetByPrior,
  type Likelihood,
  type OpenCandidates,
  type PopulationView,
  type RatePosterior,
  type RatePrior,
  type RateQuestion,
  ratePosterior,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
import { seenBy } from '@/lib/inference/answer';
import type { MeasuredDetection } from '@/lib/inference/measured-places';
import type { Population } from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';

/** A finished run's question with everything that it is answered from; it can go to a thread. */
export interface RunQuestion {
  /** Shape [star, mass, semiMajorAxis], round(65535 C). */
  maps: Uint16Array;
  grid: MapGrid;
  population: Population;
  /** Shape [star] [M_Sun], NaN where unknown. */
  hostMassMsun: Float64Array;
  likelihood: Likelihood;
  prior: RatePrior;
  /** Credible level of the limit [fraction]. */
  level: number;
  /** Confirmed companions that count where they lie in the population's ranges. */
  detections: MeasuredDetection[];
  candidates: OpenCandidates | null;
  /** Expected false detections among those counted; null: none. */
  background: number | null;
}

/** The question's answer, and what other answers are made from. */
export interface RunAnswer {
  view: PopulationView;
  /** Shape [star]: what the likelihood works with. */
  completeness: Float64Array;
  exposure: number;
  counted: MeasuredDetection[];
  rateQuestion: RateQuestion;
  posterior: RatePosterior;
  limit: number;
  isSetByPrior: boolean;
}

/**
 * The mean completeness of a question's stars with the companions that count, before any prior.
 *
 * @throws RangeError as `viewPopulation` and `countCandidates`
 */
export function rateQuestionOf(question: RunQuestion): {
  view: PopulationView;
  completeness: Float64Array;
  exposure: number;
  counted: MeasuredDetection[];
  rateQuestion: RateQuestion;
} {
  const { maps, grid, population, hostMassMsun, likelihood, prior, background } = question;
  const view = viewPopulation(maps, grid, population, hostMassMsun);
  const seen = seenBy(view, likelihood);
  const completeness = seen.completeness as Float64Array;
  const { counted } = countDetections(question.detections, population, likelihood, hostMassMsun);
  const undecided = countCandidates(question.candidates?.open ?? [], population, hostMassMsun);
  const candidates = candidateTreatment(question.candidates, undecided);
  return {
    view,
    completeness,
    exposure: seen.exposure,
    counted,
    rateQuestion: {
      likelihood,
      prior,
      completeness,
      detectedStars: counted.map(({ star }) => star),
      ...(view.rateScale !== null && { rateScale: view.rateScale }),
      ...(background !== null && { background }),
      ...(candidates !== undefined && { candidates }),
    },
  };
}

/**
 * Answers a run's question, as the run did or with something changed.
 *
 * @throws RangeError as `viewPopulation` and `ratePosterior`
 */
export function answerRunQuestion(question: RunQuestion): RunAnswer {
  const asked = rateQuestionOf(question);
  const posterior = ratePosterior(asked.rateQuestion);
  return {
    ...asked,
    posterior,
    limit: upperLimit(posterior, question.level),
    isSetByPrior: isSetByPrior(posterior, question.level),
  };
}

/** The same question of some of its stars: detections and candidates go with their star. */
export function withStars(question: RunQuestion, stars: readonly number[]): RunQuestion {
  const { grid, maps } = question;
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const kept = new Uint16Array(stars.length * size);
  const place = new Map<number, number>();
  stars.forEach((star, i) => {
    place.set(star, i);
    kept.set(maps.subarray(star * size, (star + 1) * size), i * size);
  });
  const moved = <Item extends { star: number }>(items: readonly Item[]): Item[] =>
    items.flatMap((item) => {
      const star = place.get(item.star);
      return star === undefined ? [] : { ...item, star };
    });
  const { candidates } = question;
  return {
    ...question,
    maps: kept,
    hostMassMsun: Float64Array.from(stars, (star) => question.hostMassMsun[star]),
    detections: moved(question.detections),
    candidates: candidates && { ...candidates, open: moved(candidates.open) },
  };
}

import { type RateQuestion, ratePosterior, upperLimit } from '@/lib/inference';
import { type RunQuestion, rateQuestionOf } from './run-question';

export interface InfluenceInput {
  question: RunQuestion;
  /** Sets of stars, by index, that are left out together. */
  groups: number[][];
}

export interface WithoutSome {
  limit: number;
  exposure: number;
}

export interface InfluenceOutput {
  limit: number;
  exposure: number;
  /** Shape [star]: what the likelihood works with. */
  completeness: number[];
  /** One a star; null where nothing is left and the prior has no end. */
  stars: (WithoutSome | null)[];
  groups: (WithoutSome | null)[];
}

/** A question of the rate without some stars, their detections and their candidates. */
export function withoutStars(question: RateQuestion, left: ReadonlySet<number>): RateQuestion {
  const { completeness, detectedStars, rateScale, candidates } = question;
  const kept = [...completeness.keys()].filter((star) => !left.has(star));
  const place = new Map(kept.map((star, i) => [star, i]));
  const pick = (values: Float64Array) => Float64Array.from(kept, (star) => values[star]);
  const placeOf = (star: number) => place.get(star) ?? [];
  return {
    ...question,
    completeness: pick(completeness),
    detectedStars: detectedStars.flatMap(placeOf),
    ...(rateScale && { rateScale: pick(rateScale) }),
    ...(candidates && {
      candidates: {
        ...candidates,
        entries: candidates.entries.flatMap((entry) => {
          const star = place.get(entry.star);
          return star === undefined ? [] : { ...entry, star };
        }),
      },
    }),
  };
}

/** The limit with every star, without each of them, and without each group of them. */
export function answerInfluence({ question, groups }: InfluenceInput): InfluenceOutput {
  const { completeness, exposure, rateQuestion } = rateQuestionOf(question);
  const { level } = question;
  const without = (stars: number[]): WithoutSome | null => {
    const rest = withoutStars(rateQuestion, new Set(stars));
    if (rest.completeness.length === 0) return null;
    const posterior = ratePosterior(rest);
    return { limit: upperLimit(posterior, level), exposure: posterior.exposure };
  };
  return {
    limit: upperLimit(ratePosterior(rateQuestion), level),
    exposure,
    completeness: [...completeness],
    stars: [...completeness.keys()].map((star) => without([star])),
    groups: groups.map(without),
  };
}

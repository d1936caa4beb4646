import { groupInfluence, starInfluence, type Without } from '@/lib/inference/influence';
import { type RunQuestion, rateQuestionOf } from './run-question';

export interface InfluenceInput {
  question: RunQuestion;
  /** Sets of stars, by index, that are left out together. */
  groups: { name: string; stars: number[] }[];
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
  /** One a star; null where nothing of the rate is left. */
  stars: (WithoutSome | null)[];
  groups: (WithoutSome | null)[];
}

const asWithout = (one: Without | null): WithoutSome | null =>
  one && { limit: one.limit, exposure: one.exposure };

/** The limit with every star, without each of them, and without each group of them. */
export function answerInfluence({ question, groups }: InfluenceInput): InfluenceOutput {
  const { completeness, exposure, rateQuestion } = rateQuestionOf(question);
  const { limit, without } = starInfluence(rateQuestion, question.level);
  return {
    limit,
    exposure,
    completeness: [...completeness],
    stars: without.map(asWithout),
    groups: groupInfluence(rateQuestion, groups, question.level).map((group) =>
      asWithout(group.without),
    ),
  };
}

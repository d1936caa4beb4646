import { answerRunQuestion, type RunQuestion } from './run-question';

export interface LimitOutput {
  limit: number;
  exposure: number;
  /** Shape [star]: what the likelihood works with. */
  completeness: number[];
  detections: number;
}

/** The limit of one question: the run's own, or one with something changed. */
export function answerLimit(question: RunQuestion): LimitOutput {
  const { limit, exposure, completeness, posterior } = answerRunQuestion(question);
  return { limit, exposure, completeness: [...completeness], detections: posterior.detections };
}

import type { StudyPerformer } from './study-context';

/** How many detections the run's sample gives at one rate, and if it were observed again. */
export const performCounts: StudyPerformer<'counts'> = async (given, { rate }) => {
  await given.report('counts', 0, 1);
  const result = await given.compute('counts', { question: given.question, rate });
  await given.report('counts', 1, 1);
  return result;
};

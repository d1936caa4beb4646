import type { StudyPerformer } from './study-context';

/** The run's question with the indices of its power law free. */
export const performFreeIndices: StudyPerformer<'free-indices'> = async (given, settings) => {
  const { run, question } = given;
  await given.report('indices', 0, 1);
  const result = await given.compute('free-indices', {
    question,
    settings,
    levels: run.result.levels.map(({ level }) => level),
    limitFixed: run.result.answer.limit,
  });
  await given.report('indices', 1, 1);
  return result;
};
